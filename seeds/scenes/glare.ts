import type { Camera } from './camera.ts';
import type { LinearPicture } from './render.ts';

/** Shares of light that a lens scatters near and far (a common order of magnitude, from memory). */
const NEAR_SHARE = 0.05;
const FAR_SHARE = 0.035;

/** Light scattered in the lens: lamps and bright windows get their soft halo. It adds and takes nothing in sum. */
export function glare(picture: LinearPicture): void {
  const small = shrink(picture, 4);
  const near = blurred(small, Math.max(2, Math.round(small.width / 190)));
  const far = blurred(small, Math.max(4, Math.round(small.width / 34)));
  const { width, height, light } = picture;
  for (let y = 0; y < height; y++) {
    const fy = Math.min(small.height - 1.001, Math.max(0, (y + 0.5) / 4 - 0.5));
    const yi = fy | 0;
    for (let x = 0; x < width; x++) {
      const fx = Math.min(small.width - 1.001, Math.max(0, (x + 0.5) / 4 - 0.5));
      const xi = fx | 0;
      const a = (yi * small.width + xi) * 3;
      const down = small.width * 3;
      const tx = fx - xi;
      const ty = fy - yi;
      for (let c = 0; c < 3; c++) {
        const n = between(near, a + c, down, tx, ty);
        const f = between(far, a + c, down, tx, ty);
        const at = (y * width + x) * 3 + c;
        light[at] = light[at]! * (1 - NEAR_SHARE - FAR_SHARE) + n * NEAR_SHARE + f * FAR_SHARE;
      }
    }
  }
}

function between(table: Float32Array, at: number, down: number, tx: number, ty: number): number {
  const top = table[at]! + (table[at + 3]! - table[at]!) * tx;
  const low = table[at + down]! + (table[at + down + 3]! - table[at + down]!) * tx;
  return top + (low - top) * ty;
}

function shrink(picture: LinearPicture, k: number): LinearPicture {
  const width = Math.floor(picture.width / k);
  const height = Math.floor(picture.height / k);
  const light = new Float32Array(width * height * 3);
  for (let y = 0; y < height * k; y++) {
    for (let x = 0; x < width * k; x++) {
      const to = (((y / k) | 0) * width + ((x / k) | 0)) * 3;
      const from = (y * picture.width + x) * 3;
      for (let c = 0; c < 3; c++) light[to + c]! += picture.light[from + c]! / (k * k);
    }
  }
  return { width, height, light };
}

/** Three box blurs each way come close to a Gaussian. */
function blurred(picture: LinearPicture, radius: number): Float32Array {
  let from = picture.light.slice();
  let to = new Float32Array(from.length);
  const { width, height } = picture;
  for (let pass = 0; pass < 3; pass++) {
    for (let y = 0; y < height; y++) box(from, to, y * width * 3, 3, width, radius);
    for (let x = 0; x < width; x++) box(to, from, x * 3, width * 3, height, radius);
  }
  to = from;
  from = to;
  return from;
}

function box(from: Float32Array, to: Float32Array, start: number, step: number, n: number, radius: number): void {
  const share = 1 / (radius * 2 + 1);
  for (let c = 0; c < 3; c++) {
    const at = (i: number): number => from[start + c + Math.min(n - 1, Math.max(0, i)) * step]!;
    let sum = 0;
    for (let i = -radius; i <= radius; i++) sum += at(i);
    for (let i = 0; i < n; i++) {
      to[start + c + i * step] = sum * share;
      sum += at(i + radius + 1) - at(i - radius);
    }
  }
}

/** A lens lights its corners less: cos^4 of the angle off the axis, softened as a good lens does. */
export function vignette(picture: LinearPicture, camera: Camera): void {
  const { width, height, light } = picture;
  const wide = (width * 0.92) ** 2;
  const reach = Math.max(camera.focal ** 2, wide);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const square = (x - width / 2) ** 2 + (y - height / 2) ** 2;
      const k = (reach / (reach + square)) ** 1.1;
      const at = (y * width + x) * 3;
      light[at]! *= k;
      light[at + 1]! *= k;
      light[at + 2]! *= k;
    }
  }
}
