/** A value of a directory's entry: numbers as SHORT or LONG, bytes as BYTE or UNDEFINED. */
export interface Entry {
  tag: number;
  type: 1 | 3 | 4 | 7;
  values: number[];
}
export interface Directory {
  entries: Entry[];
  /** Pixels of one strip. */
  strip?: Buffer;
  /** A JPEG by the tags 513 and 514. */
  jpeg?: Buffer;
  /** Directories that tag 330 leads to. */
  children?: Directory[];
}

const BYTES = { 1: 1, 3: 2, 4: 4, 7: 1 };

/**
 * Writes a little-endian TIFF (TIFF 6.0, section 2) from directories, so that tests can make raw files that no library
 * writes. Data comes before the directory that names it.
 */
export function buildTiff(directory: Directory): Buffer {
  const chunks: Buffer[] = [Buffer.from('49492a0000000000', 'hex')];
  let end = 8;
  const append = (bytes: Buffer): number => {
    const padding = Buffer.alloc(end % 2);
    const at = end + padding.length;
    chunks.push(padding, bytes);
    end = at + bytes.length;
    return at;
  };
  const write = ({ entries, strip, jpeg, children = [] }: Directory): number => {
    const all = [...entries];
    const long = (tag: number, ...values: number[]) => all.push({ tag, type: 4, values });
    if (strip) long(273, append(strip));
    if (strip) long(279, strip.length);
    if (jpeg) long(513, append(jpeg));
    if (jpeg) long(514, jpeg.length);
    if (children.length > 0) long(330, ...children.map(write));
    const table = Buffer.alloc(2 + all.length * 12 + 4);
    table.writeUInt16LE(all.length);
    all.sort((a, b) => a.tag - b.tag).forEach((entry, index) => writeEntry(table, 2 + index * 12, entry, append));
    return append(table);
  };
  const first = write(directory);
  const file = Buffer.concat(chunks);
  file.writeUInt32LE(first, 4);
  return file;
}

function writeEntry(table: Buffer, at: number, { tag, type, values }: Entry, append: (bytes: Buffer) => number): void {
  const size = BYTES[type];
  const data = Buffer.alloc(Math.max(4, size * values.length));
  values.forEach((value, index) => data.writeUIntLE(value, index * size, size));
  table.writeUInt16LE(tag, at);
  table.writeUInt16LE(type, at + 2);
  table.writeUInt32LE(values.length, at + 4);
  if (data.length === 4) data.copy(table, at + 8);
  else table.writeUInt32LE(append(data), at + 8);
}

/** Entries of an ordinary picture directory. */
export function pictureEntries(values: {
  width: number;
  height: number;
  compression: number;
  photometric: number;
  subfile?: number;
  orientation?: number;
}): Entry[] {
  const { width, height, compression, photometric, subfile = 0, orientation } = values;
  return [
    { tag: 254, type: 4, values: [subfile] },
    { tag: 256, type: 4, values: [width] },
    { tag: 257, type: 4, values: [height] },
    { tag: 258, type: 3, values: [8] },
    { tag: 259, type: 3, values: [compression] },
    { tag: 262, type: 3, values: [photometric] },
    { tag: 277, type: 3, values: [photometric === 32803 ? 1 : 3] },
    { tag: 278, type: 4, values: [height] },
    ...(orientation ? [{ tag: 274, type: 3 as const, values: [orientation] }] : []),
  ];
}

/** A DNG with an unpacked sensor picture, a thumbnail and a JPEG preview, as converters write them. */
export function buildDng(preview: Buffer, options: { orientation?: number; sensor?: { width: number; height: number } } = {}): Buffer {
  const { orientation = 1, sensor = { width: 1400, height: 900 } } = options;
  const size = { width: 0, height: 0 };
  return buildTiff({
    entries: [
      ...pictureEntries({ width: 16, height: 12, compression: 1, photometric: 2, subfile: 1, orientation }),
      { tag: 50706, type: 1, values: [1, 4, 0, 0] },
      { tag: 50707, type: 1, values: [1, 1, 0, 0] },
    ],
    strip: Buffer.alloc(16 * 12 * 3, 90),
    children: [
      { entries: pictureEntries({ ...sensor, compression: 1, photometric: 32803 }), strip: Buffer.alloc(sensor.width * sensor.height, 60) },
      { entries: pictureEntries({ ...size, width: 1200, height: 800, compression: 7, photometric: 6, subfile: 1 }), strip: preview },
    ],
  });
}
