/** Frames of a bracket at least and at most: 3, 5, 7 and 9 are usual, and some may have been lost or deleted. */
export const FEWEST_EXPOSURES = 2;
export const MOST_EXPOSURES = 9;

/** A frame as far as the search for brackets needs it. Null where the camera wrote nothing. */
export interface BracketCandidate {
  id: string;
  /** File name; it settles what the clock leaves open. */
  name: string;
  /** The camera's wall clock at the beginning of the exposure, "2026-10-28T17:06:12.34". */
  takenLocal: string | null;
  /** The same as an instant, milliseconds since 1970; known only with the camera's zone. */
  takenAt: number | null;
  /** Seconds. */
  exposureTime: number | null;
  fNumber: number | null;
  iso: number | null;
  /** EV. */
  exposureBias: number | null;
  /** 0 automatic, 1 by hand, 2 automatic bracket (CIPA DC-008). */
  exposureMode: number | null;
  make: string | null;
  model: string | null;
  serial: string | null;
  lens: string | null;
  /** Millimetres. */
  focalLength: number | null;
  /** Pixels. */
  width: number;
  height: number;
  /** Base64 of 32 × 32 values of 8-bit gamma-encoded luma, row by row, of the picture squeezed into a square. */
  thumb: string | null;
}

/** Frames of one composition at different exposures. */
export interface FoundBracket {
  /** Darkest first. */
  frameIds: string[];
  /** The frame the camera metered for. */
  leadId: string;
  /** Stops brighter than the lead, in thirds, in the order of `frameIds`. */
  steps: number[];
  /** Why, in words: "5 frames, 2 stops apart, f/11, ISO 100". */
  says: string;
}
