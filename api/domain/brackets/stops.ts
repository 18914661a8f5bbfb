import { apertureValue, timeValue } from '../exposure.ts';
import type { BracketCandidate } from './candidate.ts';

/**
 * Engraved numbers lie up to 0.093 EV beside the exact thirds they stand for (30 s is 32 s, 1/15 s is 1/16 s, f/11 is f/11.3), so two of them
 * can be off by 0.15: what is that near a third of a stop is taken for that third. Halves, and the free times of a telephone, stay as they are.
 */
const ENGRAVING = 0.095;

function engraved(stops: number): number {
  const third = Math.round(stops * 3) / 3;
  return Math.abs(stops - third) <= ENGRAVING ? third : stops;
}

function known(value: number | null): value is number {
  return value !== null && Number.isFinite(value) && value > 0;
}

/**
 * How bright a frame's settings make its picture, in stops: one more doubles it. Comparable between frames of which the same settings are known;
 * a lens without contacts has no f-number, and adds none. Null without a shutter time.
 */
export function brightness({ exposureTime, fNumber, iso }: Pick<BracketCandidate, 'exposureTime' | 'fNumber' | 'iso'>): number | null {
  if (!known(exposureTime)) return null;
  const aperture = known(fNumber) ? engraved(apertureValue(fNumber)) : 0;
  const sensitivity = known(iso) ? engraved(Math.log2(iso / 100)) : 0;
  return sensitivity - engraved(timeValue(exposureTime)) - aperture;
}

/** Stops to the nearest third or half, whichever is nearer: what cameras can be set to. */
export function inThirds(stops: number): number {
  const [third, half] = [Math.round(stops * 3) / 3, Math.round(stops * 2) / 2];
  const nearer = Math.abs(stops - half) + 0.01 < Math.abs(stops - third) ? half : third;
  return nearer === 0 ? 0 : nearer;
}
