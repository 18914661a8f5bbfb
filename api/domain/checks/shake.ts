import type { CheckThresholds } from '../check-thresholds.ts';
import { formatShutter } from '../photo-notation.ts';
import type { CheckedShot, Rule } from './check.ts';

/** Nominal times differ from exact ones by less, and 1/100 s is not slower than 1/100 s. */
const EQUAL = 1.001;

/** The 35 mm equivalent in millimetres; where that is unknown the focal length itself, which is the milder rule. */
function lengthOf({ focalLength, focalLength35 }: CheckedShot): number | null {
  return focalLength35 || focalLength || null;
}

/** The longest time in seconds that may be held in the hand: 1/100 s with any lens, or one over its length (common practice, no standard). */
function safeTime(length: number, { handSpeed }: CheckThresholds): number {
  return Math.max(1 / handSpeed, 1 / length);
}

/**
 * Shake: slower than can be held in the hand, no bracket and not so long that it must have stood on a tripod; and not measured to
 * be sharp. What is slow but sharp is worth knowing and no more.
 */
export const checkShake: Rule = (shot, measures, thresholds) => {
  const { exposureTime, inBracket } = shot;
  const length = lengthOf(shot);
  if (!exposureTime || !length || inBracket) return null;
  const safe = safeTime(length, thresholds);
  if (exposureTime <= safe * EQUAL || exposureTime > thresholds.tripodFrom * EQUAL) return null;
  const slow = `${formatShutter(exposureTime)} is slow for the hand at ${Math.round(length)} mm`;
  const sharpness = measures?.sharpness ?? null;
  if (sharpness !== null && sharpness >= thresholds.sharpFrom)
    return { check: 'shake', says: `${slow}; the picture came out sharp.`, short: 'slow, sharp', toCheck: false };
  const found = sharpness === null ? 'it has not been measured how sharp it is' : 'the picture looks soft';
  return { check: 'shake', says: `${slow}, and ${found}.`, short: 'shake risk', toCheck: true };
};
