import { describe, expect, it } from 'vitest';
import { DERIVATIVE_LIMITS } from '../../api/domain/clipping.ts';
import { HISTOGRAM_BINS, HISTOGRAM_WHOLE } from '../../api/domain/frame-measures.ts';
import { measureClipping } from '../../api/imaging/measure/clipping.ts';
import { headroomOf, histogramOf } from '../../api/imaging/measure/histogram.ts';
import { scanPicture } from '../../api/imaging/measure/scan.ts';
import type { RawPicture } from '../../api/imaging/upright.ts';
import { pictureOf, seededRandom, throughJpeg } from '../support/drawn-pictures.ts';

const measure = (picture: RawPicture) => measureClipping(scanPicture(picture, DERIVATIVE_LIMITS), DERIVATIVE_LIMITS);
const grey = (value: number) => [value, value, value] as const;
const inside = (x: number, y: number, side: number) => x < side && y < side;

// Made pictures: so many pixels out of a million are at the limit exactly.
describe('shares at the limits', () => {
  it('a white block of 100 × 100 in a million pixels is 1%, in all channels, in one piece', () => {
    const { highlights, shadows } = measure(pictureOf(1000, 1000, (x, y) => grey(inside(x, y, 100) ? 255 : 120)));
    expect(highlights).toMatchObject({ any: 0.01, all: 0.01, red: 0.01, green: 0.01, blue: 0.01, spots: 0 });
    expect(highlights.areas).toBeCloseTo(0.01, 3);
    expect(highlights.largest).toBeCloseTo(0.01, 3);
    expect(shadows).toMatchObject({ any: 0, all: 0, areas: 0, spots: 0 });
  });

  it('red alone at the limit counts in any channel and not in all', () => {
    const { highlights } = measure(pictureOf(1000, 1000, (x, y) => (inside(x, y, 300) ? [255, 120, 90] : grey(120))));
    expect(highlights).toMatchObject({ any: 0.09, all: 0, red: 0.09, green: 0, blue: 0, areas: 0 });
    expect(highlights.areasAny).toBeCloseTo(0.09, 2);
  });

  it('black likewise; a deep red is no blocked shadow', () => {
    const { shadows } = measure(pictureOf(1000, 1000, (x, y) => (inside(x, y, 200) ? grey(0) : x > 800 ? [150, 0, 0] : grey(120))));
    expect(shadows.all).toBe(0.04);
    expect(shadows.areas).toBeCloseTo(0.04, 2);
    expect(shadows.any).toBeCloseTo(0.04 + 0.199, 6);
    expect(shadows.red).toBe(0.04);
  });

  it('as many pixels in small spots are no area: lamps against a sky', () => {
    const lamp = (x: number, y: number) => x % 100 < 16 && y % 100 < 16;
    const night = measure(pictureOf(1000, 1000, (x, y) => grey(lamp(x, y) ? 255 : 20))).highlights;
    const sky = measure(pictureOf(1000, 1000, (x, y) => grey(inside(x, y, 160) ? 255 : 20))).highlights;
    expect(night.all).toBe(sky.all);
    expect(night).toMatchObject({ areas: 0, spots: 100 });
    expect(sky.areas).toBeCloseTo(0.0256, 3);
  });

  it('two skies parted by a tower are two areas; a wire parts none', () => {
    const parted = (width: number) =>
      measure(pictureOf(1000, 500, (x, y) => grey(y < 200 && Math.abs(x - 500) > width ? 255 : 90))).highlights;
    expect(parted(40).largest).toBeCloseTo(0.184, 2);
    expect(parted(0).largest).toBeCloseTo(0.4, 2);
    expect(parted(40).areas).toBeCloseTo(parted(40).all, 2);
  });

  it('scattered noise at the limit is no area', () => {
    const random = seededRandom(4);
    const { highlights } = measure(pictureOf(600, 400, () => grey(random() < 0.2 ? 255 : 200)));
    expect(highlights.any).toBeGreaterThan(0.19);
    expect(highlights.areas).toBe(0);
  });
});

describe('the limit of a derivative', () => {
  it('finds a blown sky and black water again after the JPEG, beside edges and grain', async () => {
    const random = seededRandom(8);
    const scene = pictureOf(960, 640, (x, y) => {
      if (y < 256) return grey(255);
      if (y >= 512) return grey(0);
      return (Math.floor(x / 7) + Math.floor(y / 9)) % 2 ? [200 * random(), 90, 40] : grey(140 + 60 * random());
    });
    const [made, back] = [measure(scene), measure(await throughJpeg(scene))];
    expect(made.highlights.all).toBe(0.4);
    expect(back.highlights.all).toBeCloseTo(0.4, 2);
    expect(back.shadows.all).toBeCloseTo(0.2, 2);
  });

  it('is not reached by what is only bright: 250 and 5 stay themselves', async () => {
    for (const value of [250, 5]) {
      const { highlights, shadows } = measure(await throughJpeg(pictureOf(320, 320, () => grey(value))));
      expect([highlights.any, shadows.any]).toEqual([0, 0]);
    }
  });

  it.each([
    [255, 255, 255],
    [255, 60, 60],
    [60, 255, 60],
    [60, 60, 255],
    [255, 255, 0],
  ])('takes in every channel that was at 255 in a flat %i %i %i', async (r, g, b) => {
    const { highlights } = measure(await throughJpeg(pictureOf(160, 160, () => [r, g, b])));
    for (const [share, value] of [
      [highlights.red, r],
      [highlights.green, g],
      [highlights.blue, b],
    ] as const)
      expect(share).toBe(value === 255 ? 1 : 0);
  });
});

describe('headroom', () => {
  const headroom = (picture: RawPicture) =>
    headroomOf(scanPicture(picture, DERIVATIVE_LIMITS).counts, picture.width * picture.height, DERIVATIVE_LIMITS.high);

  // sRGB of IEC 61966-2-1: half of white's light is code 187.52, a quarter 136.96, an eighth 98.99.
  it.each([
    [188, 1],
    [137, 2],
    [99, 3],
  ])('of code %i is %i stops', (code, stops) => {
    expect(headroom(pictureOf(100, 100, () => grey(code)))).toBeCloseTo(stops, 1);
  });

  it('is that of the brightest channel, and none at the limit', () => {
    expect(headroom(pictureOf(100, 100, () => [20, 188, 40]))).toBeCloseTo(1, 1);
    expect(headroom(pictureOf(100, 100, () => [20, 20, 254]))).toBe(0);
  });

  it('looks past sparkles of less than a thousandth', () => {
    const sparkle = (count: number) => pictureOf(100, 100, (x, y) => grey(y === 0 && x < count ? 255 : 99));
    expect(headroom(sparkle(9))).toBeCloseTo(3, 1);
    expect(headroom(sparkle(10))).toBe(0);
  });
});

describe('the histogram', () => {
  it('counts each channel and Rec. 709 luma in bins of four codes', () => {
    const picture = pictureOf(100, 10, (x) => (x < 25 ? [255, 0, 0] : [8, 128, 255]));
    const { red, green, blue, luma } = histogramOf(scanPicture(picture, DERIVATIVE_LIMITS).counts, 1000);
    const at = (bins: number[]) => bins.flatMap((parts, bin) => (parts > 0 ? [[bin, parts]] : []));
    expect(red).toHaveLength(HISTOGRAM_BINS);
    expect(at(red)).toEqual([
      [2, 75_000],
      [63, 25_000],
    ]);
    expect(at(green)).toEqual([
      [0, 25_000],
      [32, 75_000],
    ]);
    expect(at(blue)).toEqual([
      [0, 25_000],
      [63, 75_000],
    ]);
    // 0.2126 · 255 = 54.2; 0.2126 · 8 + 0.7152 · 128 + 0.0722 · 255 = 111.7.
    expect(at(luma)).toEqual([
      [13, 25_000],
      [28, 75_000],
    ]);
    for (const bins of [red, green, blue, luma]) expect(bins.reduce((sum, parts) => sum + parts, 0)).toBe(HISTOGRAM_WHOLE);
  });
});
