import { raw } from 'objection';
import type { FrameCheck } from '../../contract/frames.ts';
import type { StudioScope } from '../../db/scope.ts';
import { type CheckThresholds, DEFAULT_THRESHOLDS } from '../../domain/check-thresholds.ts';
import { checkFrame } from '../../domain/frame-checks.ts';
import type { FrameMeasures } from '../../domain/frame-measures.ts';
import { Frame } from '../../models/Frame.ts';
import { Studio } from '../../models/Studio.ts';

/** What the checks look at of the measures: not the two parts that make up most of their bytes. */
export const LEAN_MEASURES = `(select m.measures - '{histogram,thumb}'::text[] from frame_measures m where m.frame_id = frames.id) as measures`;

/** A frame with its measures, or those parts of them that checks look at. */
export type CheckedFrame = Frame & { measures: FrameMeasures | null };

/** From where on frames of a studio are pointed out. */
export async function thresholdsOf({ studioId }: StudioScope): Promise<CheckThresholds> {
  const studio = await Studio.query().findById(studioId).select('checkThresholds');
  return { ...DEFAULT_THRESHOLDS, ...studio?.checkThresholds };
}

/** What there is to know about a frame; worked out anew each time, so that it follows the thresholds at once. */
export function checksOf(frame: CheckedFrame, thresholds: CheckThresholds): FrameCheck[] {
  return frame.state === 'ready'
    ? checkFrame({ ...settingsOf(frame), inBracket: frame.bracketId !== null }, frame.measures, thresholds)
    : [];
}

function settingsOf({ fNumber, exposureTime, iso, focalLength, focalLength35 }: Frame) {
  return { fNumber, exposureTime, iso, focalLength, focalLength35 };
}

/** How many frames of a commission have something that somebody should look at; those that are hidden aside. */
export async function countToCheck(scope: StudioScope, commissionId: string): Promise<number> {
  const thresholds = await thresholdsOf(scope);
  const frames = await Frame.within(scope)
    .where({ commissionId })
    .whereNull('deletedAt')
    .whereNull('hiddenAt')
    .select('state', 'bracketId', 'fNumber', 'exposureTime', 'iso', 'focalLength', 'focalLength35', raw(LEAN_MEASURES))
    .castTo<CheckedFrame[]>();
  return frames.filter((frame) => checksOf(frame, thresholds).some(({ toCheck }) => toCheck)).length;
}
