import type { BracketCandidate } from '../../../api/domain/brackets.ts';
import { setShutter, stepsOf, type Camera } from './camera.ts';
import type { Chance } from './chance.ts';
import { AROUND, type Place } from './scenery.ts';
import { press, type Press } from './shutter.ts';

/** A photographer with one body, at work. Milliseconds. */
export interface Work {
  camera: Camera;
  chance: Chance;
  clock: number;
  /** Minutes east of UTC that the body's clock shows now. */
  zone: number;
  frames: BracketCandidate[];
  /** What really is a bracket: ids. */
  brackets: string[][];
}

type Taken = Omit<Press, 'at'>;

/** Presses the shutter once; the clock then stands at the end of the exposure. */
function take(work: Work, what: Taken): BracketCandidate[] {
  const frames = press(work.camera, { ...what, at: work.clock }, work.zone, work.chance);
  work.frames.push(...frames);
  work.clock += what.seconds * 1000;
  return frames;
}

/** The files of a bracket, of which a long row may have lost its first or last one on the way. */
function keep(work: Work, taken: readonly BracketCandidate[][]): void {
  const gone = taken.length >= 5 && work.chance.is(0.05) ? work.chance.pick([0, taken.length - 1]) : null;
  const kept = taken.filter((_, index) => index !== gone);
  const lost = gone === null ? [] : (taken[gone] as BracketCandidate[]);
  work.frames = work.frames.filter((frame) => !lost.includes(frame));
  for (let kind = 0; kind < work.camera.extensions.length; kind++) {
    work.brackets.push(kept.map((files) => (files[kind] as BracketCandidate).id));
  }
}

const ORDERS: readonly ((sorted: number[]) => number[])[] = [
  (sorted) => sorted,
  (sorted) => [...sorted].reverse(),
  (sorted) => [...sorted].sort((one, two) => Math.abs(one) - Math.abs(two) || one - two),
  (sorted) => [...sorted].sort((one, two) => Math.abs(one) - Math.abs(two) || two - one),
];

/** The plan of a bracket: brightness of its frames beside the metered one, in stops, in the order they are taken. */
export function planBracket({ chance, camera }: Work): number[] {
  const count = chance.pick([3, 3, 3, 3, 5, 5, 7, 9]);
  const step = chance.pick(stepsOf(camera).filter((each) => each * (count - 1) <= 8));
  const sorted = Array.from({ length: count }, (_, index) => (index - (count - 1) / 2) * step);
  return chance.pick(ORDERS)(sorted);
}

/** A metered time for which the whole bracket is within what the shutter has. */
function meteredTime(work: Work, stops: readonly number[]): number {
  for (;;) {
    const metered = 2 ** -work.chance.between(-3, 9.5);
    if (stops.every((stop) => setShutter(work.camera, metered * 2 ** stop) !== null)) return metered;
  }
}

/** One automatic bracket, its pauses jittered. Answers the metered time, so that it can be made again. */
export function bracket(work: Work, place: Place, direction: number, stops: readonly number[], known?: number): number {
  const { camera, chance } = work;
  const metered = known ?? meteredTime(work, stops);
  const pause = chance.between(120, 1500);
  // A camera whose time is fixed by hand changes its sensitivity instead.
  const bySensitivity =
    camera.series === 'thirds' && chance.is(0.06) && stops.every((stop) => Number.isInteger(stop) && Math.abs(stop) <= 4);
  // A hand moves by a column, which is 1.6% of the width.
  const unsteady = chance.is(0.2) ? 1 : 0;
  const taken = stops.map((stop) => {
    const seconds = setShutter(camera, bySensitivity ? metered : metered * 2 ** stop) as number;
    const bias = camera.biasMoves ? Math.round(stop * 10) / 10 : 0;
    const iso = bySensitivity ? 800 * 2 ** stop : camera.iso;
    const frames = take(work, { seconds, iso, bias, mode: 2, place, direction: direction + chance.whole(0, unsteady), brighter: stop });
    work.clock += Math.min(1900, pause * chance.between(0.85, 1.25));
    return frames;
  });
  keep(work, taken);
  return metered;
}

/** One frame, exposed as metered. */
export function single(work: Work, place: Place, direction: number, metered = meteredTime(work, [0])): void {
  const seconds = setShutter(work.camera, metered) as number;
  take(work, { seconds, bias: 0, mode: 0, place, direction, brighter: 0 });
}

/** Many frames at one exposure: somebody walks through the picture. */
export function burst(work: Work, place: Place, direction: number): void {
  const seconds = setShutter(work.camera, 2 ** -work.chance.between(4, 9)) as number;
  const [count, pause] = [work.chance.whole(2, 12), work.chance.between(80, 900)];
  for (let i = 0; i < count; i++) {
    take(work, { seconds, bias: 0, mode: 0, place, direction, brighter: 0 });
    work.clock += pause;
  }
}

/** A turn along the street, each frame metered anew: other pictures at other exposures. */
export function pan(work: Work, place: Place): void {
  let direction = work.chance.whole(0, AROUND - 1);
  let stops = -work.chance.between(4, 9);
  for (let i = work.chance.whole(3, 8); i > 0; i--) {
    single(work, place, direction, 2 ** stops);
    direction = (direction + work.chance.whole(10, 40)) % AROUND;
    stops += work.chance.pick([-4 / 3, -1, -2 / 3, -1 / 3, 0, 1 / 3, 2 / 3, 1, 4 / 3]);
    stops = Math.max(-9.5, Math.min(-3, stops));
    work.clock += work.chance.between(500, 1900);
  }
}

/** The light changes and the meter follows: other exposures, but pictures of the same brightness. */
export function drift(work: Work, place: Place, direction: number): void {
  let stops = -work.chance.between(4, 8.5);
  for (let i = work.chance.whole(2, 6); i > 0; i--) {
    single(work, place, direction, 2 ** stops);
    stops += work.chance.pick([-2 / 3, -1 / 3, 1 / 3, 2 / 3]);
    work.clock += work.chance.between(500, 1900);
  }
}

/** Exposures tried one after the other, with a look at the screen between: no bracket, as too much time passes. */
export function trials(work: Work, place: Place, direction: number): void {
  const [metered, step] = [2 ** -work.chance.between(3, 8), work.chance.pick([-1, 1])];
  for (let i = 0; i < work.chance.whole(2, 4); i++) {
    const seconds = setShutter(work.camera, metered * 2 ** (i * step)) as number;
    take(work, { seconds, bias: 0, mode: 1, place, direction, brighter: i * step });
    work.clock += work.chance.between(4200, 15_000);
  }
}
