import sharp from 'sharp';
import { seeded } from './noise.ts';
import type { LinearPicture } from './render.ts';
import { luminance } from './vector.ts';

/**
 * From linear light to a picture: exposure, a film-like curve, enlargement, and the grain of the sensor.
 *
 * The curve is the rational approximation known as the ACES fit (Narkowicz, from memory), followed by the sRGB transfer
 * function. It reaches white at about `WHITE` times middle exposure; what is brighter is lost, as on a sensor.
 */
const [A, B, C, D, E] = [2.51, 0.03, 2.43, 0.59, 0.14];
export const WHITE = 5.2;
const SCALE = 0.62;

function film(v: number): number {
  const x = Math.min(v, WHITE) * SCALE;
  const top = WHITE * SCALE;
  const at = (q: number): number => (q * (A * q + B)) / (q * (C * q + D) + E);
  return Math.min(1, at(x) / at(top));
}

const encoded = (v: number): number => (v <= 0.0031308 ? 12.92 * v : 1.055 * v ** (1 / 2.4) - 0.055);

const CURVE = 16384;
/** The curve over the square root of light, so that shadows have as many entries as lights. */
const curve = Float32Array.from({ length: CURVE + 1 }, (_, i) => encoded(film((i / CURVE) ** 2 * WHITE)));

const curve16 = Uint16Array.from(curve, (code) => Math.min(65535, code * 65535));

/** Code value in 0..1 for linear light `v` (1 is white paper in the metered light). */
export function codeOf(v: number): number {
  return curve[Math.min(CURVE, Math.max(0, Math.round(Math.sqrt(Math.max(0, v) / WHITE) * CURVE)))]!;
}

/** Linear light for a code value in 0..1: the curve read backwards. */
export function lightOf(code: number): number {
  let [low, high] = [0, CURVE];
  while (low < high) {
    const mid = (low + high) >> 1;
    if (curve[mid]! < code) low = mid + 1;
    else high = mid;
  }
  return (low / CURVE) ** 2 * WHITE;
}

/** The factor a camera's meter would choose: the picture's log average, weighted to the middle, becomes `key`. */
export function meter(picture: LinearPicture, key: number): number {
  const { width, height, light } = picture;
  let [sum, weight] = [0, 0];
  for (let y = 0; y < height; y += 5) {
    for (let x = 0; x < width; x += 5) {
      const at = (y * width + x) * 3;
      const w = 1.4 - Math.hypot(x / width - 0.5, y / height - 0.5);
      sum += Math.log(Math.max(0, luminance(light[at]!, light[at + 1]!, light[at + 2]!)) + 1e-7) * w;
      weight += w;
    }
  }
  return key / Math.exp(sum / weight);
}

export interface Exposure {
  /** Factor from scene light to the metered exposure. */
  factor: number;
  /** Steps above or below it. */
  steps: number;
  balance: readonly [number, number, number];
  sensitivity: number;
  seed: number;
}

/** A picture ready to be written: 16-bit code values, interleaved RGB. */
export interface Developed {
  width: number;
  height: number;
  codes: Uint16Array;
}

/** Exposes, applies the curve, enlarges to `width` and adds grain. */
export async function develop(picture: LinearPicture, exposure: Exposure, width: number, height: number): Promise<Developed> {
  const codes = expose(picture, exposure);
  const raw = { width: picture.width, height: picture.height, channels: 3 as const };
  let grown: Uint16Array = codes;
  if (width !== picture.width) {
    const { data } = await sharp(codes, { raw })
      .resize(width, height, { kernel: 'cubic', fit: 'fill' })
      .toColourspace('rgb16')
      .raw({ depth: 'ushort' })
      .toBuffer({ resolveWithObject: true });
    grown = new Uint16Array(data.buffer, data.byteOffset, data.length / 2);
  }
  addGrain(grown, exposure);
  return { width, height, codes: grown };
}

function expose(picture: LinearPicture, { factor, steps, balance }: Exposure): Uint16Array {
  const { light } = picture;
  const codes = new Uint16Array(light.length);
  const k = factor * 2 ** steps;
  // The same as codeOf(), written out: it runs some millions of times for each frame.
  const gains = balance.map((b) => ((k * b) / WHITE) * CURVE * CURVE);
  for (let c = 0; c < 3; c++) {
    const gain = gains[c]!;
    for (let at = c; at < light.length; at += 3) {
      const entry = (Math.sqrt(Math.max(0, light[at]! * gain)) + 0.5) | 0;
      codes[at] = entry < CURVE ? curve16[entry]! : 65535;
    }
  }
  return codes;
}

const TILE = 1 << 18;
const NOISE_LEVELS = 256;

/** Normally distributed numbers, drawn once. */
const gaussian = (() => {
  let tile: Float32Array | null = null;
  return (): Float32Array => {
    if (tile) return tile;
    const random = seeded(2026);
    tile = new Float32Array(TILE);
    for (let i = 0; i < TILE; i += 2) {
      const r = Math.sqrt(-2 * Math.log(1 - random()));
      const angle = random() * Math.PI * 2;
      tile[i] = r * Math.cos(angle);
      tile[i + 1] = r * Math.sin(angle);
    }
    return tile;
  };
})();

/**
 * Grain as a sensor has it: photon noise grows with the root of light, read noise stays; both are carried through the
 * curve, which makes shadows noisier than lights.
 */
function addGrain(codes: Uint16Array, { sensitivity, seed }: Exposure): void {
  const levels = new Float32Array(NOISE_LEVELS + 1);
  const gain = sensitivity / 100;
  for (let i = 0; i <= NOISE_LEVELS; i++) {
    const v = lightOf(i / NOISE_LEVELS);
    const spread = Math.sqrt(v * 0.00011 * gain + (0.0007 * Math.sqrt(gain)) ** 2);
    const slope = (codeOf(v + 0.004) - codeOf(Math.max(0, v - 0.004))) / 0.008;
    levels[i] = Math.min(0.05, spread * Math.min(slope, 6)) * 65535 + 60;
  }
  const tile = gaussian();
  const random = seeded(seed);
  let from = 0;
  for (let at = 0; at < codes.length; at++) {
    if ((at & 4095) === 0) from = Math.floor(random() * (TILE - 4096));
    const code = codes[at]!;
    const noisy = code + levels[code >> 8]! * tile[from + (at & 4095)]!;
    codes[at] = noisy < 0 ? 0 : noisy > 65535 ? 65535 : noisy;
  }
}
