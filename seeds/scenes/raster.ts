/**
 * Which face is seen at each point of a picture, and how near it is. Depth is stored as something that is straight
 * across a flat face (1 / distance in perspective, minus distance in parallel view), so one addition a point is enough.
 * The larger value wins.
 */
export class Raster {
  readonly near: Float32Array;
  readonly face: Int32Array;
  private readonly left: Float64Array;
  private readonly right: Float64Array;

  constructor(
    readonly width: number,
    readonly rows: number,
    /** Without it only depth is kept: enough for a shadow. */
    private readonly names = true,
  ) {
    this.near = new Float32Array(width * rows);
    this.face = new Int32Array(names ? width * rows : 0);
    this.left = new Float64Array(rows);
    this.right = new Float64Array(rows);
  }

  clear(farthest: number): void {
    this.near.fill(farthest);
    if (this.names) this.face.fill(-1);
  }

  /** Fills all outlines, shifted up by `firstRow`. */
  draw(outlines: Outlines, firstRow = 0): void {
    for (let i = 0; i < outlines.count; i++) this.fill(outlines, i, firstRow);
  }

  private fill(o: Outlines, i: number, firstRow: number): void {
    const top = Math.max(0, Math.ceil(o.top[i]! - firstRow - 0.5));
    const bottom = Math.min(this.rows - 1, Math.ceil(o.bottom[i]! - firstRow - 0.5) - 1);
    if (top > bottom) return;
    this.spans(o, i, firstRow, top, bottom);
    const { near, face, width, left, right, names } = this;
    const a = o.plane[i * 3]!;
    const b = o.plane[i * 3 + 1]!;
    const c = o.plane[i * 3 + 2]!;
    const id = o.face[i]!;
    for (let y = top; y <= bottom; y++) {
      const from = Math.max(0, Math.ceil(left[y]! - 0.5));
      const to = Math.min(width - 1, Math.ceil(right[y]! - 0.5) - 1);
      let value = a * (from + 0.5) + b * (y + firstRow + 0.5) + c;
      for (let at = y * width + from, end = y * width + to; at <= end; at++) {
        if (value > near[at]!) {
          near[at] = value;
          if (names) face[at] = id;
        }
        value += a;
      }
    }
  }

  /** The leftmost and rightmost crossing of the outline in each row. */
  private spans(o: Outlines, i: number, firstRow: number, top: number, bottom: number): void {
    const { left, right } = this;
    left.fill(Infinity, top, bottom + 1);
    right.fill(-Infinity, top, bottom + 1);
    const n = o.corners[i]!;
    for (let k = 0, at = i * 12; k < n; k++) {
      const p = at + k * 2;
      const q = at + ((k + 1) % n) * 2;
      // Always from the upper end down, so that neighbours that share an edge agree on every row.
      const down = o.points[p + 1]! <= o.points[q + 1]!;
      const x0 = o.points[down ? p : q]!;
      const y0 = o.points[(down ? p : q) + 1]! - firstRow;
      const x1 = o.points[down ? q : p]!;
      const y1 = o.points[(down ? q : p) + 1]! - firstRow;
      const from = Math.max(top, Math.ceil(y0 - 0.5));
      const to = Math.min(bottom, Math.ceil(y1 - 0.5) - 1);
      const slope = (x1 - x0) / (y1 - y0);
      for (let y = from; y <= to; y++) {
        const x = x0 + (y + 0.5 - y0) * slope;
        if (x < left[y]!) left[y] = x;
        if (x > right[y]!) right[y] = x;
      }
    }
  }
}

/** Outlines of faces as they lie in the picture: up to six corners each, and the plane of their depth. */
export class Outlines {
  count = 0;
  corners: Uint8Array;
  points: Float64Array;
  plane: Float64Array;
  face: Int32Array;
  top: Float64Array;
  bottom: Float64Array;

  constructor(size: number) {
    this.corners = new Uint8Array(size);
    this.points = new Float64Array(size * 12);
    this.plane = new Float64Array(size * 3);
    this.face = new Int32Array(size);
    this.top = new Float64Array(size);
    this.bottom = new Float64Array(size);
  }

  /** Adds an outline of `n` corners; `a b c` give the depth value at (x, y). Outside the picture it is dropped. */
  add(points: Float64Array, n: number, a: number, b: number, c: number, face: number, width: number): void {
    let low = Infinity;
    let high = -Infinity;
    let left = Infinity;
    let right = -Infinity;
    for (let k = 0; k < n; k++) {
      const x = points[k * 2]!;
      const y = points[k * 2 + 1]!;
      if (y < low) low = y;
      if (y > high) high = y;
      if (x < left) left = x;
      if (x > right) right = x;
    }
    if (n < 3 || right < 0 || left > width || high <= low) return;
    const i = this.count++;
    this.corners[i] = n;
    for (let k = 0; k < n * 2; k++) this.points[i * 12 + k] = points[k]!;
    this.plane[i * 3] = a;
    this.plane[i * 3 + 1] = b;
    this.plane[i * 3 + 2] = c;
    this.face[i] = face;
    this.top[i] = low;
    this.bottom[i] = high;
  }
}
