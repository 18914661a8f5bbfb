import type { RawPicture } from '../upright.ts';
import { PAPER, type FusionConventions } from './fusion/conventions.ts';
import { fuse } from './fusion/fuse.ts';

/** One frame of a bracket. */
export interface Exposure {
  picture: RawPicture;
  /** Stops against any frame of the same bracket; more is brighter. */
  ev: number;
}

/** Why a frame has no part in a merged picture: the camera or everything before it moved, or it has another size. */
export type LeftOutReason = 'moved' | 'size';

export interface LeftOut {
  /** Place in the list that was given. */
  index: number;
  why: LeftOutReason;
}

export interface MergedExposures {
  /** As large as the lead frame. */
  picture: RawPicture;
  /** For each frame in the order given: what lies at (x, y) of the result lies at (x + shift.x, y + shift.y) of the frame. */
  shifts: { x: number; y: number }[];
  leftOut: LeftOut[];
}

/** Merges the frames of a bracket into one picture, as large as the lead frame and lying exactly over it. */
export async function mergeExposures(exposures: Exposure[], lead: number, rule: FusionConventions = PAPER): Promise<MergedExposures> {
  const { width, height } = exposures[lead]!.picture;
  const placed = exposures.map(({ picture }) => ({ picture, shift: { x: 0, y: 0 }, trust: null }));
  return { picture: { data: fuse(placed, rule), width, height, channels: 3 }, shifts: placed.map(({ shift }) => shift), leftOut: [] };
}
