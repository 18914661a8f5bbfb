/** Version of the measuring: what was measured under another number is measured again. */
export const MEASURES_RECIPE = 1;

/** Bins of the histogram: the viewer draws it some 256 px wide, and the shares at the limits stand beside it exactly. */
export const HISTOGRAM_BINS = 64;

/** A histogram's unit: parts of 100,000 of the picture, so that whole numbers say enough and take little room. */
export const HISTOGRAM_WHOLE = 100_000;

/**
 * How often each tone occurs, in parts of 100,000 of the picture's pixels. Bin i counts the sRGB codes 4i to 4i + 3; luma is
 * Rec. 709 of the gamma-encoded channels.
 */
export interface Histogram {
  red: number[];
  green: number[];
  blue: number[];
  luma: number[];
}

/** What lies at one end of the scale, as shares of the picture, 0 to 1. */
export interface AtLimit {
  /** Pixels with at least one channel at the limit. */
  any: number;
  /** Pixels with all three channels at the limit. */
  all: number;
  red: number;
  green: number;
  blue: number;
  /** Large connected areas of pixels with all channels at the limit: a sky, not a lamp. */
  areas: number;
  /** The same for at least one channel. */
  areasAny: number;
  /** The largest of the connected areas with all channels at the limit. */
  largest: number;
  /** How many separate small spots there are beside the large areas. */
  spots: number;
}

/** A direction found in a picture. */
export interface Direction {
  /** Degrees; positive where the picture is turned clockwise: the horizon falls to the right, uprights lean to the right. */
  angle: number;
  /** 0 to 1: how much of what is nearly level or upright agrees, and how far it reaches. */
  certainty: number;
}

/** Uprights of a picture. */
export interface Uprights extends Direction {
  /**
   * Degrees by which an upright at the right edge leans to the left more than one in the middle: positive where uprights
   * converge upward (the camera looked up), negative where they converge downward.
   */
  converging: number;
}

/** Which way the straight things in a picture lie. Null where there are too few to say. */
export interface TiltMeasure {
  horizon: Direction | null;
  uprights: Uprights | null;
}

/** What is measured on a picture, by the recipe's number. Plain JSON, some 3 kB. */
export interface FrameMeasures {
  recipe: number;
  /** Pixels of the picture that was measured. */
  width: number;
  height: number;
  histogram: Histogram;
  highlights: AtLimit;
  shadows: AtLimit;
  /**
   * Stops between the brightest 0.1% of the picture (by its largest channel, in linear light of sRGB) and the limit; 0 where
   * that is at the limit. Says what the developed file could still be brightened by, not what the sensor could have taken.
   */
  headroom: number;
  /**
   * Variance of the Laplacian over the variance of the picture itself, on the sharpest tiles, without the noise's part, at 1280 px
   * along the longer side: neither exposure nor contrast nor size decides. Compares pictures of like things; null where no
   * tile has anything in it.
   */
  sharpness: number | null;
  tilt: TiltMeasure;
  /** Perceptual hash, 64 bits in hex (imaging/measure/hash.ts); null for a picture without anything in it. */
  hash: string | null;
  /** 32 × 32 pixels of luma (Rec. 709, gamma-encoded, 8 bits), averaged by area from the picture squeezed to a square, row by row, in base64. */
  thumb: string;
}
