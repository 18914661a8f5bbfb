/** Bytes from `start` to `end`, both included, as RFC 9110 §14 counts them. */
export interface ByteRange {
  start: number;
  end: number;
}

/** What a Range header asks of a representation. `whole`: answer 200 as if the header were absent. */
export type RangeRequest = { kind: 'whole' } | { kind: 'unsatisfiable' } | { kind: 'ranges'; ranges: ByteRange[] };

/** More ranges than this are answered with the whole (RFC 9110 §14.2 lets a server ignore such requests, §17.15 says why). */
export const MAX_RANGES = 16;

const WHOLE: RangeRequest = { kind: 'whole' };

/** Digits may be longer than a number holds; beyond 15 of them the position is past every file anyway. */
function position(digits: string): number {
  const significant = digits.replace(/^0+(?=\d)/, '');
  return significant.length > 15 ? Number.MAX_SAFE_INTEGER : Number(significant);
}

/** One range-spec: a range, null where it cannot be satisfied, undefined where it is not valid syntax. */
function readSpec(spec: string, length: number): ByteRange | null | undefined {
  const match = /^(\d*)-(\d*)$/.exec(spec);
  if (!match || spec === '-') return undefined;
  const [, first = '', last = ''] = match;
  if (first === '') {
    const suffix = position(last);
    return suffix === 0 || length === 0 ? null : { start: Math.max(0, length - suffix), end: length - 1 };
  }
  const start = position(first);
  const end = last === '' ? Number.MAX_SAFE_INTEGER : position(last);
  if (end < start) return undefined;
  return start >= length ? null : { start, end: Math.min(end, length - 1) };
}

function overlaps(ranges: readonly ByteRange[]): number {
  const sorted = [...ranges].sort((a, b) => a.start - b.start);
  return sorted.filter((range, index) => index > 0 && range.start <= (sorted[index - 1]?.end ?? -1)).length;
}

/**
 * Reads a Range header against a representation of `length` bytes (RFC 9110 §14.1.1, §14.1.2, §14.2). Unknown units and
 * invalid specs are ignored (`whole`); ranges that cannot be satisfied are dropped, and where none is left the answer is
 * `unsatisfiable` (416). A suffix longer than the file means all of it. More than 16 ranges, or more than two that
 * overlap, are ignored. The order asked for is kept.
 */
export function readRange(header: string | undefined, length: number): RangeRequest {
  const match = /^bytes=(.*)$/i.exec(header?.trim() ?? '');
  if (!match) return WHOLE;
  // Empty elements of a list are legal (RFC 9110 §5.6.1.2).
  const specs = (match[1] ?? '')
    .split(',')
    .map((spec) => spec.trim())
    .filter((spec) => spec !== '');
  if (specs.length === 0 || specs.length > MAX_RANGES) return WHOLE;
  const read = specs.map((spec) => readSpec(spec, length));
  if (read.includes(undefined)) return WHOLE;
  const ranges = read.filter((range): range is ByteRange => range !== null && range !== undefined);
  if (ranges.length === 0) return { kind: 'unsatisfiable' };
  return overlaps(ranges) > 2 ? WHOLE : { kind: 'ranges', ranges };
}

/** Content-Range of one part: "bytes 0-499/1000" (RFC 9110 §14.4). */
export function contentRange({ start, end }: ByteRange, length: number): string {
  return `bytes ${start}-${end}/${length}`;
}

/** Content-Range of a 416: "bytes *\/1000". */
export function unsatisfiedRange(length: number): string {
  return `bytes */${length}`;
}
