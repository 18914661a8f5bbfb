import { describe, expect, it } from 'vitest';
import { Uses } from '../../api/contract/uses.ts';
import { DEFAULT_USES } from '../../api/domain/default-uses.ts';
import {
  fitForUse,
  neededPpi,
  ppiSeenFrom,
  sayFit,
  type PageUse,
  type ScreenUse,
  type SeenFromUse,
  type Use,
} from '../../api/domain/fit-for-use.ts';

const page = (widthMm: number, heightMm: number, ppi = 300): PageUse => ({
  id: 'page',
  title: 'Page',
  kind: 'page',
  widthMm,
  heightMm,
  ppi,
});
const screen = (widthPx: number, heightPx: number): ScreenUse => ({ id: 'screen', title: 'Screen', kind: 'screen', widthPx, heightPx });
const seen = (widthMm: number, heightMm: number | null, distanceMm: number): SeenFromUse => ({
  ...{ id: 'seen', title: 'Seen', kind: 'seen-from' },
  ...{ widthMm, heightMm, distanceMm },
});
const size = (width: number, height: number) => ({ width, height });

/** The largest sharp size in millimetres, to a tenth. */
function largest(picture: { width: number; height: number }, use: Use): number[] {
  const fit = fitForUse(picture, use);
  if (fit.sharp || fit.kind !== 'print') throw new Error('It is sharp, or on a screen.');
  return [fit.largest.widthMm, fit.largest.heightMm].map((mm) => Number(mm.toFixed(1)));
}

describe('A page', () => {
  // ISO 216:2007, A series in millimetres, and its pixels at 300 ppi.
  it.each([
    ['A0', 841, 1189, 9933, 14043],
    ['A1', 594, 841, 7016, 9933],
    ['A2', 420, 594, 4961, 7016],
    ['A3', 297, 420, 3508, 4961],
    ['A4', 210, 297, 2480, 3508],
    ['A5', 148, 210, 1748, 2480],
  ])('%s of %i × %i mm needs %i × %i pixels, and not one less', (_name, widthMm, heightMm, width, height) => {
    expect(fitForUse(size(width, height), page(widthMm, heightMm))).toEqual({ sharp: true });
    expect(fitForUse(size(width - 1, height), page(widthMm, heightMm)).sharp).toBe(false);
    expect(fitForUse(size(width, height - 1), page(widthMm, heightMm)).sharp).toBe(false);
  });

  it('lies as the picture lies', () => {
    expect(fitForUse(size(3508, 2480), page(210, 297)).sharp).toBe(true);
    expect(fitForUse(size(2480, 3508), page(297, 210)).sharp).toBe(true);
  });

  // Rows recomputed by hand: pixels / ppi × 25.4 mm.
  it.each([
    [6000, 4000, 300, 508.0, 338.7],
    [6000, 4000, 240, 635.0, 423.3],
    [6000, 4000, 150, 1016.0, 677.3],
    [8256, 5504, 300, 699.0, 466.0],
    [9504, 6336, 300, 804.7, 536.4],
    [4000, 3000, 300, 338.7, 254.0],
    [3000, 2000, 300, 254.0, 169.3],
    [5472, 3648, 200, 694.9, 463.3],
  ])('of its own shape is sharp from %i × %i pixels at %i ppi up to %d × %d mm', (width, height, ppi, widthMm, heightMm) => {
    expect(largest(size(width, height), page(width, height, ppi))).toEqual([widthMm, heightMm]);
  });

  // Largest centred crops of 6000 × 4000: 1:1 is 4000 × 4000, 4:5 is 3200 × 4000, 16:9 is 6000 × 3375.
  it.each([
    [1000, 1000, 4000, 4000],
    [1000, 1250, 5000, 4000],
    [1600, 900, 6000, 3375],
    [2100, 900, 6000, 2571.4],
  ])('of %i × %i mm takes the largest part of that shape: %i × %d pixels', (widthMm, heightMm, width, height) => {
    const [w, h] = [(width / 300) * 25.4, (height / 300) * 25.4].map((mm) => Number(mm.toFixed(1)));
    expect(largest(size(6000, 4000), page(widthMm, heightMm))).toEqual([w, h]);
  });

  it('that is too large is answered with the ppi that are there and the size that is sharp', () => {
    const fit = fitForUse(size(5000, 3300), page(420, 594));
    // 3300 / (420 / 25.4) = 199.57 ppi across, 5000 / (594 / 25.4) = 213.80 along: the lesser counts.
    expect(fit).toMatchObject({ sharp: false, ppi: expect.closeTo(199.57, 2) as number });
    expect(sayFit(fit)).toBe('199 ppi, sharp up to 39 × 27 cm');
    expect(sayFit(fitForUse(size(800, 600), page(210, 297)))).toBe('68 ppi, sharp up to 6.7 × 4.7 cm');
    expect(sayFit({ sharp: true })).toBe('sharp');
  });
});

describe('An eye', () => {
  // One arc minute: 3437.75 / inches (references print 3438), rows to a tenth.
  it.each([
    [10, 343.8],
    [12, 286.5],
    [18, 191.0],
    [24, 143.2],
    [36, 95.5],
    [60, 57.3],
    [120, 28.6],
  ])('at %i inches resolves %d ppi', (inches, ppi) => {
    expect(ppiSeenFrom(inches * 25.4)).toBeCloseTo(ppi, 1);
  });

  it.each([
    [30, 291.1],
    [50, 174.6],
    [100, 87.3],
    [200, 43.7],
  ])('at %i cm resolves %d ppi', (centimetres, ppi) => {
    expect(neededPpi(seen(1000, null, centimetres * 10))).toBeCloseTo(ppi, 1);
  });

  it('sees a hoarding of 6 m from 10 m sharply from 2063 pixels on', () => {
    // 3437.75 / (10000 / 25.4) = 8.7319 ppi; 6000 / 25.4 × 8.7319 = 2062.6 pixels.
    expect(fitForUse(size(2063, 1400), seen(6000, null, 10_000))).toEqual({ sharp: true });
    expect(sayFit(fitForUse(size(2000, 1500), seen(6000, null, 10_000)))).toBe('8.4 ppi, sharp up to 5.8 × 4.3 m');
    expect(fitForUse(size(2063, 300), seen(6000, 3000, 10_000)).sharp).toBe(false);
  });
});

describe('A place on a screen', () => {
  it('is covered pixel by pixel, and is not turned', () => {
    expect(fitForUse(size(2560, 1707), screen(2560, 1440))).toEqual({ sharp: true });
    expect(sayFit(fitForUse(size(1600, 2400), screen(2560, 1440)))).toBe('sharp up to 1600 × 900 px');
    expect(sayFit(fitForUse(size(1000, 800), screen(1080, 1080)))).toBe('sharp up to 800 × 800 px');
  });
});

describe('The table of uses', () => {
  it('begins with A4 to A0, screens and a hoarding, as the contract takes it', () => {
    expect(Uses.parse(DEFAULT_USES)).toEqual(DEFAULT_USES);
    expect(new Set(DEFAULT_USES.map(({ kind }) => kind))).toEqual(new Set(['page', 'screen', 'seen-from']));
    const papers = DEFAULT_USES.flatMap((use) =>
      use.kind === 'page' ? [[use.widthMm, use.heightMm].sort((a, b) => a - b).join('×')] : [],
    );
    expect(papers).toEqual(['210×297', '297×420', '420×594', '594×841', '841×1189']);
  });

  it.each<[string, unknown]>([
    ['two of one id', [page(210, 297), page(210, 297)]],
    ['a page without size', [{ ...page(210, 297), widthMm: 0 }]],
    ['half a pixel', [screen(1080.5, 1080)]],
    ['no distance', [{ ...seen(1000, null, 0) }]],
    ['no name', [{ ...page(210, 297), title: ' ' }]],
    ['more than forty', Array.from({ length: 41 }, (_, index) => ({ ...page(210, 297), id: `p-${index}` }))],
  ])('refuses %s', (_what, uses) => {
    expect(Uses.safeParse(uses).success).toBe(false);
  });
});
