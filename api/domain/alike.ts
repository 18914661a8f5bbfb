/** What the search for near-doubles needs of a frame. */
export interface AlikeFrame {
  id: string;
  /** FrameMeasures.hash */
  hash: string | null;
  /** FrameMeasures.sharpness */
  sharpness: number | null;
  /** Frames of one bracket count as one. */
  bracketId: string | null;
}

/** Frames that show nearly the same. */
export interface AlikeGroup {
  /** In the order they were given; of a bracket, all its frames. */
  frameIds: string[];
  /** Ids of frames of the group; null where fewer than two of it can be compared. */
  sharpest: string | null;
  softest: string | null;
}

/**
 * Groups near-doubles: frames whose hashes differ in at most `bits` of 64, and what is alike with those. Groups and frames come in the
 * order given; a bracket alone is no group.
 */
export function findAlike(_frames: readonly AlikeFrame[], _bits: number): AlikeGroup[] {
  return [];
}
