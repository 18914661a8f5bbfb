import type { BracketCandidate } from '../../../api/domain/brackets.ts';
import { buyCamera, type Camera } from './camera.ts';
import { Chance } from './chance.ts';
import { bracket, burst, drift, pan, planBracket, single, trials, type Work } from './events.ts';
import { AROUND, drawPlace } from './scenery.ts';

export interface Shoot {
  /** In random order. */
  frames: BracketCandidate[];
  /** What really belongs together: ids. */
  brackets: string[][];
}

/** One thing a photographer does at a place. */
function act(work: Work): void {
  const { chance } = work;
  const place = drawPlace(chance);
  const direction = chance.whole(0, AROUND - 1);
  const what = chance.next();
  if (what < 0.3) bracket(work, place, direction, planBracket(work));
  else if (what < 0.5) bracketsInARow(work);
  else if (what < 0.6) testShotFirst(work);
  else if (what < 0.72) single(work, place, direction);
  else if (what < 0.8) burst(work, place, direction);
  else if (what < 0.89) pan(work, place);
  else if (what < 0.95) trials(work, place, direction);
  else if (work.camera.thumbs) drift(work, place, direction);
}

/** Two or three brackets of one view, one straight after the other, or of the view beside it. */
function bracketsInARow(work: Work): void {
  const { chance } = work;
  const [place, plan] = [drawPlace(chance), planBracket(work)];
  let direction = chance.whole(0, AROUND - 1);
  const turns = chance.is(0.3);
  let metered: number | undefined;
  for (let i = chance.whole(2, 3); i > 0; i--) {
    metered = bracket(work, place, direction, plan, metered);
    if (turns) direction = (direction + chance.whole(12, 60)) % AROUND;
    work.clock += chance.is(0.7) ? chance.between(0, 2500) : chance.between(3000, 20_000);
  }
}

/** A frame to see whether the light is right, then the bracket of the same view. */
function testShotFirst(work: Work): void {
  const { chance } = work;
  const [place, direction, plan] = [drawPlace(chance), chance.whole(0, AROUND - 1), planBracket(work)];
  const metered = 2 ** -chance.between(4, 6.5);
  if (plan.some((stop) => metered * 2 ** stop > 30)) return;
  single(work, place, direction, metered);
  work.clock += chance.between(600, 6000);
  bracket(work, place, direction, plan, metered);
}

/** How long it takes to walk on, or to turn the lens: always longer than within a bracket. */
function moveOn(work: Work): void {
  const { chance, camera } = work;
  work.clock += chance.is(0.5) ? chance.between(3500, 12_000) : chance.between(20_000, 600_000);
  if (camera.zone !== null && chance.is(0.03)) work.zone += chance.pick([-60, 60, 330]);
}

function photographer(chance: Chance, camera: Camera, start: number): Work {
  const work: Work = { camera, chance, clock: start, zone: camera.zone ?? chance.pick([60, 120]), frames: [], brackets: [] };
  for (let i = chance.whole(2, 5); i > 0; i--) {
    act(work);
    moveOn(work);
  }
  return work;
}

function shuffled<T>(items: T[], chance: Chance): T[] {
  for (let i = items.length - 1; i > 0; i--) {
    const j = chance.whole(0, i);
    [items[i], items[j]] = [items[j] as T, items[i] as T];
  }
  return items;
}

/** A shoot of one to three people at one place, half of them around midnight; the second often has the same model as the first. */
export function makeShoot(seed: number): Shoot {
  const chance = new Chance(seed);
  const midnight = Date.UTC(2026, chance.whole(0, 11), chance.whole(1, 28));
  const start = midnight + (chance.is(0.5) ? -chance.between(0, 600_000) : chance.between(6, 22) * 3_600_000);
  const first = buyCamera(chance);
  const people = [photographer(chance, first, start)];
  if (chance.is(0.4))
    people.push(photographer(chance, buyCamera(chance, chance.is(0.6) ? first : undefined), start + chance.between(0, 5000)));
  if (chance.is(0.1)) people.push(photographer(chance, buyCamera(chance), start + chance.between(0, 5000)));
  return {
    frames: shuffled(
      people.flatMap(({ frames }) => frames),
      chance,
    ),
    brackets: people.flatMap(({ brackets }) => brackets),
  };
}
