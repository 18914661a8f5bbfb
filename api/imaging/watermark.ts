import sharp from 'sharp';
import type { WatermarkSettings } from '../domain/watermark-settings.ts';
import { DERIVATIVE_SIZES, type DerivativeSize } from './derivative-sizes.ts';
import { encodeDerivative, shrink, type Derivative } from './make-derivatives.ts';
import { drawMark } from './watermark-mark.ts';
import { toRaw, type RawPicture } from './upright.ts';

/** Lays one pixel of the mark over one of the picture. */
function blendPixel(picture: RawPicture, at: number, mark: RawPicture, from: number, opacity: number): void {
  const cover = ((mark.data[from + 3] ?? 0) / 255) * opacity;
  if (cover === 0) return;
  for (let channel = 0; channel < 3; channel++) {
    const below = picture.data[at + channel] ?? 0;
    picture.data[at + channel] = Math.round(below + ((mark.data[from + channel] ?? 0) - below) * cover);
  }
}

/** Lays the mark with its top left corner at a place that may lie outside the picture. */
function blendAt(picture: RawPicture, mark: RawPicture, left: number, top: number, opacity: number): void {
  const [x0, x1] = [Math.max(0, left), Math.min(picture.width, left + mark.width)];
  const [y0, y1] = [Math.max(0, top), Math.min(picture.height, top + mark.height)];
  for (let y = y0; y < y1; y++) {
    for (let x = x0; x < x1; x++) {
      blendPixel(picture, (y * picture.width + x) * 3, mark, ((y - top) * mark.width + x - left) * 4, opacity);
    }
  }
}

/** Where marks stand: one in the middle, or rows across the whole picture, every other row moved by half a step. */
function places(picture: RawPicture, mark: RawPicture, tiled: boolean): [left: number, top: number][] {
  const middle: [number, number] = [Math.round((picture.width - mark.width) / 2), Math.round((picture.height - mark.height) / 2)];
  if (!tiled) return [middle];
  const step = { x: Math.round(mark.width * 1.2), y: Math.round(mark.height * 1.1) };
  const found: [number, number][] = [];
  const rows = Math.ceil(picture.height / step.y / 2) + 1;
  const columns = Math.ceil(picture.width / step.x / 2) + 1;
  for (let row = -rows; row <= rows; row++) {
    const shift = row % 2 === 0 ? 0 : Math.round(step.x / 2);
    for (let column = -columns; column <= columns; column++) found.push([middle[0] + column * step.x + shift, middle[1] + row * step.y]);
  }
  return found;
}

async function markOver(picture: RawPicture, settings: WatermarkSettings, image: Buffer | null): Promise<RawPicture> {
  const mark = await drawMark(settings, image, picture);
  if (!mark) return picture;
  const marked = { ...picture, data: Buffer.from(picture.data) };
  for (const [left, top] of places(picture, mark, settings.tiled)) blendAt(marked, mark, left, top, settings.opacity);
  return marked;
}

/**
 * Lays a watermark over a picture that is already a derivative, at each size anew so that it is as large on all of them.
 * @param picture The largest derivative, a JPEG.
 * @param image The uploaded PNG where the watermark is one.
 */
export async function watermarkPicture(
  picture: Buffer,
  settings: WatermarkSettings,
  image: Buffer | null,
  sizes: readonly DerivativeSize[] = DERIVATIVE_SIZES,
): Promise<Derivative[]> {
  let current = await toRaw(sharp(picture).flatten().toColourspace('srgb'));
  const made: Derivative[] = [];
  for (const size of [...sizes].sort((a, b) => b - a)) {
    current = await shrink(current, size);
    made.push(await encodeDerivative(await markOver(current, settings, image), size));
  }
  return made.reverse();
}
