import { describe, expect, it } from 'vitest';
import { type AlikeFrame, findAlike } from '../../api/domain/alike.ts';
import { CLIPPED, markClipped, paintClipped } from '../../api/domain/clipping.ts';

const frame = (id: string, hash: string | null, rest: Partial<AlikeFrame> = {}): AlikeFrame => ({
  id,
  hash,
  sharpness: null,
  bracketId: null,
  ...rest,
});
const ids = (frames: AlikeFrame[], bits = 6) => findAlike(frames, bits).map(({ frameIds }) => frameIds);

describe('near-doubles', () => {
  it('differ in at most so many bits of 64', () => {
    // 6 bits apart, 7 bits apart.
    expect(ids([frame('a', '0000000000000000'), frame('b', '000000000000003f')])).toEqual([['a', 'b']]);
    expect(ids([frame('a', '0000000000000000'), frame('b', '000000000000007f')])).toEqual([]);
    expect(ids([frame('a', 'e000000000000000'), frame('b', '0000000000000007')])).toEqual([['a', 'b']]);
    expect(ids([frame('a', '0000000000000000'), frame('b', '000000000000007f')], 7)).toEqual([['a', 'b']]);
    expect(ids([frame('a', 'ab'.repeat(8)), frame('b', 'ab'.repeat(8))], 0)).toEqual([['a', 'b']]);
  });

  it('come with what is alike with them, in the order given', () => {
    const frames = [
      frame('z', 'ffffffffffffffff'),
      frame('c', '0000000000000fff'),
      frame('a', '0000000000000000'),
      frame('y', 'fffffffffffffff0'),
      frame('b', '000000000000003f'),
      frame('alone', '5555aaaa5555aaaa'),
    ];
    expect(ids(frames)).toEqual([
      ['z', 'y'],
      ['c', 'a', 'b'],
    ]);
  });

  it('name the sharpest and the softest of single frames', () => {
    const [group] = findAlike(
      [
        frame('a', '00'.repeat(8), { sharpness: 1.4 }),
        frame('b', '00'.repeat(8), { sharpness: 2 }),
        frame('c', '00'.repeat(8), { sharpness: 0.3 }),
        frame('d', '00'.repeat(8)),
      ],
      6,
    );
    expect(group).toEqual({ frameIds: ['a', 'b', 'c', 'd'], sharpest: 'b', softest: 'c' });
  });

  it('are no frames of one bracket, which count as one', () => {
    const bracket = ['1', '2', '3'].map((id) => frame(id, '0000000000000000', { bracketId: 'B', sharpness: 1 }));
    expect(ids(bracket)).toEqual([]);
    const again = findAlike([...bracket, frame('single', '0000000000000001', { sharpness: 2 })], 6);
    expect(again).toEqual([{ frameIds: ['1', '2', '3', 'single'], sharpest: null, softest: null }]);
    const other = ['4', '5'].map((id) => frame(id, '0000000000000003', { bracketId: 'C' }));
    expect(ids([...bracket, ...other])).toEqual([['1', '2', '3', '4', '5']]);
  });

  it('hold with a bracket by any of its exposures', () => {
    const dark = frame('dark', 'ffffffff00000000', { bracketId: 'B' });
    const bright = frame('bright', '00000000ffffffff', { bracketId: 'B' });
    expect(ids([dark, frame('single', '00000000fffffffe'), bright])).toEqual([['dark', 'single', 'bright']]);
  });

  it('are not found without a hash, nor in nothing', () => {
    expect(ids([frame('a', null), frame('b', null), frame('c', '00'.repeat(8))])).toEqual([]);
    expect(ids([])).toEqual([]);
  });

  it('are found among ten thousand frames: exactly the pairs that were planted', () => {
    // Numbers of a linear congruence, by Knuth's constants; two of them are near by chance with odds of less than one in a thousand.
    let state = 42n;
    const next = () => (state = (state * 6364136223846793005n + 1442695040888963407n) & 0xffffffffffffffffn);
    const hex = (value: bigint) => value.toString(16).padStart(16, '0');
    const mixed = (value: bigint) => ((value ^ (value >> 29n)) * 0x9e3779b97f4a7c15n) & 0xffffffffffffffffn;
    const frames = Array.from({ length: 9_900 }, (_, i) => frame(`f${i}`, hex(mixed(next()))));
    const doubles = frames
      .slice(0, 100)
      .map(({ hash }, i) => frame(`d${i}`, hex(BigInt(`0x${hash}`) ^ (0b10000100001n << BigInt(i % 50)))));
    const groups = ids([...frames, ...doubles]);
    expect(groups).toEqual(doubles.map((_, i) => [`f${i}`, `d${i}`]));
  });
});

describe('the mask of what is clipped', () => {
  const rgba = Uint8ClampedArray.from([
    255, 255, 255, 0, 255, 10, 10, 255, 0, 0, 0, 255, 100, 0, 100, 255, 120, 120, 120, 255, 253, 254, 253, 255, 252, 252, 252, 255, 2, 1, 2,
    9, 3, 3, 3, 255,
  ]);

  it('marks each pixel of a canvas, whatever its alpha', () => {
    const { anyHigh, allHigh, anyLow, allLow } = CLIPPED;
    expect([...markClipped(rgba, 4)]).toEqual([
      anyHigh | allHigh,
      anyHigh,
      anyLow | allLow,
      anyLow,
      0,
      anyHigh | allHigh,
      0,
      anyLow | allLow,
      0,
    ]);
  });

  it('is the same for three channels, and for other limits', () => {
    const rgb = Uint8Array.from(rgba.filter((_, at) => at % 4 !== 3));
    expect(markClipped(rgb, 3)).toEqual(markClipped(rgba, 4));
    expect([...markClipped(rgba, 4, { high: 256, low: -1 })]).toEqual(Array(9).fill(0));
  });

  it('is painted: lost light full, lost colour pale, black in its own colour, the rest transparent', () => {
    const painted = paintClipped(markClipped(rgba, 4), { allHigh: [1, 2, 3, 255], someHigh: [1, 2, 3, 99], allLow: [7, 8, 9, 255] });
    const pixels = Array.from({ length: 9 }, (_, at) => [...painted.subarray(at * 4, at * 4 + 4)]);
    const clear = [0, 0, 0, 0];
    expect(pixels).toEqual([[1, 2, 3, 255], [1, 2, 3, 99], [7, 8, 9, 255], clear, clear, [1, 2, 3, 255], clear, [7, 8, 9, 255], clear]);
    expect(paintClipped(markClipped(rgba, 4), { allHigh: null, someHigh: null, allLow: null }).every((value) => value === 0)).toBe(true);
  });
});
