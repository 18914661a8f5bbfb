import { insideEdge, type EdgeRule } from './conventions.ts';
import { roundsOf, rowAt, type Plane, type Workspace } from './workspace.ts';

/** Half of a length, as every second sample of it counts. */
export const halved = (length: number) => (length + 1) >> 1;

/** Sizes of all levels, the picture's own first. */
export function levelSizes(width: number, height: number, levels: number): { width: number; height: number }[] {
  const sizes = [{ width, height }];
  while (sizes.length < levels) {
    const { width: wide, height: high } = sizes[sizes.length - 1] ?? { width, height };
    sizes.push({ width: halved(wide), height: halved(high) });
  }
  return sizes;
}

/** Takes in the rows of a level from the top down and fills the next coarser level with them. */
export class Shrinking {
  readonly #space: Workspace;
  readonly #coarse: Plane;
  readonly #fine: { width: number; height: number };
  readonly #edge: EdgeRule;
  /** The last five rows, halved along. */
  readonly #ring: Plane;
  #next = 0;

  constructor(space: Workspace, fine: { width: number; height: number }, coarse: Plane, edge: EdgeRule, ring: Plane) {
    this.#space = space;
    this.#fine = fine;
    this.#coarse = coarse;
    this.#edge = edge;
    this.#ring = ring;
  }

  /** @param pointer Where row `y` of the finer level stands. */
  take(y: number, pointer: number): void {
    const { width, height } = this.#fine;
    this.#space.continueRow(pointer, width, this.#edge, this.#edge);
    this.#space.kernels.shrinkAlong(pointer - 8, rowAt(this.#ring, y % 5), roundsOf(this.#coarse.width));
    // A row is due when the last of its five has come, or the last there is.
    while (this.#next < this.#coarse.height && (2 * this.#next + 2 <= y || y === height - 1)) this.#shrinkDown(this.#next++);
  }

  #shrinkDown(y: number): void {
    // Beyond the edge stand rows that are still in the ring.
    const taps = [-2, -1, 0, 1, 2].map((tap) => rowAt(this.#ring, insideEdge(2 * y + tap, this.#fine.height, this.#edge) % 5));
    this.#space.kernels.shrinkDown(...taps, rowAt(this.#coarse, y), roundsOf(this.#coarse.width));
  }
}

/** Fills a level from the next finer one. */
export function shrinkPlane(space: Workspace, fine: Plane, coarse: Plane, edge: EdgeRule, ring: Plane): void {
  const shrinking = new Shrinking(space, fine, coarse, edge, ring);
  for (let y = 0; y < fine.height; y++) shrinking.take(y, rowAt(fine, y));
}

/** Rows of a level doubled along, those three at hand that a row of the finer level is made of. */
export class Growing {
  readonly #space: Workspace;
  readonly #coarse: Plane;
  readonly #edge: EdgeRule;
  readonly #ring: Plane;
  readonly #held = [-1, -1, -1];

  constructor(space: Workspace, coarse: Plane, edge: EdgeRule, ring: Plane) {
    this.#space = space;
    this.#coarse = coarse;
    this.#edge = edge;
    this.#ring = ring;
  }

  /** Where the rows above, at and below the place of row `y` of the finer level stand; rows are asked for from the top down. */
  around(y: number): [number, number, number] {
    const at = y >> 1;
    const last = this.#coarse.height - 1;
    // Before the first row OpenCV mirrors around it, the paper's authors repeat it; behind the last both repeat it.
    const above = at > 0 ? at - 1 : this.#edge === 'reflect-101' ? Math.min(1, last) : 0;
    return [this.#grown(above), this.#grown(at), this.#grown(Math.min(at + 1, last))];
  }

  #grown(y: number): number {
    const place = y % 3;
    const pointer = rowAt(this.#ring, place);
    if (this.#held[place] !== y) {
      const from = rowAt(this.#coarse, y);
      this.#space.continueRow(from, this.#coarse.width, this.#edge, 'symmetric');
      this.#space.kernels.growAlong(from - 4, pointer, roundsOf(this.#coarse.width));
      this.#held[place] = y;
    }
    return pointer;
  }
}
