import { randomBytes } from 'node:crypto';
import { contentRange, type ByteRange } from '../../domain/byte-ranges.ts';

/** One span of an object with what is written before it. */
export interface Part {
  before: string;
  range: ByteRange;
}

/** The body of an answer as spans of the object. */
export interface Parts {
  partial: boolean;
  /** Set where several ranges travel as multipart/byteranges (RFC 9110 §14.6). */
  boundary: string | null;
  list: Part[];
  after: string;
  /** Bytes of the whole body. */
  length: number;
}

const spanLength = ({ start, end }: ByteRange) => end - start + 1;

/** Lays out the body: the whole object (`ranges` null), one range, or several with a boundary between them. */
export function partsOf(ranges: readonly ByteRange[] | null, object: { size: number; mediaType: string }): Parts {
  const spans = ranges ?? (object.size > 0 ? [{ start: 0, end: object.size - 1 }] : []);
  if (spans.length < 2) {
    const length = spans.reduce((sum, span) => sum + spanLength(span), 0);
    return { partial: ranges !== null, boundary: null, list: spans.map((range) => ({ before: '', range })), after: '', length };
  }
  const boundary = randomBytes(18).toString('hex');
  const list = spans.map((range) => ({
    range,
    before: `\r\n--${boundary}\r\nContent-Type: ${object.mediaType}\r\nContent-Range: ${contentRange(range, object.size)}\r\n\r\n`,
  }));
  const after = `\r\n--${boundary}--\r\n`;
  const length = list.reduce((sum, part) => sum + part.before.length + spanLength(part.range), after.length);
  return { partial: true, boundary, list, after, length };
}
