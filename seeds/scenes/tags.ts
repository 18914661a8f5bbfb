/** One entry of a TIFF directory, as TIFF 6.0 and Exif 2.32 define them. Numbers of rationals come in pairs. */
export interface Tag {
  tag: number;
  type: 'byte' | 'ascii' | 'short' | 'long' | 'rational' | 'srational' | 'undefined';
  value: string | readonly number[];
}

const CODES = { byte: 1, ascii: 2, short: 3, long: 4, rational: 5, undefined: 7, srational: 10 } as const;

function bytesOf({ type, value }: Tag): Buffer {
  if (typeof value === 'string') return Buffer.from(type === 'ascii' ? `${value}\0` : value, 'latin1');
  const wide = type === 'short' ? 2 : type === 'undefined' || type === 'byte' ? 1 : 4;
  const bytes = Buffer.alloc(value.length * wide);
  value.forEach((n, i) => {
    if (wide === 1) bytes.writeUInt8(n, i);
    else if (wide === 2) bytes.writeUInt16LE(n, i * 2);
    else if (type === 'srational') bytes.writeInt32LE(n, i * 4);
    else bytes.writeUInt32LE(n, i * 4);
  });
  return bytes;
}

function countOf({ type, value }: Tag, bytes: Buffer): number {
  if (typeof value === 'string' || type === 'undefined') return bytes.length;
  return type === 'rational' || type === 'srational' ? value.length / 2 : value.length;
}

/** An entry that already stands in a file: twelve bytes that stay as they are. */
export type RawEntry = Buffer;

/**
 * A directory and its values, little-endian, to stand at `offset` from the start of the TIFF structure. Entries are sorted
 * by tag, as TIFF 6.0 asks.
 */
export function directory(tags: readonly Tag[], offset: number, raw: readonly RawEntry[] = []): Buffer {
  const taken = new Set(tags.map((tag) => tag.tag));
  const kept = raw.filter((entry) => !taken.has(entry.readUInt16LE(0)));
  const total = tags.length + kept.length;
  const values: Buffer[] = [];
  let at = offset + 2 + total * 12 + 4;
  const entries = tags.map((tag) => {
    const bytes = bytesOf(tag);
    const entry = Buffer.alloc(12);
    entry.writeUInt16LE(tag.tag, 0);
    entry.writeUInt16LE(CODES[tag.type], 2);
    entry.writeUInt32LE(countOf(tag, bytes), 4);
    if (bytes.length <= 4) bytes.copy(entry, 8);
    else {
      entry.writeUInt32LE(at, 8);
      const even = bytes.length % 2 ? Buffer.concat([bytes, Buffer.alloc(1)]) : bytes;
      values.push(even);
      at += even.length;
    }
    return entry;
  });
  const head = Buffer.alloc(2);
  head.writeUInt16LE(total, 0);
  const sorted = [...entries, ...kept].sort((a, b) => a.readUInt16LE(0) - b.readUInt16LE(0));
  return Buffer.concat([head, ...sorted, Buffer.alloc(4), ...values]);
}
