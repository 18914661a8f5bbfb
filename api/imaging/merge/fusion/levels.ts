import { insideEdge, type EdgeRule } from './conventions.ts';
import { growRow, halved, shrinkDown, shrinkRow, type Row } from './pyramid-rows.ts';

/** One level of a pyramid: rows of interleaved samples. */
export interface Level {
  width: number;
  height: number;
  channels: number;
  /** Row `y`, to be read before the next is asked for. */
  row(y: number): Row;
}

/** A level of floats in memory, whose rows can be written too. */
export interface FloatLevel extends Level {
  row(y: number): Float32Array;
}

/** Sizes of all levels, the picture's own first. */
export function levelSizes(width: number, height: number, levels: number): { width: number; height: number }[] {
  const sizes = [{ width, height }];
  while (sizes.length < levels) {
    const finer = sizes.at(-1)!;
    sizes.push({ width: halved(finer.width), height: halved(finer.height) });
  }
  return sizes;
}

export function floatLevel(samples: Float32Array, { width, height }: { width: number; height: number }): FloatLevel {
  const stride = samples.length / height;
  return { width, height, channels: stride / width, row: (y) => samples.subarray(y * stride, (y + 1) * stride) };
}

/** Fills rows `from` to before `to` of a level from the next finer one. Each finer row is read once. */
export function shrinkLevel(fine: Level, coarse: FloatLevel, edge: EdgeRule, [from, to]: [number, number]): void {
  const ring = Array.from({ length: 5 }, () => new Float32Array(coarse.width * coarse.channels));
  let next = Math.max(0, 2 * from - 2);
  for (let y = from; y < to; y++) {
    for (; next <= Math.min(2 * y + 2, fine.height - 1); next++) shrinkRow(fine.row(next), fine.channels, edge, ring[next % 5]!);
    // Beyond the edge stand rows that are still in the ring.
    const taps = [-2, -1, 0, 1, 2].map((tap) => ring[insideEdge(2 * y + tap, fine.height, edge) % 5]!);
    shrinkDown(taps, coarse.row(y));
  }
}

/** Rows of a level doubled along, those three at hand that a row of the finer level is made of. */
export class GrownRows {
  readonly #coarse: FloatLevel;
  readonly #edge: EdgeRule;
  readonly #ring: Float32Array[];
  readonly #held = [-1, -1, -1];

  constructor(coarse: FloatLevel, fineWidth: number, edge: EdgeRule) {
    this.#coarse = coarse;
    this.#edge = edge;
    this.#ring = Array.from({ length: 3 }, () => new Float32Array(fineWidth * coarse.channels));
  }

  /** The rows above, at and below the place of row `y` of the finer level; rows are asked for from the top down. */
  around(y: number): [Float32Array, Float32Array, Float32Array] {
    const at = y >> 1;
    const last = this.#coarse.height - 1;
    const above = at > 0 ? at - 1 : this.#edge === 'reflect-101' ? Math.min(1, last) : 0;
    return [this.#grown(above), this.#grown(at), this.#grown(Math.min(at + 1, last))];
  }

  #grown(y: number): Float32Array {
    const place = y % 3;
    const row = this.#ring[place]!;
    if (this.#held[place] !== y) {
      growRow(this.#coarse.row(y), this.#coarse.channels, this.#edge, row);
      this.#held[place] = y;
    }
    return row;
  }
}
