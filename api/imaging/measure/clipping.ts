import { CLIPPED, type Limits } from '../../domain/clipping.ts';
import type { AtLimit } from '../../domain/frame-measures.ts';
import { type Areas, findAreas, LARGE_AREA } from './areas.ts';
import type { Scan } from './scan.ts';

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

const NONE: Areas = { inLarge: 0, largest: 0, spots: 0 };

function measureEnd({ counts, luma, mask, combinations }: Scan, { any, all, from, to }: End): AtLimit {
  const { width, height } = luma;
  const marked = (bit: number) => sumWhere(combinations, (at) => (at & bit) > 0) / mask.length;
  const channel = (codes: Uint32Array) => sumWhere(codes, (code) => code >= from && code <= to) / mask.length;
  const areas = marked(all) === 0 ? NONE : findAreas(mask, width, height, all);
  return {
    any: marked(any),
    all: marked(all),
    red: channel(counts.red),
    green: channel(counts.green),
    blue: channel(counts.blue),
    areas: areas.inLarge,
    areasAny: marked(any) < LARGE_AREA ? 0 : findAreas(mask, width, height, any).inLarge,
    largest: areas.largest,
    spots: areas.spots,
  };
}

/** Measures what lies at either end of the scale, how much and in what pieces. */
export function measureClipping(scan: Scan, { high, low }: Limits): { highlights: AtLimit; shadows: AtLimit } {
  return {
    highlights: measureEnd(scan, { any: CLIPPED.anyHigh, all: CLIPPED.allHigh, from: high, to: 255 }),
    shadows: measureEnd(scan, { any: CLIPPED.anyLow, all: CLIPPED.allLow, from: 0, to: low }),
  };
}
