import type { BracketCandidate } from './candidate.ts';

/** When an exposure was made, on one time line for all frames. Milliseconds. */
export interface Moment {
  begins: number;
  /** The true beginning lies less than this after `begins`: a clock without sub-seconds shows the second that has begun. */
  unsure: number;
}

const FRACTION = /\.\d/;

function wallClock({ takenLocal }: BracketCandidate): number | null {
  const at = takenLocal === null ? NaN : Date.parse(`${takenLocal}Z`);
  return Number.isNaN(at) ? null : at;
}

interface Zoned {
  model: string;
  wall: number;
  ahead: number;
}

/** How far a wall clock is ahead of UTC, from the frame of the same model whose clock showed the nearest time and knew its zone. */
function nearestZone(zoned: readonly Zoned[], model: string, wall: number): number {
  let best: Zoned | null = null;
  for (const one of zoned) {
    if (one.model === model && (best === null || Math.abs(one.wall - wall) < Math.abs(best.wall - wall))) best = one;
  }
  return best?.ahead ?? 0;
}

const modelOf = ({ make, model }: BracketCandidate) => `${make ?? ''}\n${model ?? ''}`;

function zonesOf(frames: readonly BracketCandidate[]): Zoned[] {
  return frames.flatMap((frame) => {
    const wall = wallClock(frame);
    return wall === null || frame.takenAt === null ? [] : [{ model: modelOf(frame), wall, ahead: wall - frame.takenAt }];
  });
}

/**
 * Puts frames on one time line: by their instants, so that a change of zone is none, and by the wall clock where no zone is known. Frames
 * without any time are not in the answer.
 */
export function momentsOf(frames: readonly BracketCandidate[]): Map<BracketCandidate, Moment> {
  const zoned = zonesOf(frames);
  const moments = new Map<BracketCandidate, Moment>();
  for (const frame of frames) {
    const wall = wallClock(frame);
    const begins = frame.takenAt ?? (wall === null ? null : wall - nearestZone(zoned, modelOf(frame), wall));
    if (begins === null) continue;
    const fine = frame.takenLocal === null ? begins % 1000 !== 0 : FRACTION.test(frame.takenLocal);
    moments.set(frame, { begins, unsure: fine ? 0 : 1000 });
  }
  return moments;
}
