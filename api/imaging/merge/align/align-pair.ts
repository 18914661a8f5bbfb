import type { Grey } from './grey-pyramid.ts';
import { halfOf } from './grey-pyramid.ts';
import { correlation, texturedTiles, type Tile } from './tiles.ts';
import { bitmapShift, type Shift } from './threshold-bitmaps.ts';

/** What two pictures of one scene say of each other: how far the second is moved, that it cannot be laid over the first, or nothing. */
export type Verdict = { is: 'aligned'; shift: Shift } | { is: 'moved' } | { is: 'unknown' };

/** A tile is looked for so far around the place where it should be. */
const REACH = 8;
/** Below this a tile was not found again. */
const ALIKE = 0.6;
/** A tile that shows so much must be found again; a fainter one may drown in noise. */
const STRONG_TEXTURE = 6;
/** Tiles agree that lie so near to their median. */
const AGREEING = 1.2;
/** So far around what was found in the grey copy it is looked for on the pixels themselves. */
const NEARBY = 4;
/** So many tiles say something about a picture. */
const LEAST_TILES = 4;
/** So many of them must agree; people, trees and water may move in the others. */
const MAJORITY = 0.6;

/** Where a correlation of three places in a row is highest, from the middle one: a parabola through them. */
function peak(before: number, middle: number, after: number): number {
  const bend = before - 2 * middle + after;
  return bend >= 0 ? 0 : Math.max(-0.5, Math.min(0.5, (0.5 * (before - after)) / bend));
}

/** How alike two pictures are at a shift of whole pixels. */
type Score = (dx: number, dy: number) => number;

/** A score that is worked out once for each shift. */
function remembered(score: Score): Score {
  const known = new Map<string, number>();
  return (dx, dy) => {
    const key = `${dx} ${dy}`;
    const value = known.get(key) ?? score(dx, dy);
    known.set(key, value);
    return value;
  };
}

/** Climbs from shift to shift to where the score is highest; nothing where that leads out of reach. */
function climb(from: Shift, score: Score): Shift | null {
  let best = from;
  for (;;) {
    const { x, y } = best;
    const around = [-1, 0, 1].flatMap((row) => [-1, 0, 1].map((column) => ({ x: x + column, y: y + row })));
    const next = around.reduce((one, other) => (score(other.x, other.y) > score(one.x, one.y) ? other : one), best);
    if (next === best) return best;
    best = next;
    if (Math.abs(best.x - from.x) >= REACH || Math.abs(best.y - from.y) >= REACH) return null;
  }
}

/** Where a tile is most alike, to parts of a pixel; nothing where it is nowhere alike, `lost` where it should have been. */
function findTile(first: Grey, second: Grey, tile: Tile, near: Shift): Shift | 'lost' | null {
  const at = remembered((dx, dy) => correlation(first, second, tile, dx, dy));
  const place = climb(near, at);
  if (!place) return 'lost';
  const { x, y } = place;
  if (at(x, y) < ALIKE) return tile.texture >= STRONG_TEXTURE ? 'lost' : null;
  return { x: x + peak(at(x - 1, y), at(x, y), at(x + 1, y)), y: y + peak(at(x, y - 1), at(x, y), at(x, y + 1)) };
}

const median = (values: number[]) => [...values].sort((a, b) => a - b)[values.length >> 1] ?? 0;

interface Vote {
  tiles: number;
  agreeing: number;
  shift: Shift;
}

/** Has the tiles of two pictures vote on a shift. */
function vote(first: Grey, second: Grey, near: Shift): Vote {
  const found = texturedTiles(first, second, near, REACH)
    .map((tile) => findTile(first, second, tile, near))
    .filter((place) => place !== null);
  const places = found.filter((place) => place !== 'lost');
  const shift = { x: median(places.map(({ x }) => x)), y: median(places.map(({ y }) => y)) };
  const agreeing = places.filter(({ x, y }) => Math.abs(x - shift.x) <= AGREEING && Math.abs(y - shift.y) <= AGREEING).length;
  return { tiles: found.length, agreeing, shift };
}

/** Once more from where the first vote led: tiles that lay beyond reach may come into it. */
function voteAgain(first: Grey, second: Grey, before: Vote): Vote {
  const after = vote(first, second, { x: Math.round(before.shift.x), y: Math.round(before.shift.y) });
  return after.agreeing > before.agreeing ? after : before;
}

/** A frame as movement is looked for in it. */
export interface Findable {
  grey: Grey;
  /** The same, pixel for pixel, and how many of its pixels make one of `grey`. */
  fine: () => Grey;
  scale: number;
}

/** Halves of pixels are lost in a grey copy, so what is moved at all is measured again on the pixels themselves, by all tiles together. */
function refined(first: Findable, second: Findable, found: Shift): Shift {
  if (Math.abs(found.x) < 0.2 && Math.abs(found.y) < 0.2) return found;
  const [one, two] = [first.fine(), second.fine()];
  const near = { x: Math.round(found.x * first.scale), y: Math.round(found.y * first.scale) };
  const tiles = texturedTiles(one, two, near, REACH);
  const together = (dx: number, dy: number) => tiles.reduce((sum, tile) => sum + correlation(one, two, tile, dx, dy), 0);
  // All of them are tried: where edges slant, one peak does not lead to the next.
  let [place, most] = [near, together(near.x, near.y)];
  for (let y = near.y - NEARBY; y <= near.y + NEARBY; y++) {
    for (let x = near.x - NEARBY; x <= near.x + NEARBY; x++) {
      const score = together(x, y);
      if (score > most) [place, most] = [{ x, y }, score];
    }
  }
  return { x: place.x / first.scale, y: place.y / first.scale };
}

/**
 * Says how two exposures of one scene lie to each other, in pixels of the greys and parts of them. Threshold bitmaps propose a shift; a camera on a
 * tripod proposes none; the tiles that show something in both decide, over pixels that are neither black nor white in either. Where hardly any tile
 * does, nothing is known: a frame that is nearly white is no evidence that it moved.
 */
export function alignPair(first: Findable, second: Findable): Verdict {
  const [one, two] = [first.grey, second.grey];
  const proposed = bitmapShift(halfOf(one), halfOf(two));
  const votes = [{ x: 0, y: 0 }];
  if (proposed && (proposed.x !== 0 || proposed.y !== 0)) votes.push({ x: 2 * proposed.x, y: 2 * proposed.y });
  const counted = votes.map((near) => voteAgain(one, two, vote(one, two, near)));
  const best = counted.reduce((before, after) => (after.agreeing > before.agreeing ? after : before));
  if (best.tiles < LEAST_TILES) return { is: 'unknown' };
  const most = best.agreeing >= LEAST_TILES && best.agreeing >= MAJORITY * best.tiles;
  return most ? { is: 'aligned', shift: refined(first, second, best.shift) } : { is: 'moved' };
}
