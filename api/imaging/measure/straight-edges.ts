import { followEdges, walkOf, type EdgeTrack } from './edge-tracks.ts';
import type { Plane } from './plane.ts';

/** A straight edge: it crosses line v at `offset + slope · v`, v counted from the picture's middle, offset likewise. Pixels. */
export interface StraightEdge {
  offset: number;
  slope: number;
  /** Lines it runs over. */
  length: number;
  /** Its middle. */
  middle: number;
}

/** Shorter pieces have no direction worth knowing. Pixels. */
const LEAST_LENGTH = 24;
/** How far a point may lie off a straight edge. Pixels. */
const STRAY = 0.8;

interface Fit {
  offset: number;
  slope: number;
  /** The point that lies farthest off, and how far. */
  worst: number;
  stray: number;
}

/** Least squares through the points from `from` to before `to`: place = offset + slope · line. */
function fitLine({ lines, places }: EdgeTrack, from: number, to: number): Fit {
  const count = to - from;
  let [sumV, sumU, sumVV, sumUV] = [0, 0, 0, 0];
  for (let i = from; i < to; i++) {
    sumV += lines[i]!;
    sumU += places[i]!;
  }
  const [meanV, meanU] = [sumV / count, sumU / count];
  for (let i = from; i < to; i++) {
    sumVV += (lines[i]! - meanV) ** 2;
    sumUV += (lines[i]! - meanV) * (places[i]! - meanU);
  }
  const slope = sumUV / sumVV;
  const fit = { offset: meanU - slope * meanV, slope, worst: from, stray: 0 };
  for (let i = from; i < to; i++) {
    const stray = Math.abs(places[i]! - fit.offset - slope * lines[i]!);
    if (stray > fit.stray) [fit.worst, fit.stray] = [i, stray];
  }
  return fit;
}

/** Cuts a track where it bends until every piece is straight; pieces that become too short are dropped. */
function straightPieces(track: EdgeTrack, from: number, to: number, found: [Fit, number, number][]): void {
  if (to - from < LEAST_LENGTH) return;
  const fit = fitLine(track, from, to);
  if (fit.stray <= STRAY) {
    found.push([fit, track.lines[from]!, track.lines[to - 1]!]);
    return;
  }
  // At an end the bend is that point alone.
  const cut = Math.min(to - 1, Math.max(from + 1, fit.worst));
  straightPieces(track, from, cut, found);
  straightPieces(track, cut, to, found);
}

/** The straight edges of a picture that run within 45° of upright, or of level. */
export function straightEdges(plane: Plane, direction: 'upright' | 'level', least: number): StraightEdge[] {
  const walk = walkOf(plane, direction);
  const found: [Fit, number, number][] = [];
  for (const track of followEdges(plane, walk, least, LEAST_LENGTH)) straightPieces(track, 0, track.lines.length, found);
  const [middleLine, middlePixel] = [(walk.lines - 1) / 2, (walk.pixels - 1) / 2];
  return found.map(([{ offset, slope }, first, last]) => ({
    offset: offset + slope * middleLine - middlePixel,
    slope,
    length: last - first + 1,
    middle: (first + last) / 2 - middleLine,
  }));
}
