import type { RawPicture } from '../upright.ts';
import { alignExposures, type GreyExposure } from './align/align-exposures.ts';
import { greyOf, greyScale, type Grey } from './align/grey-pyramid.ts';
import { patchFor, referenceOf } from './align/patch.ts';
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

export interface MergeOptions {
  rule?: FusionConventions;
  /** Whether frames are laid over the lead frame. True where nothing is said. */
  align?: boolean;
  /** Whether what moved is taken from the lead frame alone. True where nothing is said. */
  deghost?: boolean;
}

/** A picture without any colour has no saturation to be weighed by; every pixel would count the same. */
function isGrey({ picture: { data, channels } }: Exposure): boolean {
  for (let at = 0; at < data.length; at += channels) if (data[at] !== data[at + 1] || data[at] !== data[at + 2]) return false;
  return true;
}

const sameSize = (one: RawPicture, other: RawPicture) => one.width === other.width && one.height === other.height;

function findable({ picture, ev }: Exposure, index: number): GreyExposure {
  let fine: Grey | undefined;
  return { index, ev, scale: greyScale(picture), grey: greyOf(picture), fine: () => (fine ??= greyOf(picture, 1)) };
}

/** How the frames of one size lie over the lead frame, and what is patched in them; none for one that cannot be laid over it. */
function place(exposures: Exposure[], indexes: number[], lead: number, { align = true, deghost = true }: MergeOptions) {
  const greys = indexes.map((index) => findable(exposures[index]!, index));
  const first = greys.find(({ index }) => index === lead)!;
  const scale = greyScale(exposures[lead]!.picture);
  const shifts = align ? alignExposures(greys, first) : new Map(indexes.map((index) => [index, { x: 0, y: 0 }]));
  const reference = deghost ? referenceOf(exposures[lead]!.picture, first.grey) : null;
  return greys.map(({ index, grey }) => {
    const found = shifts.get(index);
    if (!found) return { index, frame: null };
    const patch = reference && index !== lead ? patchFor(reference, grey, found, scale) : null;
    const shift = { x: Math.round(found.x * scale) + 0, y: Math.round(found.y * scale) + 0 };
    return { index, frame: { picture: exposures[index]!.picture, shift, patch } };
  });
}

/**
 * Merges the frames of a bracket into one picture that lies exactly over the lead frame: exposure fusion (`fuse`) of what could be aligned by
 * translation (`alignExposures`), what moved being taken from the lead frame (`patchFor`). Where a frame does not reach after it was moved it has no weight there.
 * @param lead Place in the list of the frame that the others are laid over; it always takes part, alone where no other can.
 * @throws RangeError where there is no frame at that place.
 */
export function mergeExposures(exposures: Exposure[], lead: number, options: MergeOptions = {}): MergedExposures {
  const first = exposures[lead];
  if (!first) throw new RangeError(`There is no frame ${lead} to lay the others over.`);
  const alike = [...exposures.keys()].filter((index) => sameSize(exposures[index]!.picture, first.picture));
  const placed = place(exposures, alike, lead, options);
  const frames = placed.map(({ frame }) => frame).filter((frame) => frame !== null);
  const rule = options.rule ?? PAPER;
  const grey = exposures.every(isGrey);
  const { width, height } = first.picture;
  const leftOut = exposures.flatMap((_, index): LeftOut[] => {
    if (!alike.includes(index)) return [{ index, why: 'size' }];
    return placed.some((one) => one.index === index && one.frame) ? [] : [{ index, why: 'moved' }];
  });
  return {
    picture: { data: fuse(frames, grey ? { ...rule, saturation: 0 } : rule), width, height, channels: 3 },
    shifts: exposures.map((_, index) => placed.find((one) => one.index === index)?.frame?.shift ?? { x: 0, y: 0 }),
    leftOut,
  };
}
