import sharp from 'sharp';
import { describe, expect, it, vi } from 'vitest';
import { mergeExposures } from '../../api/imaging/merge/merge-exposures.ts';
import { fromRaw, toRaw } from '../../api/imaging/upright.ts';
import { BRIDGE, expose, photographLight, SUNSET } from '../support/exposures.ts';

// Whole photographs are merged, several in some of the tests.
vi.setConfig({ testTimeout: 120_000 });

/** The truth is how the exposures were cut out of one photograph. */
const STOPS = [-4, -2, 0, 2, 4];
/** Large enough that movement is looked for in a smaller copy first. */
const size = { width: 1320, height: 880 };

async function moved(file: string, shifts: [number, number][], stops = STOPS) {
  return Promise.all(
    stops.map(async (ev, index) => {
      const [x, y] = shifts[index] ?? [0, 0];
      return { ev, picture: expose(await photographLight(file, 1800, { left: 60 - x, top: 50 - y, ...size }), ev, index, 0.001) };
    }),
  );
}

function cut(data: Buffer, box: { left: number; top: number; width: number; height: number }): Promise<Buffer> {
  return sharp(data, { raw: { ...size, channels: 3 } })
    .extract(box)
    .raw()
    .toBuffer();
}

const meansOf = (data: Buffer) =>
  [0, 1, 2].map((colour) => data.reduce((sum, value, at) => (at % 3 === colour ? sum + value : sum), 0) / (data.length / 3));

describe('frames that are moved against each other', () => {
  it.each([
    ['a bridge', BRIDGE],
    ['a sunset', SUNSET],
  ])('are found to the pixel up to 32 pixels: %s', async (_, file) => {
    const truth: [number, number][] = [
      [-32, 30],
      [7, -5],
      [0, 0],
      [-13, 32],
      [20, 10],
    ];
    // Further over, hardly anything of the bridge is not white.
    const { shifts, leftOut } = mergeExposures(await moved(file, truth, [-4, -2, 0, 1, 2]), 2);
    expect(leftOut).toEqual([]);
    shifts.forEach(({ x, y }, index) => {
      expect(Math.abs(x - (truth[index]?.[0] ?? NaN)), `x of ${index}: ${JSON.stringify(shifts)}`).toBeLessThanOrEqual(1);
      expect(Math.abs(y - (truth[index]?.[1] ?? NaN)), `y of ${index}: ${JSON.stringify(shifts)}`).toBeLessThanOrEqual(1);
    });
  });

  it('stay where they are on a tripod, however white or black they are', async () => {
    const { shifts, leftOut } = mergeExposures(await moved(BRIDGE, [], [-8, -4, 0, 4, 8]), 2);
    expect({ shifts, leftOut }).toEqual({ shifts: STOPS.map(() => ({ x: 0, y: 0 })), leftOut: [] });
  });

  it('leave no black edge', async () => {
    const shifts: [number, number][] = [
      [0, 0],
      [30, 30],
      [0, 0],
      [-30, -30],
    ];
    const { picture } = mergeExposures(await moved(SUNSET, shifts, [-2, -1, 0, 1]), 2);
    const whole = mergeExposures(await moved(SUNSET, [], [-2, -1, 0, 1]), 2).picture;
    for (const [left, top] of [
      [0, 0],
      [size.width - 30, size.height - 30],
    ] as const) {
      const corner = { left, top, width: 30, height: 30 };
      const [found, wanted] = [await cut(picture.data, corner), await cut(whole.data, corner)];
      meansOf(found).forEach((mean, colour) => expect(Math.abs(mean - (meansOf(wanted)[colour] ?? NaN))).toBeLessThan(25));
    }
  });
});

describe('a frame that cannot be laid over the others', () => {
  it('is left out and named: turned, another picture, another size', async () => {
    const frames = await moved(BRIDGE, [], [-2, -1, 0, 1]);
    const turned = fromRaw(frames[1]!.picture).rotate(1.2).resize(size.width, size.height, { fit: 'cover' });
    const [other] = await moved(SUNSET, [], [1]);
    const pictures = [frames[0]!, { ev: -1, picture: await toRaw(turned) }, frames[2]!, other!];
    const small = { ev: 0, picture: await toRaw(fromRaw(frames[2]!.picture).resize(600)) };
    expect(mergeExposures([...pictures, small], 2).leftOut).toEqual([
      { index: 1, why: 'moved' },
      { index: 3, why: 'moved' },
      { index: 4, why: 'size' },
    ]);
  });
});

describe('somebody who walks through', () => {
  /** A figure in a brown weave, of tones and edges that count for much in every exposure. */
  function withFigure(frames: Awaited<ReturnType<typeof moved>>, index: number, left: number) {
    const { picture } = frames[index]!;
    for (let y = 430; y < 560; y++)
      picture.data.fill(Buffer.from([180, 120, 70, 120, 80, 50]), (y * size.width + left) * 3, (y * size.width + left + 40) * 3);
  }
  const box = (left: number) => ({ left: left + 4, top: 434, width: 32, height: 122 });
  async function difference(one: Buffer, two: Buffer, left: number) {
    const [first, second] = [await cut(one, box(left)), await cut(two, box(left))];
    return first.reduce((sum, value, at) => sum + Math.abs(value - (second[at] ?? 0)), 0) / first.length;
  }

  it('stands in the picture once, where the lead frame has them', async () => {
    const clean = await moved(BRIDGE, [], [-1, 0, 1]);
    const frames = await moved(BRIDGE, [], [-1, 0, 1]);
    withFigure(frames, 0, 300);
    withFigure(frames, 1, 560);
    withFigure(frames, 2, 820);
    const found = mergeExposures(frames, 1).picture.data;
    const ghosts = mergeExposures(frames, 1, { deghost: false }).picture.data;
    const wanted = mergeExposures(clean, 1).picture.data;
    for (const left of [300, 820]) {
      const [after, before] = [await difference(found, wanted, left), await difference(ghosts, wanted, left)];
      expect(before).toBeGreaterThan(15);
      expect(after).toBeLessThan(before / 4);
    }
    // The lead frame's own figure stands there, as brown as it was.
    const [red, , blue] = meansOf(await cut(found, box(560)));
    expect((red ?? 0) - (blue ?? 0)).toBeGreaterThan(50);
  });

  it('changes next to nothing where nothing moves', async () => {
    const frames = await moved(BRIDGE, [], [-2, 0, 2]);
    const [one, two] = [mergeExposures(frames, 1).picture.data, mergeExposures(frames, 1, { deghost: false }).picture.data];
    const different = one.reduce((count, value, at) => count + (Math.abs(value - (two[at] ?? 0)) > 3 ? 1 : 0), 0);
    expect(different / one.length).toBeLessThan(0.002);
  });
});
