import { linearOf } from '../srgb.ts';
import type { Exposure } from './row.ts';

/** What two thumbs say about each other. */
export interface Likeness {
  /**
   * One composition, or two; 'doubtful' where a camera in the hand or a small turn may be the reason; 'unknown' where too little of both is neither
   * black nor white, or there is nothing to see.
   */
  pictures: 'alike' | 'doubtful' | 'different' | 'unknown';
  /** Stops by which the second picture is brighter; null where it cannot be measured. */
  brighter: number | null;
}

const SIDE = 32;
/** A cell is compared where neither picture is near its limits: in there tones are lost, and small numbers are coarse. */
const [DARKEST, BRIGHTEST] = [12, 243];
/** Share of the picture that must be comparable. */
const ENOUGH = 0.12;
/** Stops of detail below which there is nothing to compare but noise. */
const FLAT = 0.06;
/**
 * How far details go together, 1 being all the way. Measured on 20 photographs exposed 1/3 to 2 stops apart: 0.81 and more from a tripod, 0.65 and more
 * moved by 1% of the width, 0.5 and less for nearly all turned by 10%.
 */
const [ALIKE, DIFFERENT] = [0.6, 0.3];

/** Stops of each 8-bit value in linear light; black, which has none, counts as half a value. */
const STOPS = Float64Array.from({ length: 256 }, (_, value) => Math.log2(linearOf(Math.max(value, 0.5))));

/** The values of a thumb; null for what is none. */
export function decodeThumb(base64: string | null): Uint8Array | null {
  if (base64 === null) return null;
  try {
    const letters = atob(base64);
    const bytes = new Uint8Array(letters.length);
    for (let at = 0; at < bytes.length; at++) bytes[at] = letters.charCodeAt(at);
    return bytes.length === SIDE * SIDE ? bytes : null;
  } catch {
    return null;
  }
}

/** Variance, in squared stops, of a value that is unsure by one. */
const COARSENESS = Float64Array.from({ length: 256 }, (_, value) => {
  const [darker, brighter] = [STOPS[Math.max(0, value - 1)], STOPS[Math.min(255, value + 1)]] as [number, number];
  return ((brighter - darker) / 2) ** 2;
});

function comparable(one: Uint8Array, two: Uint8Array): Uint8Array {
  const inside = (value: number) => value >= DARKEST && value <= BRIGHTEST;
  return one.map((value, at) => (inside(value) && inside(two[at] as number) ? 1 : 0));
}

/**
 * What is left of a picture, in stops, once the mean of every row and of every column is taken out: a bright sky above dark houses looks
 * the same wherever one turns, the houses do not.
 */
function detail(thumb: Uint8Array, mask: Uint8Array): Float64Array {
  const stops = new Float64Array(thumb.length);
  for (let at = 0; at < stops.length; at++) stops[at] = STOPS[thumb[at] as number] as number;
  for (let row = 0; row < SIDE; row++) centre(stops, mask, row * SIDE, 1);
  for (let column = 0; column < SIDE; column++) centre(stops, mask, column, SIDE);
  return stops;
}

function centre(values: Float64Array, mask: Uint8Array, from: number, step: number): void {
  let [sum, count] = [0, 0];
  for (let i = 0, at = from; i < SIDE; i++, at += step) {
    if (mask[at]) [sum, count] = [sum + (values[at] as number), count + 1];
  }
  const mean = count > 0 ? sum / count : 0;
  for (let i = 0, at = from; i < SIDE; i++, at += step) values[at] = (values[at] as number) - mean;
}

/** Mean product over the cells that are compared. */
function product(one: Float64Array, two: Float64Array, mask: Uint8Array, count: number): number {
  let sum = 0;
  for (let at = 0; at < mask.length; at++) if (mask[at]) sum += (one[at] as number) * (two[at] as number);
  return sum / count;
}

function medianDifference(one: Uint8Array, two: Uint8Array, mask: Uint8Array, count: number): number {
  const differences = new Float32Array(count);
  for (let at = 0, n = 0; at < mask.length; at++) {
    if (mask[at]) differences[n++] = (STOPS[two[at] as number] as number) - (STOPS[one[at] as number] as number);
  }
  return differences.sort()[count >> 1] as number;
}

/** Compares two pictures by their thumbs, brightness taken out: where both hold tones, their details must go together. */
function compare(one: Uint8Array | null, two: Uint8Array | null): Likeness {
  if (!one || !two) return { pictures: 'unknown', brighter: null };
  const mask = comparable(one, two);
  const count = mask.reduce((sum, value) => sum + value, 0);
  if (count < ENOUGH * mask.length) return { pictures: 'unknown', brighter: null };
  return { pictures: judgePictures(one, two, mask, count), brighter: medianDifference(one, two, mask, count) };
}

export type Compare = (one: Exposure, two: Exposure) => Likeness;

/** A comparison that looks at each pair once: many ways to cut a row ask for the same. */
export function rememberedLikeness(): Compare {
  const seen = new Map<Exposure, Map<Exposure, Likeness>>();
  return (one, two) => {
    const others = seen.get(one) ?? new Map<Exposure, Likeness>();
    const found = others.get(two) ?? compare(one.thumb, two.thumb);
    seen.set(one, others.set(two, found));
    return found;
  };
}

/** Squared stops by which the values themselves are unsure: one 8-bit value is a large step in the shadows. */
function coarseness(thumb: Uint8Array, mask: Uint8Array, count: number): number {
  let sum = 0;
  for (let at = 0; at < mask.length; at++) if (mask[at]) sum += COARSENESS[thumb[at] as number] as number;
  return sum / count;
}

function judgePictures(one: Uint8Array, two: Uint8Array, mask: Uint8Array, count: number): Likeness['pictures'] {
  const [oneDetail, twoDetail] = [detail(one, mask), detail(two, mask)];
  const [oneSpread, twoSpread] = [product(oneDetail, oneDetail, mask, count), product(twoDetail, twoDetail, mask, count)];
  if (Math.max(oneSpread, twoSpread) < FLAT ** 2) return 'unknown';
  // What noise takes from a correlation is known (Spearman 1904, attenuation); where it takes most of it, nothing can be said.
  const sure = Math.min(1 - coarseness(one, mask, count) / oneSpread, 1 - coarseness(two, mask, count) / twoSpread);
  if (!(sure > 0.5)) return 'unknown';
  const together = product(oneDetail, twoDetail, mask, count) / Math.sqrt(oneSpread * twoSpread) / sure;
  return together >= ALIKE ? 'alike' : together < DIFFERENT ? 'different' : 'doubtful';
}
