import { describe, expect, it } from 'vitest';
import { groupBrackets, groupInSteps, type BracketCandidate } from '../../api/domain/brackets.ts';
import { Chance } from '../support/shoots/chance.ts';
import { drawPlace, thumbOf } from '../support/shoots/scenery.ts';

const START = Date.UTC(2026, 9, 28, 17, 6, 12);
let number = 0;

/** A frame taken `at` seconds after the start; settings of a tripod shot that are all the same. */
function frame(at: number, exposureTime: number, other: Partial<BracketCandidate> = {}): BracketCandidate {
  number += 1;
  return {
    id: `frame-${number}`,
    name: `HL_${String(number).padStart(4, '0')}.jpg`,
    takenLocal: new Date(START + at * 1000).toISOString().slice(0, 22),
    takenAt: null,
    exposureTime,
    fNumber: 8,
    iso: 100,
    exposureBias: null,
    exposureMode: null,
    make: 'Halden',
    model: 'Quay 5',
    serial: '004711',
    lens: 'Arc 24 mm',
    focalLength: 24,
    width: 6000,
    height: 4000,
    thumb: null,
    ...other,
  };
}

/** Frames half a second apart, each begun when the one before has ended. */
function inARow(times: readonly number[], other: (index: number) => Partial<BracketCandidate> = () => ({}), from = 0): BracketCandidate[] {
  let at = from;
  return times.map((seconds, index) => {
    const taken = frame(at, seconds, other(index));
    at += seconds + 0.5;
    return taken;
  });
}

const ids = (frames: readonly BracketCandidate[]) => frames.map(({ id }) => id);
const sets = (frames: readonly BracketCandidate[]) => groupBrackets(frames).map(({ frameIds }) => [...frameIds].sort());
const asSets = (...brackets: BracketCandidate[][]) => brackets.map((bracket) => ids(bracket).sort());

const THREE = [1 / 60, 1 / 250, 1 / 15];

describe('A bracket', () => {
  // Test idea (a) of the table of bracket patterns: EV100 13.966, 11.907, 9.907, 8, 6 (recomputed with ExifTool's LightValue), steps of 2.06, 2, 1.91, 2.
  it('is five exposures two stops apart, said in words', () => {
    const frames = inARow([1 / 250, 1 / 60, 1 / 15, 1 / 4, 1], () => ({ fNumber: 11 }));
    expect(groupBrackets(frames)).toEqual([
      { frameIds: ids(frames), leadId: frames[2]?.id, steps: [-4, -2, 0, 2, 4], says: '5 frames, 2 stops apart, f/11, ISO 100' },
    ]);
  });

  // Orders in makers' manuals: 0 − +, 0 + −, − 0 +; − + 0 in none.
  it.each([
    ['0 − +', [1 / 60, 1 / 250, 1 / 15]],
    ['0 + −', [1 / 60, 1 / 15, 1 / 250]],
    ['− 0 +', [1 / 250, 1 / 60, 1 / 15]],
    ['+ 0 −', [1 / 15, 1 / 60, 1 / 250]],
  ])('is taken in the order %s, and twice in a row it is two', (_order, times) => {
    const [one, two] = [inARow(times), inARow(times, undefined, 3)];
    expect(sets([...one, ...two])).toEqual(asSets(one, two));
    const [found] = groupBrackets(one);
    expect(found?.frameIds).toEqual(ids([...one].sort((a, b) => (a.exposureTime as number) - (b.exposureTime as number))));
    expect(found?.leadId).toBe(one.find(({ exposureTime }) => exposureTime === 1 / 60)?.id);
  });

  it.each([2, 3, 4, 5, 6, 7, 8, 9])('has %i frames', (count) => {
    const times = Array.from({ length: count }, (_, index) => 2 ** (index - 9));
    const frames = inARow(times, () => ({ exposureMode: 2 }));
    expect(sets(frames)).toEqual(asSets(frames));
  });

  it('of five is not joined with the five after it', () => {
    const times = [1 / 60, 1 / 125, 1 / 30, 1 / 250, 1 / 15];
    const [one, two] = [inARow(times), inARow(times, undefined, 4)];
    expect(sets([...one, ...two])).toEqual(asSets(one, two));
  });

  it('waits for long exposures: the pause counts from the end', () => {
    const frames = inARow([2, 8, 30]);
    expect(groupBrackets(frames)[0]?.says).toBe('3 frames, 2 stops apart, f/8, ISO 100');
    expect(frames[2]?.takenLocal).toBe('2026-10-28T17:06:23.00');
  });

  it('ends where more than two seconds pass', () => {
    const [first, second] = [inARow(THREE), inARow([1 / 30, 1 / 125, 1 / 8], undefined, 6)];
    expect(sets([...first, ...second])).toEqual(asSets(first, second));
    expect(groupBrackets([frame(0, 1 / 60), frame(2.2, 1 / 250), frame(4.4, 1 / 15)])).toEqual([]);
    expect(groupBrackets([frame(0, 1 / 60), frame(1.9, 1 / 250), frame(3.8, 1 / 15)])).toHaveLength(1);
  });

  it('may change its aperture or its sensitivity instead, and says what stayed', () => {
    const apertures = [8, 16, 4].map((fNumber, index) => frame(index, 1 / 60, { fNumber }));
    expect(groupBrackets(apertures)[0]?.says).toBe('3 frames, 2 stops apart, 1/60 s, ISO 100');
    const sensitivities = [400, 100, 1600].map((iso, index) => frame(index, 1 / 60, { iso }));
    expect(groupBrackets(sensitivities)[0]?.says).toBe('3 frames, 2 stops apart, f/8, 1/60 s');
  });

  // Engraved times deviate by up to 0.0931 EV from the exact third, and by 0.178 EV from the exact half (recomputed from the series).
  it.each([
    [[1 / 30, 1 / 40, 1 / 25], '1/3 stop apart'],
    [[1 / 15, 1 / 20, 1 / 13], '1/3 stop apart'],
    [[1 / 20, 1 / 30, 1 / 15], '1/2 stop apart'],
    [[1 / 125, 1 / 200, 1 / 80], '2/3 stop apart'],
    [[1 / 15, 1 / 30, 1 / 8], '1 stop apart'],
    [[1 / 15, 1 / 125, 1 / 2], '3 stops apart'],
    [[1 / 60, 1 / 160, 1 / 25], '1 1/3 stops apart'],
  ])('counts the engraved times %j as %s', (times, words) => {
    const frames = inARow(times, () => ({ exposureMode: 2 }));
    expect(groupBrackets(frames).map(({ says }) => says)).toEqual([`3 frames, ${words}, f/8, ISO 100`]);
  });

  it('may miss a setting, of one frame or of all', () => {
    const one = inARow(THREE, (index) => (index === 1 ? { fNumber: null, lens: null, focalLength: null, serial: null } : {}));
    expect(groupBrackets(one).map(({ says }) => says)).toEqual(['3 frames, 2 stops apart, f/8, ISO 100']);
    const all = inARow(THREE, () => ({ fNumber: null, iso: null }));
    expect(groupBrackets(all).map(({ says }) => says)).toEqual(['3 frames, 2 stops apart']);
  });

  it('that lost a frame says how uneven it is', () => {
    const frames = inARow([1 / 250, 1 / 60, 1 / 15, 1.0], () => ({ exposureMode: 2 }));
    expect(groupBrackets(frames)[0]?.says).toBe('4 frames, 2 to 4 stops apart, f/8, ISO 100');
  });

  it('is led by the frame without bias, else by the middle one', () => {
    const biases = [0, 1, 2];
    const brighter = inARow([1 / 60, 1 / 30, 1 / 15], (index) => ({ exposureBias: biases[index] as number }));
    expect(groupBrackets(brighter)[0]).toMatchObject({ leadId: brighter[0]?.id, steps: [0, 1, 2] });
    const unwritten = inARow([1 / 60, 1 / 30, 1 / 15], () => ({ exposureBias: 0 }));
    expect(groupBrackets(unwritten)[0]).toMatchObject({ leadId: unwritten[1]?.id, steps: [-1, 0, 1] });
  });
});

describe('The clock', () => {
  it('is not stopped by midnight', () => {
    const midnight = (Date.UTC(2026, 9, 29) - START) / 1000;
    const frames = inARow(THREE, undefined, midnight - 0.8);
    expect(frames[0]?.takenLocal?.slice(0, 10)).not.toBe(frames[2]?.takenLocal?.slice(0, 10));
    expect(sets(frames)).toEqual(asSets(frames));
  });

  it('may be set to another zone in the middle of a bracket', () => {
    const frames = inARow(THREE).map((each, index) => {
      const offset = index === 2 ? 2 : 1;
      const takenAt = Date.parse(`${each.takenLocal}Z`);
      return { ...each, takenAt, takenLocal: new Date(takenAt + offset * 3_600_000).toISOString().slice(0, 22) };
    });
    expect(sets(frames)).toEqual(asSets(frames));
  });

  it('may lack sub-seconds: names give the order then', () => {
    const withoutFraction = (each: BracketCandidate) => ({ ...each, takenLocal: each.takenLocal?.slice(0, 19) ?? null });
    const frames = [...inARow(THREE, undefined, 0.1), ...inARow(THREE, undefined, 1.6)].map(withoutFraction);
    expect(sets(frames)).toEqual(asSets(frames.slice(0, 3), frames.slice(3)));
  });

  it('that is missing groups nothing', () => {
    expect(groupBrackets(inARow(THREE, () => ({ takenLocal: null })))).toEqual([]);
  });
});

describe('No bracket are', () => {
  it('frames at one exposure', () => {
    expect(groupBrackets(inARow(Array.from({ length: 8 }, () => 1 / 125)))).toEqual([]);
    expect(groupBrackets(inARow([1 / 1000, 1 / 1050, 1 / 980]))).toEqual([]);
  });

  it.each<[string, Partial<BracketCandidate>]>([
    ['bodies', { serial: '004712' }],
    ['models', { serial: null, model: 'Quay 7' }],
    ['lenses', { lens: 'Arc 35 mm' }],
    ['focal lengths', { focalLength: 35 }],
    ['sizes', { width: 4000, height: 6000 }],
  ])('frames of two %s', (_what, other) => {
    const frames = inARow(THREE, (index) => (index === 1 ? other : {}));
    expect(groupBrackets(frames)).toEqual([]);
  });

  it('a picture and its raw file, which are two brackets beside each other', () => {
    const [pictures, raws] = [inARow(THREE), inARow(THREE)].map((row, kind) =>
      row.map((each, index) => ({ ...each, name: `HL_${index}.${kind ? 'dng' : 'jpg'}` })),
    ) as [BracketCandidate[], BracketCandidate[]];
    expect(sets([...pictures, ...raws]).sort()).toEqual(asSets(pictures, raws).sort());
  });

  it('finished files beside the frames they were made of', () => {
    const frames = inARow(THREE);
    const finals = ['_final', '_final-v2'].map((suffix) => ({
      ...(frames[0] as BracketCandidate),
      id: suffix,
      name: `${frames[0]?.name.slice(0, 7)}${suffix}.jpg`,
    }));
    expect(sets([...finals, ...frames])).toEqual(asSets(frames));
  });

  it('frames of which the camera says that one was not of the bracket', () => {
    const modes = [0, 2, 2, 2];
    const frames = inARow([1 / 80, 1 / 60, 1 / 250, 1 / 15], (index) => ({ exposureMode: modes[index] as number }));
    expect(sets(frames)).toEqual(asSets(frames.slice(1)));
  });

  it('frames exposed as the light changed, which look the same', () => {
    const place = drawPlace(new Chance(3));
    const same = (stops: number) => thumbOf(place, 20, stops, 'straight', new Chance(4));
    const times = [1 / 250, 1 / 125, 1 / 60];
    const meterFollowed = inARow(times, () => ({ exposureMode: 0, exposureBias: 0, thumb: same(0) }));
    expect(groupBrackets(meterFollowed)).toEqual([]);
    const brighter = inARow(times, (index) => ({ exposureMode: 0, exposureBias: 0, thumb: same(index - 1) }));
    expect(sets(brighter)).toEqual(asSets(brighter));
  });
});

describe('Two photographers at one moment', () => {
  it('keep their brackets apart', () => {
    const [one, two] = [inARow(THREE), inARow(THREE, () => ({ serial: '118' }), 0.2)];
    expect(sets([...one, ...two])).toEqual(asSets(one, two));
  });

  it('keep them apart by their counters where two bodies of one model write no number', () => {
    const row = (from: number, first: number) =>
      inARow(THREE, () => ({ serial: null }), from).map((each, index) => ({
        ...each,
        name: `HL_${String(first + index).padStart(4, '0')}.jpg`,
      }));
    const [one, two] = [row(0, 120), row(0.2, 7733)];
    expect(sets([...one, ...two])).toEqual(asSets(one, two));
  });
});

describe('The pictures', () => {
  const place = drawPlace(new Chance(11));
  const seen = (direction: number, stops: number) => thumbOf(place, direction, stops, 'shoulder', new Chance(direction + 40));

  it('of one view are a bracket, whatever is clipped in them', () => {
    const stops = [0, -2, 2];
    const frames = inARow(THREE, (index) => ({ thumb: seen(30, stops[index] as number) }));
    expect(sets(frames)).toEqual(asSets(frames));
  });

  it('of three views are a pan', () => {
    const stops = [0, -2, 2];
    const frames = inARow(THREE, (index) => ({ thumb: seen(30 + 24 * index, stops[index] as number) }));
    expect(groupBrackets(frames)).toEqual([]);
  });

  it('that show too little are no evidence either way', () => {
    const black = Buffer.alloc(1024).toString('base64');
    const frames = inARow(THREE, () => ({ thumb: black }));
    expect(sets(frames)).toEqual(asSets(frames));
    const broken = inARow(THREE, () => ({ thumb: '***' }));
    expect(sets(broken)).toEqual(asSets(broken));
  });
});

it('Thousands of frames in one row are grouped in as many steps, so that whoever asks can do something else in between', () => {
  const frames = inARow(Array.from({ length: 2000 }, (_, index) => THREE[index % 3] as number));
  const steps = groupInSteps(frames);
  let count = 0;
  let step = steps.next();
  for (; !step.done; step = steps.next()) count += 1;
  expect(count).toBeGreaterThanOrEqual(frames.length);
  expect(step.value).toEqual(groupBrackets(frames));
  expect(step.value.length).toBeGreaterThan(600);
});
