import type { RawPicture } from '../../upright.ts';

/** A picture as grey bytes. */
export interface Grey {
  width: number;
  height: number;
  values: Uint8Array;
}

/** Longest side that movement is looked for at; its parts are found between the pixels. */
const LONGEST = 1280;

/** How many pixels of the picture make one of its grey copy, each way. */
export const greyScale = ({ width, height }: { width: number; height: number }) =>
  Math.max(1, Math.ceil(Math.max(width, height) / LONGEST));

/** A grey copy for looking for movement: red + 2 green + blue over whole squares of pixels. */
export function greyOf({ data, width, height, channels }: RawPicture, scale = greyScale({ width, height })): Grey {
  const small: Grey = { width: Math.floor(width / scale), height: Math.floor(height / scale), values: new Uint8Array() };
  small.values = new Uint8Array(small.width * small.height);
  const sums = new Uint32Array(small.width);
  for (let y = 0; y < small.height; y++) {
    sums.fill(0);
    for (let row = 0; row < scale; row++) {
      let at = (y * scale + row) * width * channels;
      for (let x = 0; x < small.width; x++) {
        let sum = 0;
        for (let column = 0; column < scale; column++, at += channels) sum += data[at]! + 2 * data[at + 1]! + data[at + 2]!;
        sums[x]! += sum;
      }
    }
    for (let x = 0; x < small.width; x++) small.values[y * small.width + x] = sums[x]! / (4 * scale * scale);
  }
  return small;
}

/** Half as large, the mean of every four. */
export function halfOf({ width, height, values }: Grey): Grey {
  const half: Grey = { width: width >> 1, height: height >> 1, values: new Uint8Array((width >> 1) * (height >> 1)) };
  for (let y = 0, to = 0; y < half.height; y++) {
    for (let x = 0, at = 2 * y * width; x < half.width; x++, at += 2)
      half.values[to++] = (values[at]! + values[at + 1]! + values[at + width]! + values[at + width + 1]!) / 4;
  }
  return half;
}

/** How many pixels are as dark as each value or darker. */
export function cumulated({ values }: Grey): Uint32Array {
  const counts = new Uint32Array(256);
  for (const value of values) counts[value]!++;
  for (let value = 1; value < 256; value++) counts[value]! += counts[value - 1]!;
  return counts;
}

/** The darkest value that at least so many pixels are as dark as. */
export function quantile(counts: Uint32Array, pixels: number): number {
  const found = counts.findIndex((count) => count >= pixels);
  return found < 0 ? 255 : found;
}
