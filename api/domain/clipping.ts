/** Codes of sRGB from which on, or down to which, a channel is at the end of its scale. */
export interface Limits {
  high: number;
  low: number;
}

/**
 * The limits in a derivative. A flat field of 255 does not come back from a JPEG as 255 everywhere: at quality 82 the first coefficient of
 * brightness and colour is rounded to 6 (Annex K of ITU-T T.81, scaled), which is at most 0.4 and, in blue, 0.7 codes off, and both the
 * encoder and the decoder round to whole codes. 255 therefore arrives as 253 at least, and 0 as 2 at most.
 */
export const DERIVATIVE_LIMITS: Limits = { high: 253, low: 2 };

/** Bits of a mask's pixel. */
export const CLIPPED = { anyHigh: 1, allHigh: 2, anyLow: 4, allLow: 8 } as const;

/** Pixels in memory, 8 bits a channel, row by row: a picture's own buffer, or the data of a canvas. */
export type PixelBytes = Uint8Array | Uint8ClampedArray;

/** The bits of one pixel. */
export function clippedBits(red: number, green: number, blue: number, { high, low }: Limits): number {
  const most = red > green ? (red > blue ? red : blue) : green > blue ? green : blue;
  const least = red < green ? (red < blue ? red : blue) : green < blue ? green : blue;
  if (most < high && least > low) return 0;
  return (
    (most >= high ? CLIPPED.anyHigh : 0) |
    (least >= high ? CLIPPED.allHigh : 0) |
    (least <= low ? CLIPPED.anyLow : 0) |
    (most <= low ? CLIPPED.allLow : 0)
  );
}

/** Marks each pixel at the ends of the scale: one byte a pixel, with the bits of CLIPPED. Alpha is not looked at. */
export function markClipped(pixels: PixelBytes, channels: 3 | 4, limits: Limits = DERIVATIVE_LIMITS): Uint8Array {
  const mask = new Uint8Array(pixels.length / channels);
  for (let pixel = 0, at = 0; pixel < mask.length; pixel++, at += channels)
    mask[pixel] = clippedBits(pixels[at]!, pixels[at + 1]!, pixels[at + 2]!, limits);
  return mask;
}

/** A colour laid over a picture: red, green, blue and alpha, 0 to 255. */
export type Paint = readonly [number, number, number, number];

/** How clipped pixels are shown. Null leaves them as they are. */
export interface ClippingPaint {
  allHigh: Paint | null;
  /** One or two channels at the limit: colour is lost, brightness is not. */
  someHigh: Paint | null;
  allLow: Paint | null;
}

/** Copper for what is lost, paler where only colour is; verdigris for what is black. */
export const CLIPPING_PAINT: ClippingPaint = {
  allHigh: [168, 71, 31, 255],
  someHigh: [168, 71, 31, 130],
  allLow: [31, 111, 100, 255],
};

function paintFor(bits: number, paint: ClippingPaint): Paint | null {
  if (bits & CLIPPED.allHigh) return paint.allHigh;
  if (bits & CLIPPED.anyHigh) return paint.someHigh;
  return bits & CLIPPED.allLow ? paint.allLow : null;
}

/** Turns a mask into RGBA to be laid over the picture: what is not clipped stays transparent. */
export function paintClipped(mask: Uint8Array, paint: ClippingPaint = CLIPPING_PAINT): Uint8ClampedArray<ArrayBuffer> {
  const colours = Array.from({ length: 16 }, (_, bits) => paintFor(bits, paint));
  const rgba = new Uint8ClampedArray(mask.length * 4);
  for (let pixel = 0; pixel < mask.length; pixel++) {
    const colour = mask[pixel] === 0 ? null : colours[mask[pixel]!];
    if (colour) rgba.set(colour, pixel * 4);
  }
  return rgba;
}
