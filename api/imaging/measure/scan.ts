import { clippedBits, type Limits } from '../../domain/clipping.ts';
import type { RawPicture } from '../upright.ts';
import type { Plane } from './plane.ts';

/** How often each of the 256 codes occurs. */
export interface Counts {
  red: Uint32Array;
  green: Uint32Array;
  blue: Uint32Array;
  luma: Uint32Array;
  /** Of the largest of a pixel's three channels. */
  largest: Uint32Array;
}

/** What one walk over all pixels gives. */
export interface Scan {
  counts: Counts;
  /** Luma of Rec. 709 over the gamma-encoded channels, 0 to 255. */
  luma: Plane;
  /** A byte a pixel, with the bits of CLIPPED; and how often each combination of bits but none occurs. */
  mask: Uint8Array;
  combinations: Uint32Array;
}

function emptyScan({ width, height }: RawPicture): Scan {
  const codes = () => new Uint32Array(256);
  return {
    counts: { red: codes(), green: codes(), blue: codes(), luma: codes(), largest: codes() },
    luma: { width, height, values: new Float32Array(width * height) },
    mask: new Uint8Array(width * height),
    combinations: new Uint32Array(16),
  };
}

/** Walks over a picture once for everything that looks at single pixels: millions of them are what measuring takes its time for. */
export function scanPicture(picture: RawPicture, limits: Limits): Scan {
  const scan = emptyScan(picture);
  const { data, channels } = picture;
  const { mask, combinations } = scan;
  const { red, green, blue, luma, largest } = scan.counts;
  const { values } = scan.luma;
  const { high, low } = limits;
  for (let pixel = 0, at = 0; pixel < mask.length; pixel++, at += channels) {
    const r = data[at]!;
    const g = data[at + 1]!;
    const b = data[at + 2]!;
    const value = 0.2126 * r + 0.7152 * g + 0.0722 * b;
    const most = r > g ? (r > b ? r : b) : g > b ? g : b;
    values[pixel] = value;
    red[r]!++;
    green[g]!++;
    blue[b]!++;
    luma[(value + 0.5) | 0]!++;
    largest[most]!++;
    // Most pixels end here: the bits of the others cost a call.
    if (most < high && r > low && g > low && b > low) continue;
    const bits = clippedBits(r, g, b, limits);
    mask[pixel] = bits;
    combinations[bits]!++;
  }
  return scan;
}
