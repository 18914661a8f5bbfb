import type { CheckThresholds } from './check-thresholds.ts';
import type { CheckedShot, FrameCheck, Rule } from './checks/check.ts';
import { checkHighlights, checkShadows } from './checks/clipping.ts';
import { checkAperture, checkIso } from './checks/settings.ts';
import { checkShake } from './checks/shake.ts';
import { checkConverging, checkTilt } from './checks/tilt.ts';
import type { FrameMeasures } from './frame-measures.ts';

export type { CheckedShot, CheckName, FrameCheck } from './checks/check.ts';

const RULES: readonly Rule[] = [checkHighlights, checkShadows, checkShake, checkTilt, checkConverging, checkAperture, checkIso];

/** Everything worth pointing out on a frame, what needs a look first. Without measures only the settings are judged. */
export function checkFrame(shot: CheckedShot, measures: FrameMeasures | null, thresholds: CheckThresholds): FrameCheck[] {
  const found = RULES.map((rule) => rule(shot, measures, thresholds)).filter((check) => check !== null);
  return found.toSorted((a, b) => Number(b.toCheck) - Number(a.toCheck));
}
