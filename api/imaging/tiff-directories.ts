import type { FileHandle } from 'node:fs/promises';

/** A span of a file, in bytes. */
export interface Span {
  offset: number;
  length: number;
}
/** One image file directory (TIFF 6.0, section 2), reduced to what tells raw files and their previews apart. */
export interface TiffDirectory {
  width: number;
  height: number;
  compression: number;
  photometric: number;
  orientation: number;
  isDng: boolean;
  /** A JPEG that stands in the file as a whole, by the tags 513 and 514. */
  jpeg: Span | null;
  /** Where strips and tiles lie. */
  pieces: Span[];
}

const MOST_DIRECTORIES = 64;
const MOST_ENTRIES = 1024;
const MOST_VALUES = 1_000_000;
const TYPE_BYTES: Record<number, number> = { 1: 1, 2: 1, 3: 2, 4: 4, 6: 1, 7: 1, 8: 2, 9: 4, 13: 4 };
const TAG = { width: 256, height: 257, compression: 259, photometric: 262, orientation: 274, subDirectories: 330, dngVersion: 50706 };
const SPANS = { strips: [273, 279], tiles: [324, 325], jpeg: [513, 514] } as const;
/** Some raw files keep the whole preview as the value of this tag of their first directory. */
const PREVIEW_AS_VALUE = 0x2e;

/** Reads a TIFF file's directories at random, whatever it claims: every jump is checked against the file's length. */
class DirectoryReader {
  readonly found: TiffDirectory[] = [];
  readonly #seen = new Set<number>();

  constructor(
    private readonly file: FileHandle,
    private readonly size: number,
    private readonly little: boolean,
  ) {}

  async walk(first: number): Promise<void> {
    const waiting = [first];
    while (waiting.length > 0 && this.found.length < MOST_DIRECTORIES) {
      const offset = waiting.shift() ?? 0;
      if (offset < 8 || this.#seen.has(offset)) continue;
      this.#seen.add(offset);
      waiting.push(...(await this.#directory(offset)));
    }
  }

  /** Reads one directory and returns the offsets of those it leads to. */
  async #directory(offset: number): Promise<number[]> {
    const start = await this.#bytes(offset, 2);
    if (!start) return [];
    const count = Math.min(this.#number(start, 0, 2), MOST_ENTRIES);
    const table = await this.#bytes(offset + 2, count * 12 + 4);
    if (!table) return [];
    const values = new Map<number, number[]>();
    for (let entry = 0; entry < count; entry++) await this.#entry(table.subarray(entry * 12, entry * 12 + 12), values);
    this.found.push(this.#describe(values));
    return [...(values.get(TAG.subDirectories) ?? []), this.#number(table, count * 12, 4)];
  }

  async #entry(entry: Buffer, values: Map<number, number[]>): Promise<void> {
    const tag = this.#number(entry, 0, 2);
    const bytes = TYPE_BYTES[this.#number(entry, 2, 2)];
    const count = this.#number(entry, 4, 4);
    const offset = this.#number(entry, 8, 4);
    if (tag === PREVIEW_AS_VALUE) return void values.set(tag, [offset, count]);
    const wanted = Object.values(TAG).includes(tag) || Object.values(SPANS).some((pair) => (pair as readonly number[]).includes(tag));
    if (!wanted || !bytes || count > MOST_VALUES) return;
    const data = bytes * count <= 4 ? entry.subarray(8, 12) : await this.#bytes(offset, bytes * count);
    if (data)
      values.set(
        tag,
        Array.from({ length: count }, (_, index) => this.#number(data, index * bytes, bytes)),
      );
  }

  #describe(values: Map<number, number[]>): TiffDirectory {
    const one = (tag: number) => values.get(tag)?.[0] ?? 0;
    const spans = ([offsets, lengths]: readonly [number, number]): Span[] =>
      (values.get(offsets) ?? []).map((offset, index) => ({ offset, length: values.get(lengths)?.[index] ?? 0 }));
    const [asValueOffset, asValueLength] = values.get(PREVIEW_AS_VALUE) ?? [];
    const asValue = asValueOffset !== undefined && asValueLength ? { offset: asValueOffset, length: asValueLength } : null;
    return {
      width: one(TAG.width),
      height: one(TAG.height),
      compression: one(TAG.compression),
      photometric: one(TAG.photometric),
      orientation: one(TAG.orientation),
      isDng: values.has(TAG.dngVersion),
      jpeg: spans(SPANS.jpeg)[0] ?? asValue,
      pieces: [...spans(SPANS.strips), ...spans(SPANS.tiles)],
    };
  }

  #number(data: Buffer, offset: number, bytes: number): number {
    return this.little ? data.readUIntLE(offset, bytes) : data.readUIntBE(offset, bytes);
  }

  async #bytes(offset: number, length: number): Promise<Buffer | null> {
    if (offset + length > this.size) return null;
    const { buffer, bytesRead } = await this.file.read(Buffer.alloc(length), 0, length, offset);
    return bytesRead === length ? buffer : null;
  }
}

/** Every directory of a TIFF-based file, sub-directories among them; empty for BigTIFF, which no raw file uses. */
export async function readTiffDirectories(file: FileHandle): Promise<TiffDirectory[]> {
  const { size } = await file.stat();
  if (size < 8) return [];
  const { buffer: head } = await file.read(Buffer.alloc(8), 0, 8, 0);
  const little = head[0] === 0x49;
  if (head[2] === 0x2b || head[3] === 0x2b) return [];
  const reader = new DirectoryReader(file, size, little);
  await reader.walk(little ? head.readUInt32LE(4) : head.readUInt32BE(4));
  return reader.found;
}
