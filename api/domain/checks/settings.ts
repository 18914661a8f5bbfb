import { exposureValue100 } from '../exposure.ts';
import { formatAperture, formatIso } from '../photo-notation.ts';
import type { Rule } from './check.ts';

/** f/7.9 is f/8: cameras write what they measure. */
const NEARLY = 1.02;

/** An f-number that is unusual for buildings by daylight (common practice: f/8 in the hand to f/16 on a tripod). */
export const checkAperture: Rule = ({ fNumber, exposureTime, iso }, _measures, { apertureFrom, apertureTo, daylightFrom }) => {
  const ev = exposureValue100({ fNumber, seconds: exposureTime, iso });
  if (fNumber === null || ev === null || ev < daylightFrom) return null;
  if (fNumber * NEARLY >= apertureFrom && fNumber <= apertureTo * NEARLY) return null;
  const shown = formatAperture(fNumber) ?? '';
  const usual = `${formatAperture(apertureFrom)} to ${formatAperture(apertureTo)}`;
  return { check: 'aperture', says: `${shown} by daylight; ${usual} is usual for buildings.`, short: shown, toCheck: false };
};

/** A sensitivity at which noise begins to show. */
export const checkIso: Rule = ({ iso }, _measures, { isoAbove }) => {
  const shown = formatIso(iso);
  if (iso === null || shown === null || iso <= isoAbove) return null;
  return { check: 'iso', says: `${shown}: noise may show in large prints.`, short: shown, toCheck: false };
};
