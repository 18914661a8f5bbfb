import type { Plane } from './plane.ts';

/** Points of an edge, a row each: where it crosses that row, to a part of a pixel. */
export interface EdgeTrack {
  rows: Int32Array;
  places: Float64Array;
}

/** Change of brightness along a row, smoothed across it by [1 2 1]; grey levels over two pixels. */
function changesAlong({ width, values }: Plane, row: number, out: Float32Array): void {
  for (let x = 1, at = row * width + 1; x < width - 1; x++, at++) {
    const above = values[at - width + 1]! - values[at - width - 1]!;
    const below = values[at + width + 1]! - values[at + width - 1]!;
    out[x] = (above + 2 * (values[at + 1]! - values[at - 1]!) + below) / 4;
  }
}

/** Rows that an edge may be interrupted for, by noise or a wire. */
const GAP = 2;

/** Points chained backwards to the tracks they belong to: a picture has some hundred thousand. */
class Tracks {
  readonly #rows: number[] = [];
  readonly #places: number[] = [];
  readonly #before: number[] = [];
  /** By track: its last point, and how many it has. */
  readonly #last: number[] = [];
  readonly #length: number[] = [];
  /** By pixel and sign: the track seen there last, and on which row. */
  readonly #owner: Int32Array;
  readonly #seen: Int32Array;

  constructor(pixels: number) {
    this.#owner = new Int32Array(pixels * 2);
    this.#seen = new Int32Array(pixels * 2).fill(-1000);
  }

  /** Adds a point to the track beside it, else begins one. `sign` is 0 or 1: a bright edge never goes on as a dark one. */
  add(row: number, pixel: number, place: number, sign: number): void {
    const track = this.#nearest(row, pixel, place, sign) ?? this.#last.push(-1) - 1;
    this.#before.push(this.#last[track]!);
    this.#rows.push(row);
    this.#last[track] = this.#places.push(place) - 1;
    this.#length[track] = (this.#length[track] ?? 0) + 1;
    this.#owner[pixel * 2 + sign] = track;
    this.#seen[pixel * 2 + sign] = row;
  }

  #nearest(row: number, pixel: number, place: number, sign: number): number | null {
    let [found, away] = [-1, 1.2];
    for (let at = (pixel - 1) * 2 + sign; at <= (pixel + 1) * 2 + sign; at += 2) {
      const seen = this.#seen[at]!;
      if (row - seen > GAP + 1) continue;
      const last = this.#last[this.#owner[at]!]!;
      // The track may have gone on elsewhere since, or have its point of this row already.
      if (this.#rows[last] !== seen || seen === row) continue;
      const distance = Math.abs(this.#places[last]! - place);
      if (distance < away) [found, away] = [this.#owner[at]!, distance];
    }
    return found < 0 ? null : found;
  }

  /** The tracks of at least so many points, each in the order of its rows. */
  longerThan(least: number): EdgeTrack[] {
    return this.#last.flatMap((last, track) => (this.#length[track]! < least ? [] : [this.#unchain(last, this.#length[track]!)]));
  }

  #unchain(last: number, length: number): EdgeTrack {
    const track = { rows: new Int32Array(length), places: new Float64Array(length) };
    for (let point = last, at = length - 1; at >= 0; point = this.#before[point]!, at--) {
      track.rows[at] = this.#rows[point]!;
      track.places[at] = this.#places[point]!;
    }
    return track;
  }
}

/**
 * Follows the edges of a picture from row to row: on each row the local extremes of the change, placed by a parabola, of at least
 * `least` grey levels over two pixels. Edges within 45° of upright are found.
 */
export function followEdges(plane: Plane, least: number, leastPoints: number): EdgeTrack[] {
  const tracks = new Tracks(plane.width);
  const changes = new Float32Array(plane.width);
  for (let row = 1; row < plane.height - 1; row++) {
    changesAlong(plane, row, changes);
    for (let x = 2; x < plane.width - 2; x++) {
      const change = changes[x]!;
      const sign = change > 0 ? 1 : -1;
      const size = change * sign;
      if (size < least) continue;
      const before = changes[x - 1]! * sign;
      const after = changes[x + 1]! * sign;
      if (size < before || size <= after) continue;
      tracks.add(row, x, x + (after - before) / (2 * (2 * size - before - after)), sign > 0 ? 1 : 0);
    }
  }
  return tracks.longerThan(leastPoints);
}
