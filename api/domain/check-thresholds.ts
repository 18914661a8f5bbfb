/** From where on a frame is pointed out. The studio's to change. */
export interface CheckThresholds {
  /** Percent of the picture that large clipped areas may take. */
  clippedPercent: number;
  /** Percent of the picture that large blocked shadows may take. */
  blockedPercent: number;
  /** Times at least this short can be held in the hand by anybody: 100 stands for 1/100 s. */
  handSpeed: number;
  /** Seconds: what is exposed for longer stood on a tripod. */
  tripodFrom: number;
  /** Measured sharpness from which on a slow frame in the hand counts as sharp. */
  sharpFrom: number;
  /** Degrees that the horizon or the uprights may be off. */
  tiltDegrees: number;
  /** Degrees by which uprights at the picture's edge may lean in or out, beyond which they are said to converge. */
  convergingDegrees: number;
  /** The f-numbers usual for buildings by daylight. */
  apertureFrom: number;
  apertureTo: number;
  /** Exposure value at ISO 100 from which on it is day. */
  daylightFrom: number;
  /** ISO sensitivity above which noise is worth knowing about. */
  isoAbove: number;
  /** Bits of 64 by which the hashes of near-doubles may differ. */
  alikeBits: number;
}

/**
 * Common practice in photographing buildings, except: daylight, from the exposure values by scene of ANSI PH2.7-1986 (heavy
 * overcast and open shade 12, streets lit by neon 10 at most; a stop is left for exposure compensation); sharpness and the bits of the
 * hash, which were tried on pictures.
 */
export const DEFAULT_THRESHOLDS: CheckThresholds = {
  clippedPercent: 1,
  blockedPercent: 5,
  handSpeed: 100,
  tripodFrom: 0.25,
  sharpFrom: 0.75,
  tiltDegrees: 0.5,
  convergingDegrees: 1.5,
  apertureFrom: 8,
  apertureTo: 16,
  daylightFrom: 11,
  isoAbove: 1600,
  alikeBits: 6,
};
