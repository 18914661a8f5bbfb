import { describe, expect, it } from 'vitest';
import { CLIPPED, markClipped } from '../../api/domain/clipping.ts';
import { placesOf, stepIn } from '../../web/src/features/frames/bracket-places.ts';
import { clippedShares, hatchClipped, shareWords } from '../../web/src/features/frames/clipping-hatch.ts';
import { HEIGHT, pointsOf, topOf } from '../../web/src/features/frames/histogram-lines.ts';
import { fitLine } from '../../web/src/features/uses/fit-words.ts';
import { bracket, membersOf } from './frames-support.ts';

describe('stepping through a bracket', () => {
  const set = { bracket: bracket('one', ['a', 'b', 'c']), frames: membersOf('one', ['a', 'b', 'c']) };

  it('begins with the merged picture and goes from dark to bright', () => {
    expect(placesOf(set).map((place) => place.short)).toEqual(['Merged', '−2', '0', '+2']);
    const places = placesOf(set);
    expect(stepIn(places, 'b', true, 1)).toMatchObject({ frameId: 'a', merged: false });
    expect(stepIn(places, 'a', false, -1)).toMatchObject({ frameId: 'b', merged: true });
    expect(stepIn(places, 'c', false, 1)).toBeUndefined();
  });

  it('has no merged picture before it is made', () => {
    const waiting = { ...set, bracket: bracket('one', ['a', 'b', 'c'], { merged: { ...set.bracket.merged, state: 'waiting' } }) };
    expect(placesOf(waiting).map((place) => place.short)).toEqual(['−2', '0', '+2']);
  });
});

describe('what is clipped', () => {
  /** A white, a black and a grey row of 28 pixels. */
  const rgba = new Uint8ClampedArray([255, 0, 119].flatMap((grey) => Array<number[]>(28).fill([grey, grey, grey, 255]).flat()));
  const mask = markClipped(rgba, 4);
  const alpha = (paint: Uint8ClampedArray, row: number) => Array.from({ length: 28 }, (_, x) => paint[(row * 28 + x) * 4 + 3]);

  it('is striped, and nothing else is painted', () => {
    const paint = hatchClipped(mask, 28);
    expect(new Set(alpha(paint, 0)).size).toBe(2);
    expect(Math.min(...alpha(paint, 0).map(Number))).toBeGreaterThan(0);
    expect(new Set(alpha(paint, 2))).toEqual(new Set([0]));
  });

  it('rises for highlights and falls for shadows: a row lower, stripes lie a pixel further left or right', () => {
    const high = hatchClipped(new Uint8Array(56).fill(CLIPPED.anyHigh | CLIPPED.allHigh), 28);
    const low = hatchClipped(new Uint8Array(56).fill(CLIPPED.anyLow | CLIPPED.allLow), 28);
    expect(alpha(high, 1).slice(0, -1)).toEqual(alpha(high, 0).slice(1));
    expect(alpha(low, 1).slice(1)).toEqual(alpha(low, 0).slice(0, -1));
    expect(alpha(high, 0)).not.toEqual(alpha(high, 1));
  });

  it('is said in shares', () => {
    const { highlights, shadows } = clippedShares(mask);
    expect([highlights, shadows]).toEqual([1 / 3, 1 / 3]);
    expect([0, 0.0004, 0.032, 0.31].map(shareWords)).toEqual(['none', 'under 0.1%', '3.2%', '31%']);
  });
});

describe('the histogram', () => {
  it('is not pressed flat by what is clipped at its ends', () => {
    const curve = [90_000, 100, 200, 400, 50_000];
    expect(topOf([curve])).toBe(400);
    expect(pointsOf(curve, 400).split(' ')[3]).toBe('3.5,0.0');
    expect(pointsOf([0], 400)).toBe(`0.5,${HEIGHT}.0`);
  });
});

describe('fit for use in one line', () => {
  // ISO 216: A4 is 210 × 297 mm, which at 300 ppi is 2480 × 3508 pixels.
  const a4 = { id: 'a4', title: 'A4 page', kind: 'page' as const, widthMm: 210, heightMm: 297, ppi: 300 };
  const banner = { id: 'banner', title: 'Banner', kind: 'screen' as const, widthPx: 2560, heightPx: 1440 };

  it('names what it is not good for', () => {
    expect(fitLine({ width: 3508, height: 2480 }, [a4, banner])).toBe('Sharp for every use');
    expect(fitLine({ width: 3000, height: 2121 }, [a4, banner])).toBe('Sharp for 1 of 2 uses, not for A4 page (256 ppi)');
    expect(fitLine({ width: 800, height: 600 }, [a4, banner])).toBe('Sharp for none of the uses');
    expect(fitLine({ width: 800, height: 600 }, [])).toBe('');
  });
});
