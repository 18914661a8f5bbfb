import { open, type FileHandle } from 'node:fs/promises';
import sharp, { type Metadata, type SharpOptions } from 'sharp';
import { fileKind, HEAD_BYTES, type FileKind } from './file-kind.ts';
import { isAnimatedPng } from './animated-png.ts';
import { findRawPreview, readSpan, type RawPreview } from './raw-preview.ts';
import { Refusal } from './refusal.ts';
import { refuseSize } from './refuse-size.ts';

/** What an installation takes in at most. */
export interface PictureLimits {
  bytes: number;
  pixels: number;
}
/** A file known for what it is. Sizes in pixels as stored; for a raw file those of its preview. */
export interface JudgedFile {
  kind: FileKind | 'raw';
  mediaType: string;
  bytes: number;
  width: number;
  height: number;
  /** EXIF Orientation, 1 to 8: how the stored pixels are to be turned. */
  orientation: number;
  preview: RawPreview | null;
}

const SHARP_FORMATS: Record<FileKind, string> = { jpeg: 'jpeg', png: 'png', webp: 'webp', avif: 'heif', tiff: 'tiff' };
const DAMAGED = 'The file is cut short or damaged and cannot be read to its end. Copy it again from the card or export it again.';
/** Faults of the machine, not of the picture: these are thrown as they come, so that the work is tried again. */
const FAULT_OF_OURS = /is missing|ENOENT|EACCES|EMFILE|ENOSPC|out of memory|No space left/i;

const grouped = (value: number) => new Intl.NumberFormat('en-GB').format(value);

/** Turns what the decoder says about a broken picture into a refusal; other errors come back as they are. */
export function asRefusal(error: unknown): unknown {
  const message = error instanceof Error ? error.message : String(error);
  return error instanceof Refusal || FAULT_OF_OURS.test(message) ? error : new Refusal('damaged', DAMAGED);
}

/** How pictures are decoded: strictly, in one pass, the first page only, and never more pixels than allowed. */
export function decodeOptions(limits: Pick<PictureLimits, 'pixels'>): SharpOptions {
  return { limitInputPixels: limits.pixels, sequentialRead: true, failOn: 'warning', pages: 1 };
}

function refusePixels(width: number, height: number, limits: PictureLimits): void {
  if (width * height <= limits.pixels) return;
  const most = grouped(Math.floor(limits.pixels / 1e6));
  throw new Refusal(
    'too-many-pixels',
    `The picture has ${grouped(width)} × ${grouped(height)} pixels; at most ${most} megapixels are taken in.`,
  );
}

/** Reads the header alone: the limit on pixels is ours to check, so that the sentence can name the size. */
async function readHeader(source: string, kind: FileKind): Promise<Metadata> {
  let header: Metadata;
  try {
    header = await sharp(source, { limitInputPixels: false }).metadata();
  } catch (error) {
    throw asRefusal(error);
  }
  if (header.format !== SHARP_FORMATS[kind]) throw new Refusal('damaged', DAMAGED);
  if (kind === 'avif' && header.compression !== 'av1') {
    throw new Refusal('unsupported', 'The file is a HEIC picture, which cannot be read here: export it as JPEG or TIFF.');
  }
  return header;
}

function refuseContent(header: Metadata, kind: FileKind): void {
  if (kind === 'webp' && (header.pages ?? 1) > 1) {
    throw new Refusal('animated', 'The file is an animated WebP; single pictures are taken in, films are not.');
  }
  if (!['uchar', 'ushort'].includes(header.depth ?? '')) {
    throw new Refusal('unsupported', 'The picture has more than 16 bits a channel: export it with 8 or 16 bits.');
  }
}

function judgedRaw(preview: RawPreview, bytes: number): JudgedFile {
  const { width, height, orientation, isDng } = preview;
  return {
    kind: 'raw',
    mediaType: isDng ? 'image/x-dng' : 'image/x-raw',
    bytes,
    width,
    height,
    orientation: upright(orientation),
    preview,
  };
}

/** What is not one of the eight orientations counts as upright. */
function upright(orientation: number | undefined): number {
  return orientation !== undefined && orientation >= 1 && orientation <= 8 ? orientation : 1;
}

async function judgeOpen(file: FileHandle, path: string, limits: PictureLimits): Promise<JudgedFile> {
  const { size } = await file.stat();
  refuseSize(size, limits);
  const readAt = async (offset: number, length: number) => {
    const { buffer, bytesRead } = await file.read(Buffer.alloc(length), 0, length, offset);
    return buffer.subarray(0, bytesRead);
  };
  const head = await readAt(0, HEAD_BYTES);
  const kind = fileKind(head);
  if (kind === 'png' && (await isAnimatedPng(readAt))) {
    throw new Refusal('animated', 'The file is an animated PNG; single pictures are taken in, films are not.');
  }
  const preview = kind === 'tiff' ? await findRawPreview(file, head) : null;
  if (preview) {
    refusePixels(preview.width, preview.height, limits);
    return judgedRaw(preview, size);
  }
  const header = await readHeader(path, kind);
  refusePixels(header.width, header.height, limits);
  refuseContent(header, kind);
  // In AVIF the turn is part of the container (ISO/IEC 23008-12, irot and imir), and the decoder has carried it out.
  const orientation = kind === 'avif' ? 1 : upright(header.orientation);
  return { kind, mediaType: `image/${kind}`, bytes: size, width: header.width, height: header.height, orientation, preview: null };
}

/**
 * Says what a file is from its header, by content alone; nothing is decoded, so a picture of too many pixels costs nothing.
 * Whether it can be read to its end shows when it is decoded.
 * @throws Refusal with one sentence for the person who brought it.
 */
export async function judgeHeader(path: string, limits: PictureLimits): Promise<JudgedFile> {
  const file = await open(path, 'r');
  try {
    return await judgeOpen(file, path, limits);
  } finally {
    await file.close();
  }
}

/** What the decoder is given: the file itself, or the preview inside a raw file. */
export async function pictureSource(path: string, judged: Pick<JudgedFile, 'preview'>): Promise<string | Buffer> {
  if (!judged.preview) return path;
  const file = await open(path, 'r');
  try {
    const bytes = await readSpan(file, judged.preview.span);
    if (!bytes) throw new Refusal('damaged', DAMAGED);
    return bytes;
  } finally {
    await file.close();
  }
}

/**
 * Judges a file and reads it to its end, as a truncated JPEG has a perfect header.
 * @throws Refusal with one sentence for the person who brought it.
 */
export async function judgeFile(path: string, limits: PictureLimits): Promise<JudgedFile> {
  const judged = await judgeHeader(path, limits);
  try {
    const source = await pictureSource(path, judged);
    await sharp(source, decodeOptions(limits)).resize(64, 64, { fit: 'inside' }).raw().toBuffer();
  } catch (error) {
    throw asRefusal(error);
  }
  return judged;
}
