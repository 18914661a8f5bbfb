/** A small seeded generator of numbers in [0, 1): the same seed draws the same city everywhere. */
export type Random = () => number;

/** Mulberry32, from common practice: 32 bits of state, no arithmetic that differs between machines. */
export function seeded(seed: number): Random {
  let state = (seed * 2654435761) | 0;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** A number in [0, 1) that belongs to a cell: the same window is lit however often it is looked at. */
export function hash(x: number, y: number, z: number): number {
  let h = Math.imul(x | 0, 374761393) ^ Math.imul(y | 0, 668265263) ^ Math.imul(z | 0, 1442695041);
  h = Math.imul(h ^ (h >>> 13), 1274126177);
  h = Math.imul(h ^ (h >>> 15), 2246822519);
  return ((h ^ (h >>> 16)) >>> 0) / 4294967296;
}

const SIDE = 256;
const lattice = new Float32Array(SIDE * SIDE);
for (let i = 0; i < lattice.length; i++) lattice[i] = hash(i & 255, i >> 8, 77);

/** Smooth value noise in [0, 1], repeating every 256 units. */
export function noise(x: number, y: number): number {
  const xi = Math.floor(x);
  const yi = Math.floor(y);
  let fx = x - xi;
  let fy = y - yi;
  fx = fx * fx * (3 - 2 * fx);
  fy = fy * fy * (3 - 2 * fy);
  const x0 = xi & 255;
  const x1 = (xi + 1) & 255;
  const y0 = (yi & 255) << 8;
  const y1 = ((yi + 1) & 255) << 8;
  const a = lattice[y0 | x0]!;
  const c = lattice[y1 | x0]!;
  const top = a + (lattice[y0 | x1]! - a) * fx;
  return top + (c + (lattice[y1 | x1]! - c) * fx - top) * fy;
}

/** How steep `noise` is at a point, along x and y, written to `out`. */
export function noiseSlope(x: number, y: number, out: Float64Array): void {
  const xi = Math.floor(x);
  const yi = Math.floor(y);
  const tx = x - xi;
  const ty = y - yi;
  const fx = tx * tx * (3 - 2 * tx);
  const fy = ty * ty * (3 - 2 * ty);
  const x0 = xi & 255;
  const x1 = (xi + 1) & 255;
  const y0 = (yi & 255) << 8;
  const y1 = ((yi + 1) & 255) << 8;
  const a = lattice[y0 | x0]!;
  const b = lattice[y0 | x1]!;
  const c = lattice[y1 | x0]!;
  const d = lattice[y1 | x1]!;
  out[0] = (b - a + (a - b - c + d) * fy) * 6 * tx * (1 - tx);
  out[1] = (c - a + (a - b - c + d) * fx) * 6 * ty * (1 - ty);
}

/** Fractal sum of noise in about [0, 1]. Each octave is turned, so that the lattice does not show. */
export function fractal(x: number, y: number, octaves: number): number {
  let sum = 0;
  let weight = 0.5;
  for (let i = 0; i < octaves; i++) {
    sum += weight * noise(x, y);
    const turned = x * 1.62 - y * 1.18 + 17.3;
    y = x * 1.18 + y * 1.62 + 5.1;
    x = turned;
    weight *= 0.5;
  }
  return sum / (1 - weight * 2);
}
