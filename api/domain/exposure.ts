/** What an exposure was made with: f-number, time in seconds, ISO sensitivity. Null where unknown. */
export interface Shot {
  fNumber: number | null;
  seconds: number | null;
  iso: number | null;
}

function positive(value: number | null | undefined): value is number {
  return typeof value === 'number' && Number.isFinite(value) && value > 0;
}

/** APEX aperture value, Av = 2·log2(N) (CIPA DC-008, the APEX annex). f/1 is 0, f/2 is 2. */
export function apertureValue(fNumber: number): number {
  return 2 * Math.log2(fNumber);
}

/** APEX time value, Tv = −log2(t), t in seconds. 1 s is 0, 1/4 s is 2. */
export function timeValue(seconds: number): number {
  return -Math.log2(seconds);
}

/** APEX speed value, Sv = log2(ISO / 3.125). ISO 100 is exactly 5. */
export function speedValue(iso: number): number {
  return Math.log2(iso / 3.125);
}

/** f-number from an APEX aperture value. */
export function fNumberFromAperture(av: number): number {
  return 2 ** (av / 2);
}

/**
 * Seconds from an APEX time value; null where the value is beyond what a shutter can do (|Tv| ≥ 100, the bound ExifTool
 * uses too): some cameras write −2147483648 there.
 */
export function secondsFromTime(tv: number): number | null {
  return Number.isFinite(tv) && Math.abs(tv) < 100 ? 2 ** -tv : null;
}

/** Exposure value of the camera's settings, EV = Av + Tv = log2(N²/t). Null where either is unknown. */
export function exposureValue({ fNumber, seconds }: Pick<Shot, 'fNumber' | 'seconds'>): number | null {
  if (!positive(fNumber) || !positive(seconds)) return null;
  return apertureValue(fNumber) + timeValue(seconds);
}

/** Exposure value brought to ISO 100, EV100 = EV − log2(ISO/100): the brightness a shot was set for. Null where unknown. */
export function exposureValue100(shot: Shot): number | null {
  const ev = exposureValue(shot);
  return ev === null || !positive(shot.iso) ? null : ev - Math.log2(shot.iso / 100);
}
