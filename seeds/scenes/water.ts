import { type MirrorPicture, readMirror, straightAt } from './mirror.ts';
import { hash, noise, noiseSlope } from './noise.ts';
import type { Sky } from './sky.ts';
import type { Colour } from './vector.ts';

const one = new Float64Array(3);
const slope = new Float64Array(2);

/** Wave trains from swell to ripples: direction, waves a metre, and steepness. */
const trains = [0, 1, 2, 3].map((i) => {
  const angle = 0.5 + i * 1.9;
  return { c: Math.cos(angle), s: Math.sin(angle), size: 0.16 * 2.5 ** i, steep: [0.045, 0.05, 0.04, 0.034][i]!, shift: i * 31 };
});
const steepness = new Float64Array(2);

/** Slope of the water's surface, leaving out what is finer than a pixel of `foot` metres. */
function waves(x: number, z: number, wind: number, foot: number, out: Float64Array): void {
  let sx = 0;
  let sz = 0;
  const calm = 0.4 + 1.1 * noise(x * 0.021 + 7, z * 0.013);
  for (let i = 0; i < 4; i++) {
    const w = trains[i]!;
    // Crests are longer than they are far apart.
    noiseSlope((x * w.c + z * w.s) * w.size + w.shift, (z * w.c - x * w.s) * w.size * 0.45, steepness);
    const k = w.steep * calm;
    const across = steepness[0]! * k;
    const alongside = steepness[1]! * k * 0.45;
    sx += across * w.c - alongside * w.s;
    sz += across * w.s + alongside * w.c;
    if (foot * w.size > 1.2) break;
  }
  out[0] = sx * wind;
  out[1] = sz * wind;
}

/** Where a ray of sight meets the water, and its place in the picture. */
export interface Meeting {
  x: number;
  y: number;
  z: number;
  dx: number;
  dy: number;
  dz: number;
  away: number;
  foot: number;
  s: number;
  t: number;
}

/** Harbour water: what it mirrors, broken by waves, over its own dull green. Written to `out`. */
export function water(m: Meeting, mirror: MirrorPicture, sky: Sky, body: Colour, wind: number, out: Float64Array): void {
  const straight = straightAt(mirror, m.s, m.t);
  let r = 0;
  let g = 0;
  let b = 0;
  let share = 0;
  const taps = 3;
  for (let i = 0; i < taps; i++) {
    const jitter = hash((m.x * 977) | 0, (m.z * 977) | 0, i);
    const reach = m.foot * (jitter - 0.5) * 1.4;
    waves(m.x + reach, m.z + reach * 2.2, wind, m.foot, slope);
    // What a pixel cannot show as waves shows as a spread of slopes.
    const rough = (0.012 + 0.03 * Math.min(1, m.foot * 2)) * wind * (hash((m.z * 811) | 0, (m.x * 811) | 0, i + 9) - 0.5) * 2;
    const nx = slope[0]!;
    const nz = slope[1]! + rough;
    const k = 1 / Math.sqrt(1 + nx * nx + nz * nz);
    const along = (-nx * m.dx + m.dy - nz * m.dz) * k;
    const rx = m.dx + 2 * along * nx * k;
    const ry = Math.max(0.012, Math.abs(m.dy - 2 * along * k));
    const rz = m.dz + 2 * along * nz * k;
    const l = 1 / Math.sqrt(rx * rx + ry * ry + rz * rz);
    readMirror(mirror, sky, m.x, m.y, m.z, rx * l, ry * l, rz * l, m.away, straight, one);
    const grazing = 1 - Math.min(1, Math.max(0.02, Math.abs(along)));
    const square = grazing * grazing;
    const fresnel = 0.03 + 0.91 * square * square * grazing;
    share += fresnel;
    r += one[0]! * fresnel;
    g += one[1]! * fresnel;
    b += one[2]! * fresnel;
  }
  const deep = 1 - share / taps;
  out[0] = r / taps + body[0] * deep;
  out[1] = g / taps + body[1] * deep;
  out[2] = b / taps + body[2] * deep;
}

const wetLight = new Float64Array(3);

/** Rain on stone or tar: puddles mirror sharply, the rest with a long blur downwards. Adds to `out`. */
export function wetGround(m: Meeting, mirror: MirrorPicture, sky: Sky, out: Float64Array): void {
  const puddle = Math.min(1, Math.max(0, (noise(m.x * 0.33, m.z * 0.33) * 0.6 + noise(m.x * 1.1, m.z * 1.1) * 0.4 - 0.44) * 6));
  const straight = straightAt(mirror, m.s, m.t);
  let r = 0;
  let g = 0;
  let b = 0;
  const taps = 7;
  for (let i = 0; i < taps; i++) {
    const p = hash((m.x * 1013) | 0, (m.z * 1013) | 0, i) - 0.5;
    const q = (i + hash((m.z * 769) | 0, (m.x * 769) | 0, i + 4)) / taps - 0.5;
    const rough = 0.2 * (1 - puddle) + 0.012;
    const ry = Math.max(0.02, -m.dy + q * rough * 1.5);
    const rx = m.dx + p * rough * 0.28 + (noise(m.x * 3, m.z * 3) - 0.5) * 0.02;
    const l = 1 / Math.sqrt(rx * rx + ry * ry + m.dz * m.dz);
    readMirror(mirror, sky, m.x, m.y, m.z, rx * l, ry * l, m.dz * l, m.away, straight, wetLight);
    r += wetLight[0]!;
    g += wetLight[1]!;
    b += wetLight[2]!;
  }
  const grazing = (1 - Math.min(1, -m.dy)) ** 4;
  const k = ((0.04 + 0.8 * grazing) * (0.45 + 0.55 * puddle)) / taps;
  const keep = 1 - 0.4 * puddle;
  out[0] = out[0]! * keep + r * k;
  out[1] = out[1]! * keep + g * k;
  out[2] = out[2]! * keep + b * k;
}
