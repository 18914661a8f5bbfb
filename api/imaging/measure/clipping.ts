import { CLIPPED, markClipped, type Limits } from '../../domain/clipping.ts';
import type { AtLimit } from '../../domain/frame-measures.ts';
import type { RawPicture } from '../upright.ts';
import { findAreas } from './areas.ts';
import type { Counts } from './histogram.ts';

/** How often each combination of the mask's bits occurs. */
function countBits(mask: Uint8Array): Uint32Array {
  const counts = new Uint32Array(16);
  for (let pixel = 0; pixel < mask.length; pixel++) counts[mask[pixel]!]!++;
  return counts;
}

function sumWhere(counts: Uint32Array, wanted: (at: number) => boolean): number {
  return counts.reduce((sum, count, at) => (wanted(at) ? sum + count : sum), 0);
}

/** Bits of the mask and codes of one end of the scale. */
interface End {
  any: number;
  all: number;
  from: number;
  to: number;
}

function measureEnd(
  mask: Uint8Array,
  bits: Uint32Array,
  { width, height }: RawPicture,
  codes: Counts,
  { any, all, from, to }: End,
): AtLimit {
  const marked = (bit: number) => sumWhere(bits, (at) => (at & bit) > 0) / mask.length;
  const channel = (counts: Uint32Array) => sumWhere(counts, (code) => code >= from && code <= to) / mask.length;
  const areas = findAreas(mask, width, height, all);
  return {
    any: marked(any),
    all: marked(all),
    red: channel(codes.red),
    green: channel(codes.green),
    blue: channel(codes.blue),
    areas: areas.inLarge,
    areasAny: marked(any) > marked(all) ? findAreas(mask, width, height, any).inLarge : areas.inLarge,
    largest: areas.largest,
    spots: areas.spots,
  };
}

/** Measures what lies at either end of the scale, how much and in what pieces. */
export function measureClipping(picture: RawPicture, codes: Counts, { high, low }: Limits): { highlights: AtLimit; shadows: AtLimit } {
  const mask = markClipped(picture.data, picture.channels, { high, low });
  const bits = countBits(mask);
  return {
    highlights: measureEnd(mask, bits, picture, codes, { any: CLIPPED.anyHigh, all: CLIPPED.allHigh, from: high, to: 255 }),
    shadows: measureEnd(mask, bits, picture, codes, { any: CLIPPED.anyLow, all: CLIPPED.allLow, from: 0, to: low }),
  };
}
