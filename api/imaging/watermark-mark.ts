import sharp from 'sharp';
import type { WatermarkSettings } from '../domain/watermark-settings.ts';
import { outlineOf } from './letter-outlines.ts';
import { fileKind, HEAD_BYTES } from './file-kind.ts';
import { asRefusal } from './judge-file.ts';
import { isAnimatedPng } from './animated-png.ts';
import { Refusal } from './refusal.ts';
import { toRaw, type RawPicture } from './upright.ts';

/** Degrees by which a mark leans: what runs across the picture's own lines is harder to retouch than what follows them. */
export const LEAN = -18;
/** Share of the letters' height that the dark rim takes; it keeps white words visible on a white sky. */
const RIM = 0.035;
const LARGEST_IMAGE = 2000;
const MOST_IMAGE_PIXELS = 40_000_000;

/** The words as pixels, `width` wide before they lean. */
async function drawWords(words: string, width: number): Promise<RawPicture | null> {
  const outline = outlineOf(words);
  if (!outline) return null;
  const rim = outline.height * RIM;
  const box = `${-rim} ${-rim} ${outline.width + 2 * rim} ${outline.height + 2 * rim}`;
  const height = Math.max(1, Math.round((width * (outline.height + 2 * rim)) / (outline.width + 2 * rim)));
  const drawing =
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="${box}" preserveAspectRatio="none">` +
    `<path d="${outline.path}" fill="none" stroke="#000" stroke-opacity="0.55" stroke-linejoin="round" stroke-width="${2 * rim}"/>` +
    `<path d="${outline.path}" fill="#fff"/></svg>`;
  return toRaw(sharp(Buffer.from(drawing)).ensureAlpha());
}

async function scaleImage(image: Buffer, width: number, room: number): Promise<RawPicture> {
  return toRaw(sharp(image).resize({ width, height: room, fit: 'inside' }).toColourspace('srgb').ensureAlpha());
}

/**
 * One mark, leaning, as RGBA pixels.
 * @param room Size in pixels of the picture it will stand on; the mark is `settings.size` of its width.
 */
export async function drawMark(
  settings: WatermarkSettings,
  image: Buffer | null,
  room: { width: number; height: number },
): Promise<RawPicture | null> {
  const width = Math.max(8, Math.round(room.width * settings.size));
  const flat =
    settings.kind === 'text'
      ? await drawWords(settings.text, width)
      : settings.kind === 'image' && image
        ? await scaleImage(image, width, Math.max(8, Math.round(room.height * 0.9)))
        : null;
  if (!flat) return null;
  const { data, width: w, height: h } = flat;
  return toRaw(sharp(data, { raw: { width: w, height: h, channels: 4 } }).rotate(LEAN, { background: { r: 0, g: 0, b: 0, alpha: 0 } }));
}

/**
 * Makes an uploaded PNG fit to be a watermark: decoded and written anew, so that nothing hidden in the file stays, and
 * no larger than marks ever are.
 * @throws Refusal where it is no still PNG or cannot be read.
 */
export async function cleanWatermarkImage(bytes: Buffer): Promise<{ data: Buffer; width: number; height: number }> {
  if (fileKind(bytes.subarray(0, HEAD_BYTES)) !== 'png')
    throw new Refusal('unsupported', 'A watermark is a PNG picture, best with a clear ground.');
  if (await isAnimatedPng((offset, length) => bytes.subarray(offset, offset + length)))
    throw new Refusal('animated', 'The file is an animated PNG; a watermark stands still.');
  try {
    const { data, info } = await sharp(bytes, { limitInputPixels: MOST_IMAGE_PIXELS })
      .resize({ width: LARGEST_IMAGE, height: LARGEST_IMAGE, fit: 'inside', withoutEnlargement: true })
      .toColourspace('srgb')
      .ensureAlpha()
      .png()
      .toBuffer({ resolveWithObject: true });
    return { data, width: info.width, height: info.height };
  } catch (error) {
    throw asRefusal(error);
  }
}
