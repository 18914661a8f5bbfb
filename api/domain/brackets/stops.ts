import { apertureValue, timeValue } from '../exposure.ts';
import type { BracketCandidate } from './candidate.ts';

/**
 * Settings are engraved as round numbers, up to 0.093 EV beside the third of a stop they stand for (30 s is 32 s, 1/15 s is 1/16 s, f/11 is f/11.3), and
 * up to 0.178 EV beside the half (1/20 s is 1/22.6 s): what is that near is taken for it. The free times of a telephone stay as they are.
 */
const ENGRAVING = { 3: 0.095, 2: 0.18 };
/** What an exposure was made with; null where it is unknown. */
export type Settings = Pick<BracketCandidate, 'exposureTime' | 'fNumber' | 'iso'>;
/** Steps to a stop of the series a camera is set in. */
export type Series = keyof typeof ENGRAVING;

function engraved(stops: number, series: Series): number {
  const exact = Math.round(stops * series) / series;
  return Math.abs(stops - exact) <= ENGRAVING[series] ? exact : stops;
}

function known(value: number | null): value is number {
  return value !== null && Number.isFinite(value) && value > 0;
}

/**
 * How bright a frame's settings make its picture, in stops: one more doubles it. Comparable between frames of which the same settings are known;
 * a lens without contacts has no f-number, and adds none. Null without a shutter time.
 */
export function brightness({ exposureTime, fNumber, iso }: Settings, series: Series = 3): number | null {
  if (!known(exposureTime)) return null;
  const aperture = known(fNumber) ? engraved(apertureValue(fNumber), series) : 0;
  const sensitivity = known(iso) ? engraved(Math.log2(iso / 100), series) : 0;
  return sensitivity - engraved(timeValue(exposureTime), series) - aperture;
}

/** Stops to the nearest third or half, whichever is nearer: what cameras can be set to. */
export function inThirds(stops: number): number {
  const [third, half] = [Math.round(stops * 3) / 3, Math.round(stops * 2) / 2];
  const nearer = Math.abs(stops - half) + 0.01 < Math.abs(stops - third) ? half : third;
  return nearer === 0 ? 0 : nearer;
}

/** Each value less the one before it. */
export function differences(values: readonly number[]): number[] {
  return values.slice(1).map((value, index) => value - (values[index] as number));
}

/** Steps are even within a sixth of a stop. */
const EVEN = 0.17;

/** The step that all of these are; null where they differ. */
export function evenStep(apart: readonly number[]): number | null {
  const mean = apart.reduce((sum, step) => sum + step, 0) / apart.length;
  return apart.every((step) => Math.abs(step - mean) <= EVEN) ? mean : null;
}

/** How far steps are from even, 0 to some; one that was lost leaves a step of two or three times the others. */
export function unevenness(apart: readonly number[]): number {
  if (evenStep(apart) !== null) return 0;
  const usual = [...apart].sort((one, two) => one - two)[(apart.length - 1) >> 1] as number;
  return apart.reduce((sum, step) => {
    if (Math.abs(step - usual) <= EVEN) return sum;
    return sum + ([2, 3].some((times) => Math.abs(step - times * usual) <= EVEN) ? 0.4 : 0.6);
  }, 0);
}

/** Brightness of frames sorted by it, read in the series of thirds, or in that of halves where the steps are more even there. */
export function ladder(sorted: readonly Settings[]): number[] {
  const [thirds, halves] = ([3, 2] as const).map((series) => sorted.map((one) => brightness(one, series) ?? NaN)) as [number[], number[]];
  if (sorted.length < 3) return thirds;
  return unevenness(differences(halves)) < unevenness(differences(thirds)) ? halves : thirds;
}
