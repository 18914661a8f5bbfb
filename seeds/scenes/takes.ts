/** The commissions of the demo that were photographed. */
export type Assignment = 'library' | 'bridges' | 'skyline' | 'exchange';

/** A finished file made from a take: developed anew, as if merged and retouched. */
export interface Finish {
  suffix: string;
  format: 'jpeg' | 'tiff';
  /** How far shadows and lights are brought together, 0 to 1. */
  evened: number;
  /** Factor on red against blue. */
  warmth: number;
}

/** One time the shutter was pressed, or one bracket: a single drawing, exposed once or several times. */
export interface Take {
  scene: string;
  /** Exposures in steps from what the meter said, in the order they were taken. */
  steps: readonly number[];
  step?: readonly [number, number, number];
  roll?: number;
  /** The camera moved: length of the smear as a share of the picture's width. */
  shake?: number;
  aperture?: number;
  sensitivity?: number;
  format?: 'tiff' | 'p3';
  place?: readonly [number, number];
  /** Minutes after the take before. */
  pause: number;
  finishes?: readonly Finish[];
}

const single = [0] as const;
const three = [0, -2, 2] as const;
const five = [-2, -1, 0, 1, 2] as const;
const finish = (suffix = '_final', format: 'jpeg' | 'tiff' = 'jpeg', evened = 0.3, warmth = 1.01): Finish => ({
  suffix,
  format,
  evened,
  warmth,
});

/** Day's work of each assignment: how many days ago it was, the first number on the card, and its takes in order. */
export const assignments: Record<Assignment, { daysAgo: number; firstNumber: number; takes: readonly Take[] }> = {
  skyline: {
    daysAgo: 45,
    firstNumber: 183,
    takes: [
      { scene: 'skyline-morning', steps: single, pause: 0, finishes: [finish()] },
      { scene: 'skyline-morning', steps: single, step: [1.4, 0, 0], pause: 1 },
      { scene: 'docks-fog', steps: single, pause: 40 },
      { scene: 'skyline-against', steps: [1.7], pause: 120 },
      { scene: 'skyline-long', steps: single, format: 'tiff', sensitivity: 200, pause: 95, finishes: [finish('_final', 'tiff', 0.25)] },
      { scene: 'skyline-dusk', steps: three, pause: 60, finishes: [finish(), finish('_final-v2', 'jpeg', 0.4, 1.04)] },
      { scene: 'skyline-dusk', steps: single, roll: 1.2, pause: 2 },
      { scene: 'roofs-dusk', steps: single, pause: 12, finishes: [finish()] },
      { scene: 'skyline-blue', steps: three, pause: 14, finishes: [finish('_final', 'jpeg', 0.35)] },
    ],
  },
  exchange: {
    daysAgo: 27,
    firstNumber: 266,
    takes: [
      { scene: 'exchange-day', steps: single, pause: 0 },
      { scene: 'exchange-up', steps: single, format: 'tiff', pause: 80 },
      { scene: 'harrow-lane', steps: single, pause: 20 },
      { scene: 'exchange-blue', steps: three, pause: 90 },
      { scene: 'exchange-night', steps: three, pause: 60, sensitivity: 200, aperture: 5.6 },
      { scene: 'lane-night', steps: single, pause: 15, sensitivity: 400, aperture: 5.6 },
    ],
  },
  bridges: {
    daysAgo: 19,
    firstNumber: 331,
    takes: [
      { scene: 'arches-dawn', steps: three, pause: 0 },
      { scene: 'needle-walk', steps: three, pause: 130 },
      { scene: 'swing-portrait', steps: single, pause: 25 },
      { scene: 'swing-portrait', steps: single, shake: 0.006, aperture: 16, pause: 1 },
      { scene: 'swing-day', steps: single, pause: 70, place: [-41.2, -112.5] },
      { scene: 'bridges-long', steps: single, sensitivity: 200, pause: 60 },
      { scene: 'needle-dusk', steps: single, format: 'p3', pause: 55 },
      { scene: 'arches-blue', steps: five, pause: 16 },
    ],
  },
  library: {
    daysAgo: 6,
    firstNumber: 412,
    takes: [
      { scene: 'library-dawn', steps: five, pause: 0 },
      { scene: 'library-fog', steps: single, pause: 35 },
      { scene: 'library-approach', steps: single, pause: 70 },
      { scene: 'library-oriel', steps: single, pause: 60 },
      { scene: 'library-oriel', steps: single, step: [-0.9, 0, 0], pause: 1 },
      { scene: 'library-oriel', steps: single, step: [-1.7, 0.1, 0], pause: 1 },
      { scene: 'library-up', steps: single, pause: 100 },
      { scene: 'library-afternoon', steps: single, format: 'tiff', pause: 25 },
      { scene: 'library-gable', steps: single, pause: 70 },
      { scene: 'library-gable', steps: single, step: [1.1, 0, 0.4], pause: 2 },
      { scene: 'library-blue', steps: five, pause: 95 },
      { scene: 'library-blue', steps: [0.7], pause: 3 },
    ],
  },
};
