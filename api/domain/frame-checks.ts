import type { CheckThresholds } from './check-thresholds.ts';
import type { FrameMeasures } from './frame-measures.ts';

/** What can be pointed out on a frame. */
export type CheckName = 'highlights' | 'shadows' | 'shake' | 'tilt' | 'converging' | 'aperture' | 'iso';

/** One thing pointed out on a frame. */
export interface FrameCheck {
  check: CheckName;
  /** A plain sentence. */
  says: string;
  /** A few words for the picture's tile: "31% clipped", "shake risk", "tilted 1.2°". */
  short: string;
  /** Whether somebody should look; false for information alone. */
  toCheck: boolean;
}

/** What the rules need of a frame, in the units of its columns. */
export interface CheckedShot {
  fNumber: number | null;
  /** Seconds. */
  exposureTime: number | null;
  iso: number | null;
  /** Millimetres. */
  focalLength: number | null;
  focalLength35: number | null;
  /** A frame of a bracket is exposed over or under on purpose, and stands on a tripod or is taken in one burst. */
  inBracket: boolean;
}

/** Everything worth pointing out on a frame, what needs a look first. Without measures only the settings are judged. */
export function checkFrame(_shot: CheckedShot, _measures: FrameMeasures | null, _thresholds: CheckThresholds): FrameCheck[] {
  return [];
}
