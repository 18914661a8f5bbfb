import sharp from 'sharp';
import { afterAll, describe, expect, it } from 'vitest';
import { MEASURES_RECIPE } from '../../api/domain/frame-measures.ts';
import { measurePicture } from '../../api/imaging/measure/measure-picture.ts';
import { createPixels } from '../../api/imaging/pixels/pixels.ts';
import { Refusal } from '../../api/imaging/refusal.ts';
import { toRaw } from '../../api/imaging/upright.ts';
import { pictureOf } from '../support/drawn-pictures.ts';
import { photograph } from '../support/photograph.ts';

const pixels = createPixels({ processes: 1, timeoutSeconds: 100, maxPixels: 300e6 });
afterAll(() => pixels.stop());

describe('the measures of a derivative', () => {
  it('come from a child of the pool, the same as made here', async () => {
    const jpeg = await photograph(1200, 800).jpeg({ quality: 82 }).toBuffer();
    const measures = await pixels.measure(jpeg);
    expect(measures).toEqual(measurePicture(await toRaw(sharp(jpeg))));
    expect(measures).toMatchObject({ recipe: MEASURES_RECIPE, width: 1200, height: 800 });
    expect(measures.hash).toMatch(/^[0-9a-f]{16}$/);
  });

  it('are plain JSON of less than 6 kB', async () => {
    const measures = await pixels.measure(await photograph(2560, 1707, 7).jpeg().toBuffer());
    const written = JSON.stringify(measures);
    expect(written.length).toBeLessThan(6000);
    expect(JSON.parse(written)).toEqual(measures);
  });

  it('hold a thumb of 32 × 32: the means of areas, Rec. 709 luma', () => {
    // 64 × 96 pixels: each of the thumb covers two by three.
    const { thumb } = measurePicture(pictureOf(64, 96, (x, y) => [x * 4, y * 2, 100]));
    const bytes = Buffer.from(thumb, 'base64');
    expect(bytes).toHaveLength(1024);
    for (const [column, row] of [
      [0, 0],
      [31, 0],
      [5, 20],
      [31, 31],
    ] as const) {
      const [red, green] = [(column * 2 + 0.5) * 4, (row * 3 + 1) * 2];
      expect(Math.abs(bytes[row * 32 + column]! - (0.2126 * red + 0.7152 * green + 0.0722 * 100))).toBeLessThanOrEqual(0.51);
    }
  });

  it('are nearly the same of a picture twice the size', async () => {
    const [large, small] = await Promise.all(
      [2560, 1280].map(async (width) => measurePicture(await toRaw(photograph(2560, 1700).resize(width)))),
    );
    expect(small!.sharpness! / large!.sharpness!).toBeGreaterThan(0.6);
    expect(small!.sharpness! / large!.sharpness!).toBeLessThan(1.6);
    expect(small!.headroom).toBeCloseTo(large!.headroom, 0);
  });

  it.each([
    [1, 1],
    [1, 900],
    [2560, 2],
    [7, 5],
    [40, 30],
  ])('are there for %i × %i pixels too', (width, height) => {
    const measures = measurePicture(pictureOf(width, height, (x, y) => [(x * 7) % 256, (y * 5) % 256, 90]));
    expect(measures).toMatchObject({ width, height });
    expect(Buffer.from(measures.thumb, 'base64')).toHaveLength(1024);
    expect(JSON.stringify(measures)).not.toContain('NaN');
  });

  it('of a black, a white and a grey frame say so', () => {
    const of = (value: number) => measurePicture(pictureOf(300, 200, () => [value, value, value]));
    expect(of(0)).toMatchObject({ shadows: { all: 1, areas: 1 }, highlights: { any: 0 }, sharpness: null, hash: null });
    expect(of(255)).toMatchObject({ highlights: { all: 1, areas: 1 }, shadows: { any: 0 }, headroom: 0 });
    expect(of(128)).toMatchObject({ highlights: { any: 0 }, shadows: { any: 0 }, tilt: { horizon: null, uprights: null } });
  });

  it('are refused of what is no picture', async () => {
    await expect(pixels.measure(Buffer.from('no picture'))).rejects.toBeInstanceOf(Refusal);
  });
});
