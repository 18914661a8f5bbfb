import { insideEdge, type EdgeRule } from './conventions.ts';
import { kernelsOver, type Kernels } from './kernels.ts';

/** Floats that stand before and behind each row, for the edge's continuation and for vectors that reach over the end. */
const MARGIN = 12;
const PAGE = 65536;

/** Rows of floats in the kernels' memory. */
export interface Plane {
  width: number;
  height: number;
  /** Bytes from the memory's start to the first sample of the first row. */
  start: number;
  /** Bytes from row to row. */
  stride: number;
}

const strideOf = (width: number) => (((width + 3) >> 2) * 4 + 2 * MARGIN) * 4;
/** Bytes that a plane takes. */
export const planeBytes = (width: number, height: number) => strideOf(width) * height;
export const rowAt = ({ start, stride }: Plane, y: number) => start + y * stride;
/** How often four samples are done for a row. */
export const roundsOf = (width: number) => (width + 3) >> 2;

/** Memory is kept for the next merge, unless it is wanted for something else meanwhile. */
let idle: WeakRef<WebAssembly.Memory> | undefined;

/** The memory that one fusion works in, given out from its start on. */
export class Workspace {
  readonly kernels: Kernels;
  readonly bytes: Uint8Array;
  readonly floats: Float32Array;
  #used = 64;

  /** @param bytes All that will be taken. */
  constructor(bytes: number) {
    const pages = Math.ceil((bytes + 4096) / PAGE);
    const memory = idle?.deref() ?? new WebAssembly.Memory({ initial: pages });
    idle = new WeakRef(memory);
    if (memory.buffer.byteLength < pages * PAGE) memory.grow(pages - memory.buffer.byteLength / PAGE);
    this.kernels = kernelsOver(memory);
    this.bytes = new Uint8Array(memory.buffer);
    this.floats = new Float32Array(memory.buffer);
  }

  /** Gives out bytes, and where they begin. */
  take(bytes: number): number {
    const start = this.#used;
    this.#used += Math.ceil(bytes / 16) * 16;
    if (this.#used > this.bytes.length) throw new RangeError('A fusion took more memory than it had reckoned with.');
    return start;
  }

  plane(width: number, height: number): Plane {
    return { width, height, start: this.take(planeBytes(width, height)) + MARGIN * 4, stride: strideOf(width) };
  }

  /** A row's samples, to be read and written. */
  row(plane: Plane, y: number): Float32Array {
    const from = rowAt(plane, y) / 4;
    return this.floats.subarray(from, from + plane.width);
  }

  /** Continues a row beyond its edges: mirrored by the rule before it, and by `behind` after it. */
  continueRow(pointer: number, width: number, before: EdgeRule, behind: EdgeRule): void {
    const { floats } = this;
    const first = pointer / 4;
    for (let step = 1; step <= 3; step++) {
      floats[first - step] = floats[first + insideEdge(-step, width, before)] ?? 0;
      floats[first + width - 1 + step] = floats[first + insideEdge(width - 1 + step, width, behind)] ?? 0;
    }
  }
}
