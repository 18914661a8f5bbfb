/** One number a pixel, row by row. */
export interface Plane {
  width: number;
  height: number;
  values: Float32Array;
}

/** Which pixels of a longer row, and how much of each, go into each pixel of a shorter one. */
interface Shares {
  first: Int32Array;
  count: Int32Array;
  /** `most` weights for each pixel, their sum 1. */
  weights: Float32Array;
  most: number;
}

function sharesOf(from: number, to: number): Shares {
  const step = from / to;
  const most = Math.ceil(step) + 1;
  const shares = { first: new Int32Array(to), count: new Int32Array(to), weights: new Float32Array(to * most), most };
  for (let i = 0; i < to; i++) {
    const [start, end] = [i * step, Math.min(from, (i + 1) * step)];
    shares.first[i] = Math.floor(start);
    for (let at = Math.floor(start); at < end - 1e-6; at++)
      shares.weights[i * most + shares.count[i]!++] = (Math.min(end, at + 1) - Math.max(start, at)) / step;
  }
  return shares;
}

function shrinkRows({ width, height, values }: Plane, to: number): Plane {
  const { first, count, weights, most } = sharesOf(width, to);
  const out = new Float32Array(to * height);
  for (let y = 0, o = 0; y < height; y++) {
    for (let x = 0; x < to; x++, o++) {
      let sum = 0;
      const from = y * width + first[x]!;
      for (let k = 0; k < count[x]!; k++) sum += values[from + k]! * weights[x * most + k]!;
      out[o] = sum;
    }
  }
  return { width: to, height, values: out };
}

function shrinkColumns({ width, height, values }: Plane, to: number): Plane {
  const { first, count, weights, most } = sharesOf(height, to);
  const out = new Float32Array(width * to);
  for (let y = 0; y < to; y++) {
    for (let k = 0; k < count[y]!; k++) {
      const weight = weights[y * most + k]!;
      const from = (first[y]! + k) * width;
      for (let x = 0, o = y * width; x < width; x++, o++) out[o] = out[o]! + values[from + x]! * weight;
    }
  }
  return { width, height: to, values: out };
}

/** The same picture of another size, each pixel the mean of the area it covers. Enlarging repeats pixels. */
export function resizePlane(plane: Plane, width: number, height: number): Plane {
  const narrow = plane.width === width ? plane : shrinkRows(plane, width);
  return narrow.height === height ? narrow : shrinkColumns(narrow, height);
}

/** The same with `longSide` pixels along its longer side; never enlarged. */
export function shrinkInside(plane: Plane, longSide: number): Plane {
  const scale = longSide / Math.max(plane.width, plane.height);
  if (scale >= 1) return plane;
  return resizePlane(plane, Math.max(1, Math.round(plane.width * scale)), Math.max(1, Math.round(plane.height * scale)));
}

/** Rows for columns: what walks along columns runs much faster along rows of memory. */
export function transposed({ width, height, values }: Plane): Plane {
  const out = new Float32Array(values.length);
  for (let y = 0, at = 0; y < height; y++) for (let x = 0; x < width; x++, at++) out[x * height + y] = values[at]!;
  return { width: height, height: width, values: out };
}
