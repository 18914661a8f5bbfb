import type { Plane } from './plane.ts';

/** How a picture is walked: uprights are followed from row to row, level edges from column to column. */
export interface Walk {
  /** Lines that edges are followed over, and pixels in each. */
  lines: number;
  pixels: number;
  /** Steps in the array from a line to the next, and from a pixel to the next. */
  line: number;
  pixel: number;
}

export function walkOf({ width, height }: Plane, direction: 'upright' | 'level'): Walk {
  return direction === 'upright'
    ? { lines: height, pixels: width, line: width, pixel: 1 }
    : { lines: width, pixels: height, line: 1, pixel: width };
}

/** Points of an edge, a line each: where it crosses that line, to a part of a pixel. */
export interface EdgeTrack {
  lines: Int32Array;
  places: Float64Array;
}

/** Change of brightness across a line, smoothed along the edge by [1 2 1]; grey levels over two pixels. */
function changesAlong(values: Float32Array, walk: Walk, line: number, out: Float32Array): void {
  const { line: down, pixel: right, pixels } = walk;
  for (let u = 1, at = line * down + right; u < pixels - 1; u++, at += right) {
    const above = values[at - down + right]! - values[at - down - right]!;
    const below = values[at + down + right]! - values[at + down - right]!;
    out[u] = (above + 2 * (values[at + right]! - values[at - right]!) + below) / 4;
  }
}

/** Lines that an edge may be interrupted for, by noise or a wire. */
const GAP = 2;

/** Points chained backwards to the tracks they belong to: a picture has some hundred thousand. */
class Tracks {
  readonly #lines: number[] = [];
  readonly #places: number[] = [];
  readonly #before: number[] = [];
  /** By track: its last point, and how many it has. */
  readonly #last: number[] = [];
  readonly #length: number[] = [];
  /** By pixel and sign: the track seen there last, and on which line. */
  readonly #owner: Int32Array;
  readonly #seen: Int32Array;

  constructor(pixels: number) {
    this.#owner = new Int32Array(pixels * 2);
    this.#seen = new Int32Array(pixels * 2).fill(-1000);
  }

  /** Adds a point to the track beside it, else begins one. `sign` is 0 or 1: a bright edge never goes on as a dark one. */
  add(line: number, pixel: number, place: number, sign: number): void {
    const track = this.#nearest(line, pixel, place, sign) ?? this.#last.push(-1) - 1;
    this.#before.push(this.#last[track]!);
    this.#lines.push(line);
    this.#last[track] = this.#places.push(place) - 1;
    this.#length[track] = (this.#length[track] ?? 0) + 1;
    this.#owner[pixel * 2 + sign] = track;
    this.#seen[pixel * 2 + sign] = line;
  }

  #nearest(line: number, pixel: number, place: number, sign: number): number | null {
    let [found, away] = [-1, 1.2];
    for (let at = (pixel - 1) * 2 + sign; at <= (pixel + 1) * 2 + sign; at += 2) {
      const seen = this.#seen[at]!;
      if (line - seen > GAP + 1) continue;
      const last = this.#last[this.#owner[at]!]!;
      // The track may have gone on elsewhere since, or have its point of this line already.
      if (this.#lines[last] !== seen || seen === line) continue;
      const distance = Math.abs(this.#places[last]! - place);
      if (distance < away) [found, away] = [this.#owner[at]!, distance];
    }
    return found < 0 ? null : found;
  }

  /** The tracks of at least so many points, each in the order of its lines. */
  longerThan(least: number): EdgeTrack[] {
    return this.#last.flatMap((last, track) => (this.#length[track]! < least ? [] : [this.#unchain(last, this.#length[track]!)]));
  }

  #unchain(last: number, length: number): EdgeTrack {
    const track = { lines: new Int32Array(length), places: new Float64Array(length) };
    for (let point = last, at = length - 1; at >= 0; point = this.#before[point]!, at--) {
      track.lines[at] = this.#lines[point]!;
      track.places[at] = this.#places[point]!;
    }
    return track;
  }
}

/**
 * Follows the edges of a picture across its lines: on each line the local extremes of the change, placed by a parabola, of
 * at least `least` grey levels over two pixels. Edges up to 45° off the walk are found.
 */
export function followEdges(plane: Plane, walk: Walk, least: number, leastPoints: number): EdgeTrack[] {
  const tracks = new Tracks(walk.pixels);
  const changes = new Float32Array(walk.pixels);
  for (let line = 1; line < walk.lines - 1; line++) {
    changesAlong(plane.values, walk, line, changes);
    for (let u = 2; u < walk.pixels - 2; u++) {
      const change = changes[u]!;
      const sign = change > 0 ? 1 : -1;
      const size = change * sign;
      if (size < least) continue;
      const before = changes[u - 1]! * sign;
      const after = changes[u + 1]! * sign;
      if (size < before || size <= after) continue;
      tracks.add(line, u, u + (after - before) / (2 * (2 * size - before - after)), sign > 0 ? 1 : 0);
    }
  }
  return tracks.longerThan(leastPoints);
}
