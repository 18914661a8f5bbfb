import { HISTOGRAM_BINS, HISTOGRAM_WHOLE, type Histogram } from '../../domain/frame-measures.ts';
import { linearOf } from '../../domain/srgb.ts';
import type { Counts } from './scan.ts';

function binned(counts: Uint32Array, pixels: number): number[] {
  const codes = 256 / HISTOGRAM_BINS;
  return Array.from({ length: HISTOGRAM_BINS }, (_, bin) => {
    const sum = counts.subarray(bin * codes, (bin + 1) * codes).reduce((total, count) => total + count, 0);
    return Math.round((sum / pixels) * HISTOGRAM_WHOLE);
  });
}

/** The histogram that is kept and drawn. */
export function histogramOf({ red, green, blue, luma }: Counts, pixels: number): Histogram {
  return { red: binned(red, pixels), green: binned(green, pixels), blue: binned(blue, pixels), luma: binned(luma, pixels) };
}

/** The brightest share of a picture that headroom is measured to: less are single sparkles. */
const BRIGHTEST = 0.001;

/** Stops from the brightest 0.1% of the pixels, by their largest channel in linear light, to the limit; 0 from the limit on. */
export function headroomOf({ largest }: Counts, pixels: number, limit: number): number {
  let code = 255;
  for (let above = largest[255]!; above < pixels * BRIGHTEST && code > 1; above += largest[code]!) code--;
  return code >= limit ? 0 : Math.log2(linearOf(255) / linearOf(code));
}
