import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CheckThresholds } from '../../api/contract/checks.ts';
import { DEFAULT_THRESHOLDS } from '../../api/domain/check-thresholds.ts';
import { checkFrame, type CheckedShot } from '../../api/domain/frame-checks.ts';
import { headroomWords } from '../../api/domain/headroom.ts';
import type { AtLimit, FrameMeasures, TiltMeasure } from '../../api/domain/frame-measures.ts';

const SHOT: CheckedShot = { fNumber: 8, exposureTime: 1 / 250, iso: 100, focalLength: 35, focalLength35: 35, inBracket: false };
const NOTHING: AtLimit = { any: 0, all: 0, red: 0, green: 0, blue: 0, areas: 0, areasAny: 0, largest: 0, spots: 0 };
const LEVEL: TiltMeasure = { horizon: { angle: 0, certainty: 0.8 }, uprights: { angle: 0, converging: 0, certainty: 0.8 } };
const bins = Array<number>(64).fill(0);
const MEASURES: FrameMeasures = {
  recipe: 1,
  width: 2560,
  height: 1707,
  histogram: { red: bins, green: bins, blue: bins, luma: bins },
  highlights: NOTHING,
  shadows: NOTHING,
  headroom: 1,
  sharpness: 2,
  tilt: LEVEL,
  hash: null,
  thumb: '',
};

const found = (shot: Partial<CheckedShot>, measures: Partial<FrameMeasures> | null = {}) =>
  checkFrame({ ...SHOT, ...shot }, measures && { ...MEASURES, ...measures }, DEFAULT_THRESHOLDS);
const one = (name: string, ...args: Parameters<typeof found>) => found(...args).find(({ check }) => check === name);

it('says nothing of an ordinary frame, measured or not', () => {
  expect(found({})).toEqual([]);
  expect(found({}, null)).toEqual([]);
  expect(found({ fNumber: null, exposureTime: null, iso: null, focalLength: null, focalLength35: null }, null)).toEqual([]);
});

// Common practice, no standard: the longest time in the hand is one over the 35 mm equivalent; 1/100 s is safe with any lens.
describe('shake', () => {
  it.each<[string, Partial<CheckedShot>, boolean]>([
    ['85 mm at 1/60 s', { focalLength35: 85, exposureTime: 1 / 60 }, true],
    ['85 mm at 1/80 s', { focalLength35: 85, exposureTime: 1 / 80 }, true],
    ['85 mm at 1/100 s', { focalLength35: 85, exposureTime: 1 / 100 }, false],
    ['200 mm at 1/125 s: safe with any lens', { focalLength35: 200, exposureTime: 1 / 125 }, false],
    ['24 mm at 1/25 s', { focalLength35: 24, exposureTime: 1 / 25 }, false],
    ['24 mm at 1/20 s', { focalLength35: 24, exposureTime: 1 / 20 }, true],
    ['1/4 s', { exposureTime: 1 / 4 }, true],
    ['0.3 s: a tripod then', { exposureTime: 0.3 }, false],
    ['a bracket', { exposureTime: 1 / 15, inBracket: true }, false],
    ['a small sensor: 16 mm is 24 mm', { focalLength: 16, focalLength35: 24, exposureTime: 1 / 20 }, true],
    ['no equivalent: the focal length itself', { focalLength: 50, focalLength35: null, exposureTime: 1 / 40 }, true],
    ['an equivalent of 0, which is unknown', { focalLength: 50, focalLength35: 0, exposureTime: 1 / 60 }, false],
    ['no focal length at all', { focalLength: null, focalLength35: null, exposureTime: 1 / 40 }, false],
  ])('%s', (_what, shot, risk) => {
    expect(Boolean(one('shake', shot, { sharpness: 0.1 }))).toBe(risk);
    expect(Boolean(one('shake', shot, null))).toBe(risk);
  });

  it('is to be looked at where the picture is soft or not measured, and only told where it is sharp', () => {
    const slow = { focalLength35: 85, exposureTime: 1 / 60 };
    expect(one('shake', slow, { sharpness: 0.3 })).toEqual({
      check: 'shake',
      says: '1/60 s is slow for the hand at 85 mm, and the picture looks soft.',
      short: 'shake risk',
      toCheck: true,
    });
    expect(one('shake', slow, null)).toMatchObject({ short: 'shake risk', toCheck: true });
    expect(one('shake', slow, { sharpness: null })).toMatchObject({ toCheck: true });
    expect(one('shake', slow, { sharpness: 2 })).toMatchObject({ short: 'slow, sharp', toCheck: false });
  });
});

describe('highlights and shadows', () => {
  const sky: AtLimit = { ...NOTHING, any: 0.31, all: 0.28, red: 0.28, green: 0.29, blue: 0.31, areas: 0.27, areasAny: 0.3, largest: 0.27 };
  const lamps: AtLimit = { ...NOTHING, any: 0.024, all: 0.02, spots: 40 };

  it('a clipped sky is an alarm, lamps of as many pixels are not', () => {
    expect(one('highlights', {}, { highlights: sky })).toEqual({
      check: 'highlights',
      says: '31% of the picture is clipped in at least one colour, 28% in all three; 30% lies in large areas.',
      short: '31% clipped',
      toCheck: true,
    });
    expect(one('highlights', {}, { highlights: lamps })).toMatchObject({ short: '2.4% clipped', toCheck: false });
    expect(one('highlights', {}, { highlights: lamps })?.says).toContain('small spots');
    expect(one('highlights', {}, { highlights: { ...lamps, any: 0.009, all: 0.009 } })).toBeUndefined();
  });

  it('one colour alone needs five times the area', () => {
    const colour = (areasAny: number): AtLimit => ({ ...NOTHING, any: areasAny, blue: areasAny, areasAny });
    expect(one('highlights', {}, { highlights: colour(0.03) })?.toCheck).toBe(false);
    expect(one('highlights', {}, { highlights: colour(0.06) })?.toCheck).toBe(true);
  });

  it('are no alarm in a bracket, and keep their figure', () => {
    const check = one('highlights', { inBracket: true }, { highlights: sky });
    expect(check).toMatchObject({ short: '31% clipped', toCheck: false });
    expect(check?.says).toMatch(/The other exposures of its bracket hold that\.$/);
    expect(one('shadows', { inBracket: true }, { shadows: sky })).toMatchObject({ short: '28% black', toCheck: false });
  });

  it('blocked shadows are an alarm in large areas alone; a deep colour is none', () => {
    expect(one('shadows', {}, { shadows: sky })).toMatchObject({ short: '28% black', toCheck: true });
    expect(one('shadows', {}, { shadows: { ...NOTHING, all: 0.06, any: 0.3 } })?.toCheck).toBe(false);
    expect(one('shadows', {}, { shadows: { ...NOTHING, any: 0.5, areasAny: 0.5 } })).toBeUndefined();
  });
});

describe('tilt', () => {
  const tilt = (
    uprights: Partial<NonNullable<TiltMeasure['uprights']>> | null,
    horizon: Partial<NonNullable<TiltMeasure['horizon']>> | null = null,
  ) => ({
    tilt: {
      uprights: uprights && { angle: 0, converging: 0, certainty: 0.8, ...uprights },
      horizon: horizon && { angle: 0, certainty: 0.8, ...horizon },
    },
  });

  it('is told from half a degree on, with its side', () => {
    expect(one('tilt', {}, tilt({ angle: 0.5 }))).toBeUndefined();
    expect(one('tilt', {}, tilt({ angle: 1.2 }, { angle: 1.3 }))).toEqual({
      check: 'tilt',
      says: 'The picture is turned by 1.2°: uprights lean to the right.',
      short: 'tilted 1.2°',
      toCheck: true,
    });
    expect(one('tilt', {}, tilt({ angle: -0.7 }))?.says).toContain('to the left');
    expect(one('tilt', {}, tilt(null, { angle: 1 }))?.says).toBe('The picture is turned by 1°: the horizon falls to the right.');
  });

  it('is not told where it is not sure, or where uprights and horizon contradict each other', () => {
    expect(one('tilt', {}, { tilt: { uprights: null, horizon: null } })).toBeUndefined();
    expect(one('tilt', {}, tilt({ angle: 3, certainty: 0.2 }))).toBeUndefined();
    expect(one('tilt', {}, tilt(null, { angle: 3, certainty: 0.5 }))).toBeUndefined();
    expect(one('tilt', {}, tilt({ angle: 2 }, { angle: -1 }))).toBeUndefined();
    // A quay seen at an angle slopes; the houses on it stand upright.
    expect(one('tilt', {}, tilt({ angle: 0.1 }, { angle: 2, certainty: 0.4 }))).toBeUndefined();
  });

  it('is believed of two weak signs that say the same', () => {
    expect(one('tilt', {}, tilt({ angle: 1.2, certainty: 0.28 }, { angle: 1.4, certainty: 0.4 }))?.short).toBe('tilted 1.2°');
    expect(one('tilt', {}, tilt({ angle: 1.2, certainty: 0.28 }, { angle: 1.9, certainty: 0.4 }))).toBeUndefined();
  });

  it('names converging uprights and does not call them tilted', () => {
    const checks = found({}, tilt({ angle: 0.6, converging: 12 }));
    expect(checks).toEqual([
      {
        check: 'converging',
        says: 'Verticals converge upward, by 12° at the edges: the camera looked up.',
        short: 'converging upward',
        toCheck: false,
      },
    ]);
    expect(one('converging', {}, tilt({ converging: -3 }))?.short).toBe('converging downward');
    expect(one('converging', {}, tilt({ converging: 1 }))).toBeUndefined();
  });

  it('tells both of a camera that looks up and is turned', () => {
    expect(found({}, tilt({ angle: 3, converging: 12 })).map(({ check }) => check)).toEqual(['tilt', 'converging']);
  });
});

// Common practice for buildings: f/8 to f/16; daylight by the exposure values of ANSI PH2.7-1986 (open shade 12, bright streets 8).
describe('settings out of the usual', () => {
  it.each<[string, Partial<CheckedShot>, string | undefined]>([
    ['f/4 in the sun', { fNumber: 4, exposureTime: 1 / 1000 }, 'f/4'],
    ['f/22 in the sun', { fNumber: 22, exposureTime: 1 / 30 }, 'f/22'],
    ['f/8', { fNumber: 8, exposureTime: 1 / 250 }, undefined],
    ['f/16', { fNumber: 16, exposureTime: 1 / 60 }, undefined],
    ['f/7.9 is f/8', { fNumber: 7.9, exposureTime: 1 / 250 }, undefined],
    ['f/4 at night', { fNumber: 4, exposureTime: 1 / 15, iso: 800 }, undefined],
    ['f/4 with no time known', { fNumber: 4, exposureTime: null }, undefined],
  ])('%s', (_what, shot, short) => {
    expect(one('aperture', { focalLength35: 20, ...shot })?.short).toBe(short);
    expect(one('aperture', { focalLength35: 20, ...shot })?.toCheck ?? false).toBe(false);
  });

  it.each([
    [1600, undefined],
    [3200, 'ISO 3200'],
    [65535, undefined],
  ])('ISO %i', (iso, short) => {
    expect(one('iso', { iso })?.short).toBe(short);
    expect(one('iso', { iso })?.toCheck ?? false).toBe(false);
  });
});

describe('the thresholds', () => {
  it('are taken by the contract as they stand, and within bounds alone', () => {
    expect(CheckThresholds.parse(DEFAULT_THRESHOLDS)).toEqual(DEFAULT_THRESHOLDS);
    expect(CheckThresholds.safeParse({ ...DEFAULT_THRESHOLDS, tiltDegrees: -1 }).success).toBe(false);
    expect(CheckThresholds.safeParse({ ...DEFAULT_THRESHOLDS, apertureFrom: 16, apertureTo: 8 }).success).toBe(false);
    expect(CheckThresholds.safeParse({ ...DEFAULT_THRESHOLDS, alikeBits: 64 }).success).toBe(false);
  });

  it('decide', () => {
    const strict = { ...DEFAULT_THRESHOLDS, tiltDegrees: 0.2, isoAbove: 50, clippedPercent: 0.1, handSpeed: 500 };
    const measures = {
      ...MEASURES,
      highlights: { ...NOTHING, any: 0.006, all: 0.006, areas: 0.006 },
      tilt: { ...LEVEL, uprights: { angle: 0.4, converging: 0, certainty: 1 } },
    };
    expect(checkFrame(SHOT, measures, strict).map(({ check }) => check)).toEqual(['highlights', 'tilt', 'iso']);
    expect(checkFrame(SHOT, measures, DEFAULT_THRESHOLDS)).toEqual([]);
  });
});

it('whatever a frame holds: plain sentences, what needs a look first, each check once', () => {
  const number = fc.oneof(fc.constant(null), fc.double({ min: 0, max: 1e5, noNaN: true }));
  const shots = fc.record({
    fNumber: number,
    exposureTime: number,
    iso: number,
    focalLength: number,
    focalLength35: number,
    inBracket: fc.boolean(),
  });
  const share = fc.double({ min: 0, max: 1, noNaN: true });
  const limits = fc.record({
    any: share,
    all: share,
    red: share,
    green: share,
    blue: share,
    areas: share,
    areasAny: share,
    largest: share,
    spots: fc.nat(),
  });
  const angle = fc.double({ min: -45, max: 45, noNaN: true });
  const tilts = fc.record({
    horizon: fc.option(fc.record({ angle, certainty: share })),
    uprights: fc.option(fc.record({ angle, certainty: share, converging: angle })),
  });
  const measured = fc.record({ highlights: limits, shadows: limits, sharpness: fc.option(share), tilt: tilts });
  fc.assert(
    fc.property(shots, fc.option(measured), (shot, measures) => {
      const checks = checkFrame(shot, measures && { ...MEASURES, ...measures }, DEFAULT_THRESHOLDS);
      expect(new Set(checks.map(({ check }) => check)).size).toBe(checks.length);
      expect(checks.map(({ toCheck }) => toCheck)).toEqual(checks.map(({ toCheck }) => toCheck).toSorted((a, b) => Number(b) - Number(a)));
      for (const { says, short } of checks) {
        expect(says).toMatch(/^[A-Z0-9f].*\.$/);
        expect(short.length).toBeLessThan(24);
        expect(`${says}${short}`).not.toMatch(/NaN|null|undefined|Infinity|score/);
      }
    }),
  );
});

it('says the headroom in words', () => {
  expect(headroomWords(0)).toBe('The brightest parts are at the limit.');
  expect(headroomWords(1)).toBe('The brightest parts are 1 stop below the limit.');
  expect(headroomWords(1.34)).toBe('The brightest parts are 1.3 stops below the limit.');
});
