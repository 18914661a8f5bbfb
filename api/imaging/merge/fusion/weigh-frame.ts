import { insideEdge, type FusionConventions } from './conventions.ts';
import { withdraw, type PlacedFrame } from './frame.ts';
import { roundsOf, rowAt, type Plane, type Workspace } from './workspace.ts';

/** The picture's rows of a frame as red, green and blue, and their weights. Rows are asked for from the top down. */
export class FrameRows {
  readonly #space: Workspace;
  readonly #size: { width: number; height: number };
  readonly #bytes: number;
  readonly #rule: FusionConventions;
  readonly #rounds: number;
  readonly #colours: [Plane, Plane, Plane];
  readonly #grey: Plane;
  readonly #factor: Plane;
  readonly #slope: number;
  #ready = -1;

  /** @param bytes Where the frame's RGB stands. */
  constructor(space: Workspace, size: { width: number; height: number }, bytes: number, rule: FusionConventions) {
    const rows = (count: number) => space.plane(size.width, count);
    this.#space = space;
    this.#size = size;
    this.#bytes = bytes;
    this.#rule = rule;
    this.#rounds = roundsOf(size.width);
    this.#colours = [rows(3), rows(3), rows(3)];
    this.#grey = rows(3);
    this.#factor = rows(1);
    this.#slope = space.take(16);
    space.floats.fill((-rule.exposedness * Math.LOG2E) / (2 * rule.sigma ** 2), this.#slope / 4, this.#slope / 4 + 4);
  }

  /** Where the colours of row `y` stand, as floats of 0 to 255. */
  colours(y: number): [number, number, number] {
    while (this.#ready < y) this.#spread(++this.#ready);
    return this.#colours.map((plane) => rowAt(plane, y % 3)) as [number, number, number];
  }

  #spread(y: number): void {
    const colours = this.#colours.map((plane) => rowAt(plane, y % 3));
    this.#space.kernels.spread(this.#bytes + y * this.#size.width * 3, ...colours, this.#rounds);
    if (this.#rule.contrast !== 0) this.#space.kernels.grey(...colours, rowAt(this.#grey, y % 3), this.#rounds);
  }

  /** Writes row `y` of the product of the three measures, not yet divided by the sum over the frames. */
  weigh(y: number, frame: PlacedFrame, weights: Plane): void {
    const { kernels } = this.#space;
    const [to, factor] = [rowAt(weights, y), rowAt(this.#factor, 0)];
    this.colours(Math.min(y + 1, this.#size.height - 1));
    const colours = this.colours(y);
    const row = this.#space.row(weights, y);
    if (this.#rule.contrast === 0) row.fill(1);
    else this.#contrast(y, to, row);
    if (this.#rule.saturation !== 0) {
      kernels.saturation(...colours, factor, this.#rounds);
      raise(this.#space.row(this.#factor, 0), this.#rule.saturation);
      kernels.scale(to, factor, this.#rounds);
    }
    kernels.exposedness(...colours, to, this.#slope, this.#rounds);
    withdraw(row, frame, y);
  }

  #contrast(y: number, to: number, row: Float32Array): void {
    const { height, width } = this.#size;
    const { edge, contrast } = this.#rule;
    const greyAt = (at: number) => rowAt(this.#grey, insideEdge(at, height, edge) % 3);
    this.#space.continueRow(greyAt(y), width, edge, edge);
    this.#space.kernels.contrast(greyAt(y - 1), greyAt(y) - 4, greyAt(y + 1), to, this.#rounds);
    raise(row, contrast);
  }
}

function raise(row: Float32Array, exponent: number): void {
  if (exponent === 1) return;
  for (let x = 0; x < row.length; x++) row[x] = (row[x] ?? 0) ** exponent;
}

/** Divides one row's weights of all frames by their sum. */
export function normaliseRows(space: Workspace, weights: Plane[], totals: Plane, y: number): void {
  const [total, rounds] = [rowAt(totals, 0), roundsOf(totals.width)];
  space.row(totals, 0).fill(0);
  for (const plane of weights) space.kernels.total(total, rowAt(plane, y), rounds);
  for (const plane of weights) space.kernels.share(rowAt(plane, y), total, rounds);
}
