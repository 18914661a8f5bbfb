import { alignedRows, withdraw, type AlignedFrame } from './aligned-frame.ts';
import { insideEdge, type FusionConventions } from './conventions.ts';
import type { FloatLevel } from './levels.ts';
import { exposednessTable, greyRow, normaliseRows, qualityRow } from './quality-weights.ts';

/** A frame's rows as grey, those three at hand that the contrast of a row is made of. */
class GreyRows {
  readonly #rowOf: (y: number) => Uint8Array;
  readonly #ring: Float32Array[];
  readonly #held = [-1, -1, -1];

  constructor(rowOf: (y: number) => Uint8Array, width: number) {
    this.#rowOf = rowOf;
    this.#ring = Array.from({ length: 3 }, () => new Float32Array(width));
  }

  at(y: number): Float32Array {
    const row = this.#ring[y % 3]!;
    if (this.#held[y % 3] !== y) greyRow(this.#rowOf(y), row);
    this.#held[y % 3] = y;
    return row;
  }
}

/** Fills rows `from` to before `to` of every frame's weights; at each pixel they add up to 1 over the frames. */
export function weighFrames(frames: AlignedFrame[], weights: FloatLevel[], rule: FusionConventions, [from, to]: [number, number]): void {
  const { width, height } = weights[0]!;
  const table = exposednessTable(rule);
  const sources = frames.map((frame) => {
    const rowOf = alignedRows(frame, width, height);
    return { frame, rowOf, grey: new GreyRows(rowOf, width) };
  });
  for (let y = from; y < to; y++) {
    const rows = weights.map((level) => level.row(y));
    sources.forEach(({ frame, rowOf, grey }, index) => {
      const beside = (step: number) => grey.at(insideEdge(y + step, height, rule.edge));
      const [above, here, below] = [beside(-1), beside(0), beside(1)];
      qualityRow({ pixels: rowOf(y), above, grey: here, below }, rule, table, rows[index]!);
      withdraw(rows[index]!, frame, y, height);
    });
    normaliseRows(rows);
  }
}
