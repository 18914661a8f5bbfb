import type { CheckThresholds } from '../check-thresholds.ts';
import type { FrameMeasures } from '../frame-measures.ts';

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

/** One rule: what it finds on a frame, or nothing. */
export type Rule = (shot: CheckedShot, measures: FrameMeasures | null, thresholds: CheckThresholds) => FrameCheck | null;

/** A share in words: "31%", "2.4%", "0.1%". */
export function percent(share: number): string {
  const value = share * 100;
  return `${Number(value.toFixed(value < 9.95 ? 1 : 0))}%`;
}

/** An angle in words, without its sign: "1.2°". */
export function degrees(angle: number): string {
  return `${Number(Math.abs(angle).toFixed(1))}°`;
}
