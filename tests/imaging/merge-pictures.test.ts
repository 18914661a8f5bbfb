import sharp from 'sharp';
import { afterAll, describe, expect, it } from 'vitest';
import { createPixels } from '../../api/imaging/pixels/pixels.ts';
import { Refusal } from '../../api/imaging/refusal.ts';
import { photograph } from '../support/photograph.ts';

const pixels = createPixels({ processes: 1, timeoutSeconds: 100, maxPixels: 300e6 });
afterAll(() => pixels.stop());

const exposure = async (ev: number, width = 1000, height = 700) => ({
  ev,
  jpeg: await photograph(width, height)
    .linear(2 ** (ev / 2.2))
    .jpeg({ quality: 90 })
    .toBuffer(),
});

describe('the merged picture of a bracket', () => {
  it('is made in a child, in every size, without metadata; what has another size is named', async () => {
    const frames = [await exposure(2), await exposure(0), await exposure(-2), await exposure(0, 700, 1000)];
    const merged = await pixels.merge(frames, 1);
    expect(merged).toMatchObject({
      width: 1000,
      height: 700,
      leftOut: [{ index: 3, why: 'size' }],
      shifts: frames.map(() => ({ x: 0, y: 0 })),
    });
    expect(merged.pictures.map(({ size, width, height }) => [size, width, height])).toEqual([
      [480, 480, 336],
      [960, 960, 672],
      [2560, 1000, 700],
    ]);
    for (const { data, width } of merged.pictures) {
      const found = await sharp(data).metadata();
      expect(found).toMatchObject({ format: 'jpeg', width });
      expect(found.exif).toBeUndefined();
    }
    expect(merged.placeholder.length).toBeGreaterThan(10);
  });

  it('is the lead frame where no other can be laid over it', async () => {
    const merged = await pixels.merge([await exposure(0), await exposure(0, 600, 400)], 0);
    expect(merged.leftOut).toEqual([{ index: 1, why: 'size' }]);
    expect(merged.pictures[2]).toMatchObject({ width: 1000, height: 700 });
  });

  it('is refused with a sentence where a frame is broken', async () => {
    const broken = { ev: 1, jpeg: (await exposure(1)).jpeg.subarray(0, 9000) };
    await expect(pixels.merge([await exposure(0), broken], 0)).rejects.toBeInstanceOf(Refusal);
  });
});
