import type { CheckThresholds } from '../check-thresholds.ts';
import type { FrameMeasures, TiltMeasure, Uprights } from '../frame-measures.ts';
import { degrees, type FrameCheck, type Rule } from './check.ts';

/**
 * From this certainty on uprights are believed, a horizon only from more: roofs and quays seen at an angle slope as well. Two that
 * are less sure are believed where they say the same.
 */
const SURE = { uprights: 0.3, horizon: 0.55, together: 0.6 };
/** Uprights and a horizon nearer than this in degrees say the same; farther apart than the other they are no signs of one turn. */
const [SAME, CONTRADICTION] = [0.4, 1];
/**
 * Where uprights converge, a picture cropped off its middle seems turned: by this share of what its edge leans when it was cropped
 * by as much of half its width.
 */
const CROPPED = 0.03;

function apart(tilt: TiltMeasure): number {
  return tilt.uprights && tilt.horizon ? Math.abs(tilt.uprights.angle - tilt.horizon.angle) : NaN;
}

/** Uprights that can be believed; null where there are none. */
function sureUprights(tilt: TiltMeasure): Uprights | null {
  const { uprights, horizon } = tilt;
  if (!uprights) return null;
  const together = uprights.certainty + (horizon?.certainty ?? 0);
  const sure = uprights.certainty >= SURE.uprights || (apart(tilt) < SAME && together >= SURE.together);
  return sure ? uprights : null;
}

/** How far a picture is turned, and by what that is seen; null where that is not sure. Degrees, positive clockwise. */
export function turnOf(tilt: TiltMeasure): { angle: number; by: 'uprights' | 'horizon'; doubt: number } | null {
  const uprights = sureUprights(tilt);
  const horizon = tilt.horizon && tilt.horizon.certainty >= SURE.horizon ? tilt.horizon : null;
  if (uprights && horizon && apart(tilt) > CONTRADICTION) return null;
  if (uprights) return { angle: uprights.angle, by: 'uprights', doubt: Math.abs(uprights.converging) * CROPPED };
  return horizon && { angle: horizon.angle, by: 'horizon', doubt: 0 };
}

/** The picture as a whole is turned: horizon and uprights alike. */
export const checkTilt: Rule = (_shot, measures, { tiltDegrees }) => {
  const turn = measures && turnOf(measures.tilt);
  if (!turn || Math.abs(turn.angle) <= tiltDegrees + turn.doubt) return null;
  const side = turn.angle > 0 ? 'right' : 'left';
  const seen = turn.by === 'uprights' ? `uprights lean to the ${side}` : `the horizon falls to the ${side}`;
  return {
    check: 'tilt',
    says: `The picture is turned by ${degrees(turn.angle)}: ${seen}.`,
    short: `tilted ${degrees(turn.angle)}`,
    toCheck: true,
  };
};

/** Uprights that lean towards each other, because the camera looked up or down: often meant, so it is only named. */
export function checkConverging(_shot: unknown, measures: FrameMeasures | null, { convergingDegrees }: CheckThresholds): FrameCheck | null {
  const uprights = measures && sureUprights(measures.tilt);
  if (!uprights || Math.abs(uprights.converging) <= convergingDegrees) return null;
  const way = uprights.converging > 0 ? 'upward' : 'downward';
  const looked = uprights.converging > 0 ? 'up' : 'down';
  return {
    check: 'converging',
    says: `Verticals converge ${way}, by ${degrees(uprights.converging)} at the edges: the camera looked ${looked}.`,
    short: `converging ${way}`,
    toCheck: false,
  };
}
