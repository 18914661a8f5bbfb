import type { LinearPicture } from './render.ts';
import { luminance } from './vector.ts';

/** Smears a picture along a short bent path, as a camera does that is moved while the shutter is open. */
export function smear(picture: LinearPicture, share: number): void {
  const { width, height, light } = picture;
  const before = light.slice();
  const long = Math.max(3, Math.round(width * share));
  const path = Array.from(
    { length: long },
    (_, i) => [Math.round(i * 0.85 - long / 2), Math.round(Math.sin((i / long) * 2.6) * long * 0.4)] as const,
  );
  light.fill(0);
  for (const [dx, dy] of path) {
    for (let y = 0; y < height; y++) {
      const row = Math.min(height - 1, Math.max(0, y + dy)) * width;
      for (let x = 0; x < width; x++) {
        const from = (row + Math.min(width - 1, Math.max(0, x + dx))) * 3;
        const to = (y * width + x) * 3;
        light[to]! += before[from]! / long;
        light[to + 1]! += before[from + 1]! / long;
        light[to + 2]! += before[from + 2]! / long;
      }
    }
  }
}

/** Cells of the coarse map of brightness along the longer side. */
const CELLS = 48;

/**
 * Brings dark and bright parts of a picture closer together, as a merge of several exposures does: each region is
 * multiplied by what is missing to the mean, to the power of `share`.
 */
export function evenOut(picture: LinearPicture, share: number): LinearPicture {
  const { width, height, light } = picture;
  const size = Math.ceil(Math.max(width, height) / CELLS);
  const columns = Math.ceil(width / size) + 1;
  const rows = Math.ceil(height / size) + 1;
  const map = coarse(picture, size, columns, rows);
  const mean = map.reduce((sum, v) => sum + v, 0) / map.length;
  const evened = new Float32Array(light.length);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const gain = 2 ** ((mean - at(map, columns, rows, x / size - 0.5, y / size - 0.5)) * share);
      const p = (y * width + x) * 3;
      evened[p] = light[p]! * gain;
      evened[p + 1] = light[p + 1]! * gain;
      evened[p + 2] = light[p + 2]! * gain;
    }
  }
  return { width, height, light: evened };
}

/** Mean brightness of each cell in steps, smoothed over its neighbours. */
function coarse({ width, height, light }: LinearPicture, size: number, columns: number, rows: number): Float32Array {
  const sum = new Float32Array(columns * rows);
  const count = new Float32Array(columns * rows);
  for (let y = 0; y < height; y += 2) {
    for (let x = 0; x < width; x += 2) {
      const cell = Math.floor(y / size) * columns + Math.floor(x / size);
      const p = (y * width + x) * 3;
      sum[cell]! += Math.log2(luminance(light[p]!, light[p + 1]!, light[p + 2]!) + 1e-7);
      count[cell]!++;
    }
  }
  const known = sum.map((v, i) => (count[i]! > 0 ? v / count[i]! : Number.NaN));
  return known.map((_, i) => neighbourhood(known, columns, rows, i % columns, Math.floor(i / columns)));
}

function neighbourhood(map: Float32Array, columns: number, rows: number, x: number, y: number): number {
  let [sum, n] = [0, 0];
  for (let j = Math.max(0, y - 3); j <= Math.min(rows - 1, y + 3); j++) {
    for (let i = Math.max(0, x - 3); i <= Math.min(columns - 1, x + 3); i++) {
      const v = map[j * columns + i]!;
      if (Number.isNaN(v)) continue;
      sum += v;
      n++;
    }
  }
  return sum / n;
}

function at(map: Float32Array, columns: number, rows: number, x: number, y: number): number {
  const xi = Math.min(columns - 2, Math.max(0, Math.floor(x)));
  const yi = Math.min(rows - 2, Math.max(0, Math.floor(y)));
  const fx = Math.min(1, Math.max(0, x - xi));
  const fy = Math.min(1, Math.max(0, y - yi));
  const p = yi * columns + xi;
  const top = map[p]! + (map[p + 1]! - map[p]!) * fx;
  const low = map[p + columns]! + (map[p + columns + 1]! - map[p + columns]!) * fx;
  return top + (low - top) * fy;
}
