import type { Format } from './scene.ts';

/** Camera, lens and exposure of a frame. The makers are invented. */
export interface Settings {
  make: string;
  model: string;
  serial: string;
  lens: string;
  lensSerial: string;
  /** Focal length in mm, and as it would be on a sensor 36 mm wide. */
  focal: number;
  focalAs35: number;
  aperture: number;
  sensitivity: number;
  /** Exposure time in seconds as a camera names it. */
  seconds: number;
}

/** Shutter times as cameras name them, a third of a step apart; each third is exactly 2^(1/3) in truth. */
const TIMES = [
  30, 25, 20, 15, 13, 10, 8, 6, 5, 4, 3.2, 2.5, 2, 1.6, 1.3, 1, 0.8, 0.6, 0.5, 0.4, 0.3, 1 / 4, 1 / 5, 1 / 6, 1 / 8, 1 / 10,
  1 / 13, 1 / 15, 1 / 20, 1 / 25, 1 / 30, 1 / 40, 1 / 50, 1 / 60, 1 / 80, 1 / 100, 1 / 125, 1 / 160, 1 / 200, 1 / 250, 1 / 320,
  1 / 400, 1 / 500, 1 / 640, 1 / 800, 1 / 1000, 1 / 1250, 1 / 1600, 1 / 2000, 1 / 2500, 1 / 3200, 1 / 4000, 1 / 5000, 1 / 6400,
  1 / 8000,
]; // prettier-ignore
/** Where one second stands in the list. */
const ONE_SECOND = 15;

/** The time that gives a right exposure, changed by `steps`: t = N^2 / 2^EV at ISO 100 (ISO 2720). */
export function shutter(exposureValue: number, aperture: number, sensitivity: number, steps: number): number {
  const exact = (aperture * aperture) / 2 ** exposureValue / (sensitivity / 100);
  const thirds = ONE_SECOND - Math.round(Math.log2(exact) * 3) - Math.round(steps * 3);
  return TIMES[Math.min(TIMES.length - 1, Math.max(0, thirds))]!;
}

const lenses = [
  { from: 16, to: 35, name: 'Harbour Optical 16-35 mm f/4', serial: '16350718' },
  { from: 24, to: 70, name: 'Harbour Optical 24-70 mm f/4', serial: '24701166' },
  { from: 70, to: 200, name: 'Harbour Optical 70-200 mm f/4', serial: '70200392' },
];

/** The 4:3 frames come from the studio's small second camera, whose sensor is 17.3 mm wide. */
const SMALL_SENSOR = 17.3 / 36;

/** Camera and lens for a view of that focal length (as on 36 mm). */
export function kit(format: Format, focal: number): Omit<Settings, 'aperture' | 'sensitivity' | 'seconds'> {
  const make = 'Harbour Optical';
  if (format === 'four-thirds') {
    const real = Math.round(focal * SMALL_SENSOR * 10) / 10;
    return {
      make,
      model: 'HO-4c',
      serial: 'HO4C-01938',
      lens: 'Harbour Optical 8-40 mm f/2.8',
      lensSerial: '08400051',
      focal: real,
      focalAs35: focal,
    };
  }
  const lens = lenses.find((each) => focal >= each.from && focal <= each.to);
  if (!lens) throw new Error(`The studio has no lens of ${focal} mm.`);
  return { make, model: 'HO-7', serial: 'HO7-004127', lens: lens.name, lensSerial: lens.serial, focal, focalAs35: focal };
}
