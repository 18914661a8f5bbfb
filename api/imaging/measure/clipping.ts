import { CLIPPED, markClipped, type Limits } from '../../domain/clipping.ts';
import type { AtLimit } from '../../domain/frame-measures.ts';
import type { RawPicture } from '../upright.ts';
import { findAreas } from './areas.ts';
import type { Counts } from './histogram.ts';

function shareOf(mask: Uint8Array, bit: number): number {
  let marked = 0;
  for (let pixel = 0; pixel < mask.length; pixel++) if (mask[pixel]! & bit) marked++;
  return marked / mask.length;
}

function inRange(counts: Uint32Array, from: number, to: number, pixels: number): number {
  return counts.subarray(from, to + 1).reduce((sum, count) => sum + count, 0) / pixels;
}

function oneEnd(
  mask: Uint8Array,
  picture: RawPicture,
  counts: Counts,
  ends: { any: number; all: number; codes: [number, number] },
): AtLimit {
  const { width, height } = picture;
  const areas = findAreas(mask, width, height, ends.all);
  const channel = (of: Uint32Array) => inRange(of, ...ends.codes, mask.length);
  return {
    any: shareOf(mask, ends.any),
    all: shareOf(mask, ends.all),
    red: channel(counts.red),
    green: channel(counts.green),
    blue: channel(counts.blue),
    areas: areas.inLarge,
    areasAny: findAreas(mask, width, height, ends.any).inLarge,
    largest: areas.largest,
    spots: areas.spots,
  };
}

/** Measures what lies at either end of the scale, how much and in what pieces. */
export function measureClipping(picture: RawPicture, counts: Counts, limits: Limits): { highlights: AtLimit; shadows: AtLimit } {
  const mask = markClipped(picture.data, picture.channels, limits);
  return {
    highlights: oneEnd(mask, picture, counts, { any: CLIPPED.anyHigh, all: CLIPPED.allHigh, codes: [limits.high, 255] }),
    shadows: oneEnd(mask, picture, counts, { any: CLIPPED.anyLow, all: CLIPPED.allLow, codes: [0, limits.low] }),
  };
}
