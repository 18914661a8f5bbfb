/** The nominal series of thirds of a stop that makers engrave: seconds from 1 s down to 1/8000, as denominators. */
const NOMINAL_DENOMINATORS = [
  1, 1.3, 1.6, 2, 2.5, 3, 4, 5, 6, 8, 10, 13, 15, 20, 25, 30, 40, 50, 60, 80, 100, 125, 160, 200, 250, 320, 400, 500, 640, 800, 1000, 1250,
  1600, 2000, 2500, 3200, 4000, 5000, 6400, 8000,
];
/** The nominal f-numbers of the same series (common practice; the exact values are 2^(k/6)). */
const NOMINAL_F_NUMBERS = [
  1, 1.1, 1.2, 1.4, 1.6, 1.8, 2, 2.2, 2.5, 2.8, 3.2, 3.5, 4, 4.5, 5, 5.6, 6.3, 7.1, 8, 9, 10, 11, 13, 14, 16, 18, 20, 22, 25, 29, 32,
];

function near(value: number, wanted: number, share = 0.003): boolean {
  return Math.abs(value - wanted) <= wanted * share;
}

/** The nominal number that an exact step of the series stands for: 1024 (2^10) is engraved as 1000, f/5.657 as 5.6. */
function engraved(value: number, series: readonly number[], stepsPerDoubling: number): number | null {
  const steps = Math.round(Math.log2(value) * stepsPerDoubling);
  if (!near(value, 2 ** (steps / stepsPerDoubling))) return null;
  return series[steps] ?? null;
}

function trimmed(value: number, digits: number): string {
  return String(Number(value.toFixed(digits)));
}

/** Aperture as people write it: "f/11", "f/5.6". Exact steps take their engraved number. Null for what is no aperture. */
export function formatAperture(fNumber: number | null | undefined): string | null {
  if (!fNumber || !Number.isFinite(fNumber) || fNumber <= 0) return null;
  const shown = engraved(fNumber, NOMINAL_F_NUMBERS, 6) ?? fNumber;
  return `f/${trimmed(shown, shown < 1 ? 2 : 1)}`;
}

/**
 * Shutter time: "1/125 s", "0.4 s", "2.5 s", "30 s". Times up to 0.3 s are fractions; an exact power (1/1024 s) takes its
 * nominal name (1/1000 s), any other time keeps its own (1/1205 s).
 */
export function formatShutter(seconds: number | null | undefined): string | null {
  if (!seconds || !Number.isFinite(seconds) || seconds <= 0) return null;
  if (seconds > 0.34) return `${trimmed(seconds, seconds < 10 ? 1 : 0)} s`;
  const denominator = engraved(1 / seconds, NOMINAL_DENOMINATORS, 3) ?? 1 / seconds;
  const nominal = NOMINAL_DENOMINATORS.find((one) => near(1 / seconds, one));
  return `1/${Math.round(nominal ?? denominator)} s`;
}

/** Sensitivity: "ISO 100". 0 and 65535 ("see another tag", CIPA DC-008) are unknown. */
export function formatIso(iso: number | null | undefined): string | null {
  if (!iso || !Number.isFinite(iso) || iso <= 0 || iso === 65535) return null;
  return `ISO ${Math.round(iso)}`;
}

/** Focal length: "35 mm", "4.2 mm"; with its 35 mm equivalent where it differs: "16 mm (24 mm)". 0 means unknown. */
export function formatFocalLength(mm: number | null | undefined, equivalent?: number | null): string | null {
  if (!mm || !Number.isFinite(mm) || mm <= 0) return null;
  const own = `${trimmed(mm, mm < 10 ? 1 : 0)} mm`;
  if (!equivalent || Math.abs(equivalent - mm) < 0.5) return own;
  return `${own} (${Math.round(equivalent)} mm)`;
}

/** Exposure bias: "+2/3", "−1", "±0"; values a camera cannot mean (beyond 10 EV) are unknown. */
export function formatBias(ev: number | null | undefined): string | null {
  if (ev === null || ev === undefined || !Number.isFinite(ev) || Math.abs(ev) > 10) return null;
  const size = Math.abs(ev);
  if (size < 0.05) return '±0 EV';
  return `${ev < 0 ? '−' : '+'}${thirdsOrHalves(size)} EV`;
}

function thirdsOrHalves(size: number): string {
  const whole = Math.floor(size + 0.04);
  const rest = size - whole;
  const fractions: [number, string][] = [
    [0, ''],
    [1 / 3, '1/3'],
    [1 / 2, '1/2'],
    [2 / 3, '2/3'],
  ];
  const found = fractions.find(([value]) => Math.abs(rest - value) <= 0.04);
  if (!found) return trimmed(size, 2);
  return [whole > 0 ? String(whole) : '', found[1]].filter(Boolean).join(' ');
}

/** The settings of a frame in one line: "f/11 · 1/125 s · ISO 100 · 35 mm". Unknown ones are left out. */
export function formatShot(shot: {
  fNumber?: number | null;
  seconds?: number | null;
  iso?: number | null;
  focalLength?: number | null;
}): string {
  return [formatAperture(shot.fNumber), formatShutter(shot.seconds), formatIso(shot.iso), formatFocalLength(shot.focalLength)]
    .filter((part) => part !== null)
    .join(' · ');
}
