import { cumulated, halfOf, quantile, type Grey } from './grey-pyramid.ts';

/**
 * Median threshold bitmaps after Ward: Fast, Robust Image Registration for Compositing High Dynamic Range Photographs from Handheld Exposures, Journal of Graphics Tools 8(2), 2003.
 */

export interface Shift {
  x: number;
  y: number;
}

/** Pixels nearer to the threshold say nothing (Ward: 4 of 256). */
const NEAR = 4;
/** Each level doubles the shift that can be found: five of them reach 31 pixels of the finest. */
const LEVELS = 5;
/** Where the median is black or white in one of the frames, another share of the pixels divides both, as Ward proposes. */
const SHARES = [0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8, 0.1, 0.9];
/** Values between which a threshold divides anything. */
const [DARKEST, BRIGHTEST] = [NEAR + 4, 251 - NEAR];

/** 1 above the threshold, 0 below, 4 where it is too near: two pixels differ where they add up to 1. */
function bitmap({ values }: Grey, threshold: number): Uint8Array {
  const table = Uint8Array.from({ length: 256 }, (_, value) => (Math.abs(value - threshold) <= NEAR ? 4 : value > threshold ? 1 : 0));
  return values.map((value) => table[value]!);
}

/** Thresholds that part the same share of both pictures, neither of them at the limit. */
function thresholds(first: Grey, second: Grey): [number, number] | null {
  const [one, two] = [cumulated(first), cumulated(second)];
  for (const share of SHARES) {
    const pair: [number, number] = [quantile(one, share * first.values.length), quantile(two, share * second.values.length)];
    if (pair.every((threshold) => threshold >= DARKEST && threshold <= BRIGHTEST)) return pair;
  }
  return null;
}

/** Share of pixels that differ when the second lies moved by `shift`. */
function difference(one: Uint8Array, two: Uint8Array, { width, height }: Grey, { x: dx, y: dy }: Shift): number {
  const [left, right] = [Math.max(0, -dx), Math.min(width, width - dx)];
  const [top, bottom] = [Math.max(0, -dy), Math.min(height, height - dy)];
  let differing = 0;
  for (let y = top; y < bottom; y++) {
    const [row, other] = [y * width, (y + dy) * width + dx];
    for (let x = left; x < right; x++) if (one[row + x]! + two[other + x]! === 1) differing++;
  }
  return differing / Math.max(1, (right - left) * (bottom - top));
}

const AROUND: Shift[] = [-1, 0, 1].flatMap((y) => [-1, 0, 1].map((x) => ({ x, y })));

/** The shift of a level: twice that of the next coarser one, or one of its eight neighbours. Staying wins where all are alike. */
function shiftAt(first: Grey, second: Grey, [low, high]: [number, number], levels: number): Shift {
  const coarser =
    levels > 1 && Math.min(first.width, first.height) >= 32 ? shiftAt(halfOf(first), halfOf(second), [low, high], levels - 1) : null;
  const from = { x: 2 * (coarser?.x ?? 0), y: 2 * (coarser?.y ?? 0) };
  const [one, two] = [bitmap(first, low), bitmap(second, high)];
  let best = from;
  let least = difference(one, two, first, from);
  for (const { x, y } of AROUND) {
    const shift = { x: from.x + x, y: from.y + y };
    const found = difference(one, two, first, shift);
    if (found < least) [best, least] = [shift, found];
  }
  return best;
}

/** What lies at (x, y) of the first lies at (x + shift.x, y + shift.y) of the second; nothing where no threshold parts both. */
export function bitmapShift(first: Grey, second: Grey): Shift | null {
  const pair = thresholds(first, second);
  return pair && shiftAt(first, second, pair, LEVELS);
}
