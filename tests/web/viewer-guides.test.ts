// @vitest-environment happy-dom
import { beforeEach, describe, expect, it } from 'vitest';
import { GUIDE_LINES, GUIDES, nextGuides } from '../../web/src/features/viewer/guides.ts';
import { keptChoice } from '../../web/src/lib/kept-choice.ts';

/** Where two lines meet, in hundredths of the picture. */
function meeting([x1, y1, x2, y2]: readonly number[], [u1, v1, u2, v2]: readonly number[]): [number, number] {
  const [a, b, c, d] = [x2! - x1!, y2! - y1!, u2! - u1!, v2! - v1!];
  const along = ((u1! - x1!) * d - (v1! - y1!) * c) / (a * d - b * c);
  return [x1! + along * a, y1! + along * b];
}

describe('guides over a picture', () => {
  it('meet where composition looks for them: at the thirds, and in the middle', () => {
    const [left, right, upper, lower] = GUIDE_LINES.thirds;
    const points = [left, right].flatMap((upright) => [upper, lower].map((level) => meeting(upright!, level!)));
    points.forEach(([x, y], index) => {
      expect(x / 100).toBeCloseTo(index < 2 ? 1 / 3 : 2 / 3, 10);
      expect(y / 100).toBeCloseTo(index % 2 === 0 ? 1 / 3 : 2 / 3, 10);
    });
    for (const guides of ['centre', 'diagonals'] as const) {
      const [one, other] = GUIDE_LINES[guides];
      expect(meeting(one!, other!)).toEqual([50, 50]);
    }
  });

  it('go round with a key, from none to none', () => {
    const seen = GUIDES.map((_, steps) => GUIDES.slice(0, steps).reduce((now) => nextGuides(now), 'none' as (typeof GUIDES)[number]));
    expect(new Set(seen)).toEqual(new Set(GUIDES));
    expect(nextGuides(GUIDES.at(-1) ?? 'none')).toBe('none');
  });
});

describe('a choice this browser keeps', () => {
  beforeEach(() => localStorage.clear());

  it('is there again when the page is opened anew', () => {
    keptChoice('oriel.guides', GUIDES, 'none').choose('diagonals');
    expect(keptChoice('oriel.guides', GUIDES, 'none').now()).toBe('diagonals');
    expect(keptChoice('oriel.other', GUIDES, 'thirds').now()).toBe('thirds');
  });

  it('is the first where another program wrote nonsense', () => {
    localStorage.setItem('oriel.guides', 'spiral');
    expect(keptChoice('oriel.guides', GUIDES, 'none').now()).toBe('none');
  });

  it('tells every part of the page, until that part goes', () => {
    const choice = keptChoice('oriel.guides', GUIDES, 'none');
    let heard = 0;
    const leave = choice.listen(() => (heard += 1));
    choice.choose('thirds');
    leave();
    choice.choose('centre');
    expect(heard).toBe(1);
  });
});
