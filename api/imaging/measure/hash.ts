import { resizePlane, type Plane } from './plane.ts';

/** Pixels along a side of the thumb. */
export const THUMB_SIDE = 32;

/** The picture squeezed to 32 × 32, each pixel the mean of its area, 8 bits. */
export function thumbOf(luma: Plane): Uint8Array {
  return Uint8Array.from(resizePlane(luma, THUMB_SIDE, THUMB_SIDE).values, (value) => Math.round(value));
}

/** Lowest frequencies that count, along each side, without the mean. */
const LOW = 8;

const cosines = Array.from({ length: LOW }, (_, low) =>
  Float64Array.from({ length: THUMB_SIDE }, (_, at) => Math.cos(((2 * at + 1) * (low + 1) * Math.PI) / (2 * THUMB_SIDE))),
);

/** The 8 × 8 lowest coefficients of the DCT-II of a thumb, first row and column left out; row by row, not scaled. */
export function lowFrequencies(thumb: Uint8Array): Float64Array {
  const found = new Float64Array(LOW * LOW);
  for (let down = 0; down < LOW; down++) {
    for (let across = 0; across < LOW; across++) {
      let sum = 0;
      for (let y = 0; y < THUMB_SIDE; y++)
        for (let x = 0; x < THUMB_SIDE; x++) sum += thumb[y * THUMB_SIDE + x]! * cosines[down]![y]! * cosines[across]![x]!;
      found[down * LOW + across] = sum;
    }
  }
  return found;
}

/** Below this spread of its codes a thumb shows nothing, and its hash would be one of noise. */
const LEAST_SPREAD = 2;

function spreadOf(thumb: Uint8Array): number {
  const mean = thumb.reduce((sum, code) => sum + code, 0) / thumb.length;
  return Math.sqrt(thumb.reduce((sum, code) => sum + (code - mean) ** 2, 0) / thumb.length);
}

/**
 * Perceptual hash of a thumb: a bit for each of the 64 lowest frequencies, set where it is larger than their median (C. Zauner,
 * "Implementation and Benchmarking of Perceptual Image Hash Functions", 2010; from memory). 16 hex digits; null where the
 * picture is all but flat.
 */
export function hashOf(thumb: Uint8Array): string | null {
  if (spreadOf(thumb) < LEAST_SPREAD) return null;
  const frequencies = lowFrequencies(thumb);
  const ordered = Float64Array.from(frequencies).sort();
  const median = (ordered[31]! + ordered[32]!) / 2;
  const bits = Array.from(frequencies, (value) => (value > median ? '1' : '0')).join('');
  return BigInt(`0b${bits}`).toString(16).padStart(16, '0');
}
