import { beforeAll, describe, expect, it, vi } from 'vitest';
import { type Exposure, mergeExposures } from '../../api/imaging/merge/merge-exposures.ts';
import { type FusionConventions, OPENCV, PAPER } from '../../api/imaging/merge/fusion/conventions.ts';
import { fuse } from '../../api/imaging/merge/fusion/fuse.ts';
import { fromRaw, toRaw, type RawPicture } from '../../api/imaging/upright.ts';
import { BRIDGE, expose, photographLight, type Scene } from '../support/exposures.ts';
import { averageOf, enfuse, likeness, openCvFused, openOpenCv } from '../support/fusion-oracles.ts';

/**
 * The definition is Mertens, Kautz, Van Reeth: Exposure Fusion (Pacific Graphics 2007). Checked against OpenCV's MergeMertens (npm
 * @techstark/opencv-js 4.12.0-release.1) under its conventions, and against Debian's enfuse 4.2, which adds its weights up
 * instead of multiplying them and is therefore the same for grey frames weighed by exposure alone.
 */
// Whole photographs are merged, and compared by tools that take their time.
vi.setConfig({ testTimeout: 120_000 });

const EXPOSURE_ALONE = { contrast: 0, saturation: 0 };
let scene: Scene;
let frames: RawPicture[];

const place = (pictures: RawPicture[]) => pictures.map((picture) => ({ picture, shift: { x: 0, y: 0 }, patch: null }));
const fused = (pictures: RawPicture[], rule: FusionConventions) => fuse(place(pictures), rule);

function differences(one: ArrayLike<number>, other: ArrayLike<number>) {
  const counts = new Array<number>(256).fill(0);
  for (let at = 0; at < one.length; at++) counts[Math.abs((one[at] ?? 0) - (other[at] ?? 0))]!++;
  const within = (levels: number) => counts.slice(0, levels + 1).reduce((sum, count) => sum + count, 0) / one.length;
  return { most: counts.findLastIndex((count) => count > 0), within };
}

beforeAll(async () => {
  scene = await photographLight(BRIDGE, 1400, { left: 100, top: 40, width: 1066, height: 711 });
  frames = [-4, -2, 0, 2, 4].map((ev, index) => expose(scene, ev, index + 1));
  await openOpenCv();
});

describe("OpenCV's MergeMertens, under its conventions", () => {
  it('weighed by exposure alone: not a grey level apart', () => {
    const { most } = differences(fused(frames, { ...OPENCV, ...EXPOSURE_ALONE }), openCvFused(frames, [0, 0, 1]));
    expect(most).toBeLessThanOrEqual(1);
  });

  it('with all three measures: two grey levels at most', () => {
    // White in every frame, pixels have no contrast and no colour at all: 1e-12 decides there, and floats of other roundings differ.
    const noisy = [-4, -3, -2, -1, 0].map((ev, index) => expose(scene, ev, index + 1));
    const { most, within } = differences(fused(noisy, OPENCV), openCvFused(noisy, [1, 1, 1]));
    expect(most).toBeLessThanOrEqual(2);
    expect(within(1)).toBeGreaterThanOrEqual(0.999);
  });

  it.each([
    [64, 48],
    [33, 47],
    [101, 8],
  ])('on %i × %i pixels too', async (width, height) => {
    const small = await Promise.all(frames.map((frame) => toRaw(fromRaw(frame).extract({ left: 300, top: 200, width, height }))));
    expect(differences(fused(small, { ...OPENCV, ...EXPOSURE_ALONE }), openCvFused(small, [0, 0, 1])).most).toBeLessThanOrEqual(1);
  });

  it('other exponents, by powers', () => {
    const noisy = [-3, -2, -1].map((ev, index) => expose(scene, ev, index + 1));
    const rule = { ...OPENCV, contrast: 0.5, saturation: 2, exposedness: 1.5 };
    expect(differences(fused(noisy, rule), openCvFused(noisy, [0.5, 2, 1.5])).within(2)).toBeGreaterThanOrEqual(0.999);
  });
});

describe('enfuse', () => {
  it('grey frames weighed by exposure alone, seven levels: the same but for its dither', async () => {
    const grey = frames.map((frame) => ({ ...frame, data: Buffer.from(frame.data.map((_, at) => frame.data[at - (at % 3) + 1] ?? 0)) }));
    const rule = { ...PAPER, ...EXPOSURE_ALONE, levels: () => 7 };
    // One weight for grey where the paper multiplies three: 0.2 / √3.
    const weights = ['--exposure-weight=1', '--saturation-weight=0', '--contrast-weight=0', '--exposure-width=0.11547005', '--levels=7'];
    const [ours, theirs] = [fused(grey, rule), await enfuse(grey, weights)];
    const { most, within } = differences(ours, theirs);
    expect(most).toBeLessThanOrEqual(4);
    expect(within(1)).toBeGreaterThanOrEqual(0.99);
    expect(likeness(ours, theirs, scene)).toBeGreaterThanOrEqual(0.998);
    expect(likeness(fused(grey, { ...rule, levels: () => 5 }), theirs, scene)).toBeLessThan(0.998);
  });

  it('in colour the merged proof is nearer to both than the average and than the best single frame', async () => {
    const exposures: Exposure[] = frames.map((picture, index) => ({ picture, ev: 2 * index - 4 }));
    const ours = mergeExposures(exposures, 2).picture.data;
    const average = averageOf(frames);
    for (const theirs of [await enfuse(frames, []), openCvFused(frames, [1, 1, 1])]) {
      const found = likeness(ours, theirs, scene);
      const single = Math.max(...frames.map(({ data }) => likeness(data, theirs, scene)));
      expect(found).toBeGreaterThanOrEqual(0.93);
      expect(found).toBeGreaterThan(likeness(average, theirs, scene) + 0.02);
      expect(found).toBeGreaterThan(single + 0.02);
    }
  });
});

describe('flat frames, by arithmetic', () => {
  const flat = (colours: [number, number, number][], width: number, height: number): RawPicture[] =>
    colours.map((colour) => ({
      data: Buffer.from(Array.from({ length: width * height }, () => colour).flat()),
      width,
      height,
      channels: 3,
    }));
  const grey = (...values: number[]) => values.map((value): [number, number, number] => [value, value, value]);

  it.each([
    // E(64) 0.097744, E(128) 0.999856, E(192) 0.090789, each of three equal colours.
    [grey(64, 128, 192), 127.62542],
    [grey(20, 60, 140, 220, 250), 134.63326],
  ])('exposure alone: %j', (colours, wanted) => {
    for (const [width, height] of [
      [64, 64],
      [7, 31],
      [1, 1],
      [130, 3],
    ] as const) {
      for (const value of fused(flat(colours, width, height), { ...PAPER, ...EXPOSURE_ALONE })) expect(value).toBe(Math.round(wanted));
    }
  });

  it('weighed by saturation alone: 0.244553 for 200, 100, 50, and sqrt(2)/3 for pure red', () => {
    const rule = { ...PAPER, contrast: 0, exposedness: 0 };
    const share = 0.244553 / (0.244553 + Math.SQRT2 / 3);
    const [red, green, blue] = fused(
      flat(
        [
          [200, 100, 50],
          [255, 0, 0],
        ],
        16,
        16,
      ),
      rule,
    );
    expect([red, green, blue]).toEqual([Math.round(200 * share + 255 * (1 - share)), Math.round(100 * share), Math.round(50 * share)]);
  });

  it('weighed by exposure alone: 0.099221 for 200, 100, 50 against 0.999856 for grey 128', () => {
    const share = 0.099221 / (0.099221 + 0.999856);
    const mixed = [200, 100, 50].map((value) => Math.round(value * share + 128 * (1 - share)));
    expect(
      [
        ...fused(
          flat(
            [
              [200, 100, 50],
              [128, 128, 128],
            ],
            16,
            16,
          ),
          { ...PAPER, ...EXPOSURE_ALONE },
        ),
      ].slice(0, 3),
    ).toEqual(mixed);
  });

  it('frames without any colour are not averaged: saturation is left out for them', () => {
    const exposures = flat(grey(64, 128, 192), 64, 64).map((picture, index) => ({ picture, ev: index }));
    const noise = exposures.map(({ picture }, index) => {
      for (let at = 0; at < picture.data.length; at += 3)
        picture.data.fill((picture.data[at] ?? 0) + ((at / 3 + index) % 3) - 1, at, at + 3);
      return picture;
    });
    const merged = mergeExposures(
      noise.map((picture, index) => ({ picture, ev: index })),
      1,
      { align: false, deghost: false },
    );
    const mean = merged.picture.data.reduce((sum, value) => sum + value, 0) / merged.picture.data.length;
    expect(Math.abs(mean - 127.6)).toBeLessThan(1.5);
  });
});
