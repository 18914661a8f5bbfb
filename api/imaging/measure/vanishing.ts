import type { StraightEdge } from './straight-edges.ts';

/**
 * A family of edges that are parallel in the world and nearly square to the view: each leans by `turn + spread · x`, in tangents, where x
 * is the place at which it crosses the picture's middle line, −1 to 1 from edge to edge. This is exact: edges that meet in a
 * point V beyond the middle lean by x / V there.
 */
export interface Family {
  turn: number;
  spread: number;
}

/** How well a family explains the edges that could be its own. */
export interface Support {
  /** Pixels of edges that agree, weighted. */
  agreeing: number;
  /** The same of edges that lean nearly so and do not agree. */
  against: number;
  /** Standard error of `turn` in degrees, from where across the picture the agreeing edges lie. */
  error: number;
}

/** An edge as the search needs it. */
interface Sample {
  slope: number;
  place: number;
  weight: number;
}

const DEGREE = Math.PI / 180;
/** Half the width of what agrees, in degrees, from the first search to the last fit. */
const WIDE = 0.6;
const NARROW = [0.6, 0.5, 0.4, 0.3, 0.3];
/** Nearer than this in degrees an edge speaks against a family that it does not agree with. */
const RIVAL = 6;
/** Longest edges that are searched. */
const MOST = 500;

/** The same edges as tangents and places across the picture; long ones count more than their length: their direction is surer. */
export function samplesOf(edges: readonly StraightEdge[], halfWidth: number): Sample[] {
  const longest = edges.toSorted((a, b) => b.length - a.length).slice(0, MOST);
  return longest.map(({ slope, offset, length }) => ({ slope, place: offset / halfWidth, weight: (length * length) / (length + 60) }));
}

function off({ turn, spread }: Family, { slope, place }: Sample): number {
  const expected = turn + spread * place;
  // The difference of two directions, from their tangents.
  return Math.abs((slope - expected) / (1 + slope * expected)) / DEGREE;
}

function agreement(samples: readonly Sample[], family: Family, width: number): number {
  let sum = 0;
  for (const sample of samples) {
    const away = off(family, sample) / width;
    if (away < 1) sum += sample.weight * (1 - away * away);
  }
  return sum;
}

/** How far a family is looked for, in degrees either way; a spread of 0 looks for edges that are parallel in the picture too. */
export interface Reach {
  turn: number;
  spread: number;
}

function search(samples: readonly Sample[], reach: Reach): Family {
  let best: Family = { turn: 0, spread: 0 };
  let most = -1;
  for (let turn = -reach.turn; turn <= reach.turn; turn += 0.3) {
    for (let spread = -reach.spread; spread <= reach.spread; spread += 0.5) {
      const family = { turn: Math.tan(turn * DEGREE), spread: Math.tan(spread * DEGREE) };
      // Of two that explain as much, the one nearer to an upright camera.
      const found = agreement(samples, family, WIDE) * (1 - 0.002 * Math.abs(turn) - 0.001 * Math.abs(spread));
      if (found > most) [best, most] = [family, found];
    }
  }
  return best;
}

/** Weighted sums of the samples near a family, for a line through what they differ by. */
function sumsNear(samples: readonly Sample[], family: Family, width: number) {
  const sums = { w: 0, x: 0, xx: 0, s: 0, xs: 0 };
  for (const sample of samples) {
    const away = off(family, sample) / width;
    if (away >= 1) continue;
    const w = sample.weight * (1 - away * away) ** 2;
    sums.w += w;
    sums.x += w * sample.place;
    sums.xx += w * sample.place ** 2;
    const rest = sample.slope - family.turn - family.spread * sample.place;
    sums.s += w * rest;
    sums.xs += w * sample.place * rest;
  }
  return sums;
}

/** Where all edges stand in one place, spread cannot be told from turn: it then stays what it is. A variance of places. */
const ONE_PLACE = 0.003;

/** Least squares with Tukey's weights, narrowed step by step. */
function refine(samples: readonly Sample[], start: Family, flat: boolean): Family {
  let family = start;
  for (const width of NARROW) {
    const { w, x, xx, s, xs } = sumsNear(samples, family, width);
    if (w === 0) return family;
    const variance = xx / w - (x / w) ** 2 + ONE_PLACE;
    const spread = flat ? 0 : (xs / w - (x / w) * (s / w)) / variance;
    family = { turn: family.turn + s / w - spread * (x / w), spread: family.spread + spread };
  }
  return family;
}

function supportOf(samples: readonly Sample[], family: Family): Support {
  const width = NARROW.at(-1)!;
  const { w, x, xx } = sumsNear(samples, family, width);
  const agreeing = agreement(samples, family, width);
  const rivals = samples.filter((sample) => off(family, sample) < RIVAL).reduce((sum, { weight }) => sum + weight, 0);
  const mean = w > 0 ? x / w : 0;
  const variance = w > 0 ? xx / w - mean ** 2 : 0;
  // An edge of 60 px is known to about a tenth of a degree; the middle of edges far from the picture's middle says less about it.
  const error = w > 0 ? 0.1 * Math.sqrt(60 / w) * Math.sqrt(1 + mean ** 2 / (variance + 1e-4)) : Infinity;
  return { agreeing, against: rivals - agreeing, error };
}

/** The family that explains most of the edges, within reach. */
export function findFamily(samples: readonly Sample[], reach: Reach): { family: Family; support: Support } {
  const family = refine(samples, search(samples, reach), reach.spread === 0);
  return { family, support: supportOf(samples, family) };
}
