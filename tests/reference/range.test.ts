import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { contentRange, readRange, unsatisfiedRange } from '../../api/domain/byte-ranges.ts';

const WHOLE = { kind: 'whole' };
const NONE = { kind: 'unsatisfiable' };
const ranges = (...pairs: [number, number][]) => ({ kind: 'ranges', ranges: pairs.map(([start, end]) => ({ start, end })) });

describe('Range against 1000 bytes (RFC 9110 §14.1.2, §14.2, §15.5.17)', () => {
  it.each([
    [undefined, WHOLE],
    ['bytes=0-499', ranges([0, 499])],
    ['bytes=500-', ranges([500, 999])],
    ['bytes=-500', ranges([500, 999])],
    ['bytes=900-2000', ranges([900, 999])],
    ['bytes=0-0', ranges([0, 0])],
    ['bytes=-1', ranges([999, 999])],
    ['bytes=-5000', ranges([0, 999])],
    ['bytes=1000-', NONE],
    ['bytes=1000-1001', NONE],
    ['bytes=-0', NONE],
    ['bytes=500-20', WHOLE],
    ['bytes=abc-', WHOLE],
    ['bytes=-', WHOLE],
    ['bytes=', WHOLE],
    ['bytes', WHOLE],
    ['bytes=0x1-5', WHOLE],
    ['bytes=1.5-3', WHOLE],
    ['items=0-5', WHOLE],
    ['BYTES=0-5', ranges([0, 5])],
    ['bytes=0-1,2000-3000', ranges([0, 1])],
    ['bytes=0-0,-1', ranges([0, 0], [999, 999])],
    ['bytes= 0-0 , , 5-6', ranges([0, 0], [5, 6])],
    ['bytes=5-6,0-1', ranges([5, 6], [0, 1])],
    ['bytes=0-1,abc', WHOLE],
    ['bytes=99999999999999999999999999-', NONE],
    ['bytes=0-99999999999999999999999999', ranges([0, 999])],
    ['bytes=-99999999999999999999999999', ranges([0, 999])],
    ['bytes=000000000000000000000001-2', ranges([1, 2])],
  ])('%s', (header, expected) => {
    expect(readRange(header, 1000)).toEqual(expected);
  });

  it('ignores more than two overlapping and very many ranges (§14.2, §17.15)', () => {
    expect(readRange('bytes=0-,0-,0-,0-', 1000)).toEqual(WHOLE);
    expect(readRange(`bytes=${Array.from({ length: 17 }, (_, i) => `${i * 10}-${i * 10}`).join(',')}`, 1000)).toEqual(WHOLE);
    expect(readRange(`bytes=${Array.from({ length: 16 }, (_, i) => `${i * 10}-${i * 10}`).join(',')}`, 1000).kind).toBe('ranges');
  });

  it('of an empty file satisfies nothing', () => {
    expect(readRange('bytes=0-', 0)).toEqual(NONE);
    expect(readRange('bytes=-5', 0)).toEqual(NONE);
  });

  it('writes Content-Range as the examples of §14.4 and §15.5.17', () => {
    expect(contentRange({ start: 21010, end: 47021 }, 47022)).toBe('bytes 21010-47021/47022');
    expect(unsatisfiedRange(47022)).toBe('bytes */47022');
  });
});

describe('for any header', () => {
  it('never gives a range outside the file', () => {
    const spec = fc.oneof(
      fc.string({ maxLength: 8 }),
      fc.tuple(fc.nat(3000), fc.nat(3000)).map(([a, b]) => `${a}-${b}`),
      fc.nat(3000).map((n) => `-${n}`),
    );
    fc.assert(
      fc.property(fc.array(spec, { maxLength: 5 }), fc.nat(2000), (specs, length) => {
        const read = readRange(`bytes=${specs.join(',')}`, length);
        if (read.kind !== 'ranges') return;
        for (const { start, end } of read.ranges) expect(start >= 0 && start <= end && end < length).toBe(true);
      }),
      { numRuns: 1000 },
    );
  });
});
