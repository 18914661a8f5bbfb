import type { FileHandle } from 'node:fs/promises';
import sharp from 'sharp';
import { Refusal } from './refusal.ts';
import { readTiffDirectories, type Span, type TiffDirectory } from './tiff-directories.ts';

/** The JPEG that a raw file carries of itself. */
export interface RawPreview {
  span: Span;
  /** Pixels, as stored. */
  width: number;
  height: number;
  /** How the picture is to be turned (EXIF Orientation, 1 to 8). */
  orientation: number;
  isDng: boolean;
}

const COLOUR_FILTER_ARRAY = 32803;
const LINEAR_RAW = 34892;
const JPEG_COMPRESSIONS = [6, 7];
/** A preview below this is a thumbnail that nobody can choose by. Longest side in pixels. */
const SMALLEST_PREVIEW = 640;
/** The size of a JPEG stands behind its metadata segments of at most 64 kB each; so much is read to find it. */
const HEADER_BYTES = 512 * 1024;
const MOST_CANDIDATES = 16;

/** Whether the directories are those of a raw file and not of a plain TIFF picture. */
function isRaw(directories: TiffDirectory[], plainStart: boolean): boolean {
  return !plainStart || directories.some((one) => one.isDng || [COLOUR_FILTER_ARRAY, LINEAR_RAW].includes(one.photometric));
}

function jpegSpans(directories: TiffDirectory[]): Span[] {
  const whole = directories.flatMap((one) => (one.jpeg ? [one.jpeg] : []));
  const inOneStrip = directories
    .filter((one) => JPEG_COMPRESSIONS.includes(one.compression) && one.pieces.length === 1 && one.photometric !== COLOUR_FILTER_ARRAY)
    .flatMap((one) => one.pieces);
  return [...whole, ...inOneStrip];
}

/** @returns the bytes of a span, or null where it reaches beyond the file. */
export async function readSpan(file: FileHandle, { offset, length }: Span): Promise<Buffer | null> {
  if (offset + length > (await file.stat()).size) return null;
  const { buffer, bytesRead } = await file.read(Buffer.alloc(length), 0, length, offset);
  return bytesRead === length ? buffer : null;
}

type Candidate = Omit<RawPreview, 'isDng'>;

async function measure(file: FileHandle, span: Span): Promise<Candidate[]> {
  const bytes = await readSpan(file, { offset: span.offset, length: Math.min(span.length, HEADER_BYTES) });
  if (!bytes || bytes.length < 4 || bytes.readUInt16BE(0) !== 0xffd8) return [];
  try {
    const { width, height, orientation } = await sharp(bytes, { limitInputPixels: false }).metadata();
    return [{ span, width, height, orientation: orientation ?? 0 }];
  } catch {
    // The raw pixels themselves can be a JPEG of the lossless kind, which is no preview.
    return [];
  }
}

/** A preview that already stands upright beside a lying sensor picture must not be turned again. */
function turnOf(preview: Candidate, directories: TiffDirectory[]): number {
  if (preview.orientation > 1) return preview.orientation;
  const sensor = directories.reduce((a, b) => (b.width * b.height > a.width * a.height ? b : a));
  const alreadyTurned = sensor.width > sensor.height !== preview.width > preview.height;
  return alreadyTurned ? 1 : (directories.find((one) => one.orientation > 0)?.orientation ?? 1);
}

/**
 * Finds the largest JPEG preview of a raw file built on TIFF; null where the file is a plain TIFF picture.
 * @throws Refusal where the raw file is cut short or has no preview of use.
 */
export async function findRawPreview(file: FileHandle, head: Buffer): Promise<RawPreview | null> {
  const directories = await readTiffDirectories(file);
  const plainStart = /^(II\*\0|MM\0\*|II\+\0|MM\0\+)$/.test(head.toString('latin1', 0, 4)) && head.toString('latin1', 8, 10) !== 'CR';
  if (!isRaw(directories, plainStart)) return null;
  const { size } = await file.stat();
  if (directories.length === 0) return null;
  const cut = directories.some((one) => one.pieces.some((piece) => piece.offset + piece.length > size));
  if (cut) throw new Refusal('damaged', 'The raw file is cut short: parts of it lie beyond its end. Copy it again from the card.');
  const candidates: Candidate[] = [];
  for (const span of jpegSpans(directories).slice(0, MOST_CANDIDATES)) candidates.push(...(await measure(file, span)));
  const [largest] = candidates.sort((a, b) => b.width * b.height - a.width * a.height);
  if (!largest || Math.max(largest.width, largest.height) < SMALLEST_PREVIEW) {
    throw new Refusal(
      'no-preview',
      'The raw file holds no JPEG preview large enough to show: export it as DNG with a full preview, or as JPEG.',
    );
  }
  return { ...largest, orientation: turnOf(largest, directories), isDng: directories.some((one) => one.isDng) };
}
