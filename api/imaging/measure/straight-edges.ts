import { followEdges, type EdgeTrack } from './edge-tracks.ts';
import type { Plane } from './plane.ts';

/** A straight edge near upright: it crosses row y at `offset + slope · y`, both counted from the picture's middle. Pixels. */
export interface StraightEdge {
  offset: number;
  slope: number;
  /** Rows it runs over. */
  length: number;
  /** The row of its middle. */
  middle: number;
}

/** Shorter pieces have no direction worth knowing. Pixels. */
const LEAST_LENGTH = 24;
/** How far a point may lie off a straight edge. Pixels. */
const STRAY = 0.8;

/**
 * An arc looks straight in short pieces, and many of them would speak for a turn. What bends by more than this many pixels between its
 * middle and its ends, on a circle smaller than this, is dropped; what a lens bends lies on far larger circles.
 */
const BEND = { pixels: 0.08, radius: 3000 };

interface Fit {
  offset: number;
  slope: number;
  /** The point that lies farthest off, and how far. */
  worst: number;
  stray: number;
}

/** Least squares through the points from `from` to before `to`: place = offset + slope · row. */
function fitLine({ rows, places }: EdgeTrack, from: number, to: number): Fit {
  const count = to - from;
  let [sumV, sumU, sumVV, sumUV] = [0, 0, 0, 0];
  for (let i = from; i < to; i++) {
    sumV += rows[i]!;
    sumU += places[i]!;
  }
  const [meanV, meanU] = [sumV / count, sumU / count];
  for (let i = from; i < to; i++) {
    sumVV += (rows[i]! - meanV) ** 2;
    sumUV += (rows[i]! - meanV) * (places[i]! - meanU);
  }
  const slope = sumUV / sumVV;
  const fit = { offset: meanU - slope * meanV, slope, worst: from, stray: 0 };
  for (let i = from; i < to; i++) {
    const stray = Math.abs(places[i]! - fit.offset - slope * rows[i]!);
    if (stray > fit.stray) [fit.worst, fit.stray] = [i, stray];
  }
  return fit;
}

/** Whether the points bend to one side: the mean of the middle third against the outer two. */
function bends({ rows, places }: EdgeTrack, from: number, to: number, { offset, slope }: Fit): boolean {
  const third = Math.floor((to - from) / 3);
  let [middle, outer] = [0, 0];
  for (let i = from; i < to; i++) {
    const off = places[i]! - offset - slope * rows[i]!;
    if (i >= from + third && i < to - third) middle += off / (to - from - 2 * third);
    else outer += off / (2 * third);
  }
  // For an arc of rise s the two differ by 4/9 s.
  const rise = (Math.abs(middle - outer) * 9) / 4;
  return Math.abs(middle - outer) > BEND.pixels && (to - from) ** 2 < 8 * rise * BEND.radius;
}

/** Cuts a track where it bends until every piece is straight; pieces that become too short are dropped. */
function straightPieces(track: EdgeTrack, from: number, to: number, found: [Fit, number, number][]): void {
  if (to - from < LEAST_LENGTH) return;
  const fit = fitLine(track, from, to);
  if (fit.stray <= STRAY) {
    if (!bends(track, from, to, fit)) found.push([fit, track.rows[from]!, track.rows[to - 1]!]);
    return;
  }
  // At an end the bend is that point alone.
  const cut = Math.min(to - 1, Math.max(from + 1, fit.worst));
  straightPieces(track, from, cut, found);
  straightPieces(track, cut, to, found);
}

/** The straight edges of a picture that run within 45° of upright; of the transposed picture, those near level. */
export function straightEdges(plane: Plane, least: number): StraightEdge[] {
  const found: [Fit, number, number][] = [];
  for (const track of followEdges(plane, least, LEAST_LENGTH)) straightPieces(track, 0, track.rows.length, found);
  const [middleRow, middleColumn] = [(plane.height - 1) / 2, (plane.width - 1) / 2];
  return found.map(([{ offset, slope }, first, last]) => ({
    offset: offset + slope * middleRow - middleColumn,
    slope,
    length: last - first + 1,
    middle: (first + last) / 2 - middleRow,
  }));
}
