import type { CheckThresholds } from '../check-thresholds.ts';
import { formatShutter } from '../photo-notation.ts';
import type { CheckedShot, Rule } from './check.ts';

/** Nominal times differ from exact ones by less, and 1/100 s is not slower than 1/100 s. */
const EQUAL = 1.001;

/**
 * Stops by which a time is slower than one over the 35 mm equivalent (common practice, no standard): log2(t · f). Null where either
 * is unknown; without an equivalent the focal length itself, which is the milder rule.
 */
export function stopsOverHandRule({ exposureTime, focalLength, focalLength35 }: CheckedShot): number | null {
  const length = focalLength35 || focalLength;
  return exposureTime && length ? Math.log2(exposureTime * length) : null;
}

/** The longest time in seconds that may be held in the hand: 1/100 s with any lens, or one over the 35 mm equivalent. */
function safeTime({ focalLength, focalLength35 }: CheckedShot, { handSpeed }: CheckThresholds): number | null {
  const length = focalLength35 || focalLength;
  return length ? Math.max(1 / handSpeed, 1 / length) : null;
}

function lengthOf({ focalLength, focalLength35 }: CheckedShot): string {
  return `${Math.round(focalLength35 || focalLength || 0)} mm`;
}

/**
 * Shake: slower than can be held in the hand, no bracket and not so long that it must have stood on a tripod; and not measured to
 * be sharp. What is slow but sharp is worth knowing and no more.
 */
export const checkShake: Rule = (shot, measures, thresholds) => {
  const safe = safeTime(shot, thresholds);
  const { exposureTime } = shot;
  if (!exposureTime || !safe || shot.inBracket) return null;
  if (exposureTime <= safe * EQUAL || exposureTime > thresholds.tripodFrom * EQUAL) return null;
  const slow = `${formatShutter(exposureTime)} is slow for the hand at ${lengthOf(shot)}`;
  const sharpness = measures?.sharpness ?? null;
  if (sharpness !== null && sharpness >= thresholds.sharpFrom)
    return { check: 'shake', says: `${slow}; the picture came out sharp.`, short: 'slow, sharp', toCheck: false };
  const found = sharpness === null ? 'it has not been measured how sharp it is' : 'the picture looks soft';
  return { check: 'shake', says: `${slow}, and ${found}.`, short: 'shake risk', toCheck: true };
};
