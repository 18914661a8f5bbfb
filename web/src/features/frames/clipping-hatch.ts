import { CLIPPED, paintClipped } from '../../../../api/domain/clipping.ts';

/** Pixels of the picture from one stripe to the next: some five on the screen where the whole picture is seen. */
const PERIOD = 14;
/** Between the stripes the paint is so much thinner, so that a spot smaller than a stripe is not lost. */
const THIN = 0.45;

/**
 * What is clipped as stripes to be laid over the picture, RGBA: copper rising to the right for highlights, verdigris falling for shadows, so that
 * the direction tells them apart where the colour does not.
 * @param mask one byte a pixel, row by row, as markClipped gives it @param width pixels of a row
 */
export function hatchClipped(mask: Uint8Array, width: number): Uint8ClampedArray<ArrayBuffer> {
  const rgba = paintClipped(mask);
  for (let pixel = 0; pixel < mask.length; pixel++) {
    const bits = mask[pixel] ?? 0;
    if (bits === 0) continue;
    const x = pixel % width;
    const y = (pixel - x) / width;
    const along = bits & CLIPPED.anyHigh ? x + y : x - y + PERIOD * width;
    if (along % PERIOD >= PERIOD / 2) rgba[pixel * 4 + 3] = (rgba[pixel * 4 + 3] ?? 0) * THIN;
  }
  return rgba;
}

/** Shares of a picture, 0 to 1, that a mask marks: some channel at the upper limit, all at the lower. */
export function clippedShares(mask: Uint8Array): { highlights: number; shadows: number } {
  let [high, low] = [0, 0];
  for (const bits of mask) {
    if (bits & CLIPPED.anyHigh) high++;
    if (bits & CLIPPED.allLow) low++;
  }
  return { highlights: high / mask.length, shadows: low / mask.length };
}

/** "none", "under 0.1%", "3.2%", "31%" */
export function shareWords(share: number): string {
  const percent = share * 100;
  if (percent === 0) return 'none';
  if (percent < 0.1) return 'under 0.1%';
  return `${percent < 10 ? percent.toFixed(1) : Math.round(percent)}%`;
}
