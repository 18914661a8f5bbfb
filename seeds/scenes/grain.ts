import { fractal, hash, noise } from './noise.ts';
import type { Spot } from './spot.ts';
import type { Grain } from './surface.ts';
import { clamp } from './vector.ts';

/** How much of a line of `width` metres is seen at `distance` from its middle when a pixel covers `foot` metres. */
export function line(distance: number, width: number, foot: number): number {
  const reach = width / 2 - Math.abs(distance);
  return clamp(reach / foot + 0.5, 0, 1) * Math.min(1, width / foot);
}

const wrap = (v: number, period: number): number => v - Math.floor(v / period) * period;

/** Joints of a bond: blocks of the given size, every other course shifted by half, each block with its own tone. */
function bond(spot: Spot, width: number, height: number, joint: number, jointTone: number, spread: number): void {
  const detail = clamp(1.6 - spot.footV / (height * 0.7), 0, 1);
  if (detail <= 0) return;
  const course = Math.floor(spot.v / height);
  const along = spot.u + (course & 1 ? width / 2 : 0);
  const block = Math.floor(along / width);
  const toneOfBlock = 1 + (hash(block, course, spot.seed) - 0.5) * spread * detail;
  const x = wrap(along, width);
  const y = wrap(spot.v, height);
  const gap = Math.max(line(Math.min(x, width - x), joint, spot.footU), line(Math.min(y, height - y), joint, spot.footV));
  spot.tone(toneOfBlock * (1 + (jointTone - 1) * gap * detail));
}

/** Rain, soot and age: large patches, streaks that run down, and a darker foot. */
function weather(spot: Spot, strength: number): void {
  const { u, v, seed } = spot;
  const patches = fractal(u * 0.11 + seed, v * 0.13, 3) - 0.5;
  const streaks = noise(u * 1.7 + seed, v * 0.09) * noise(u * 0.31, v * 0.05 + seed) - 0.3;
  const fine = noise(u * 7.1, v * 7.3) - 0.5;
  // Seen at a flat angle, a point may be reckoned a little outside its face.
  const foot = Math.exp(-Math.max(0, v) / 1.1) * 0.22;
  const crown = Math.exp(-Math.max(0, spot.vLength - v) / 0.8) * 0.14;
  spot.tone(1 + strength * (patches * 0.5 - Math.max(0, streaks) * 0.55 + fine * 0.1 - foot - crown));
  spot.r *= 1 + strength * 0.05 * patches;
  spot.b *= 1 - strength * 0.07 * patches;
}

/** Gives a wall the look of what it is built of. */
export function grain(spot: Spot, kind: Grain): void {
  switch (kind) {
    case 'brick':
      bond(spot, 0.225, 0.075, 0.012, 1.35, 0.42);
      spot.tone(0.86 + 0.28 * noise(spot.u * 2.3 + spot.seed, spot.v * 6));
      weather(spot, 0.8);
      return;
    case 'ashlar':
      bond(spot, 0.95, 0.42, 0.02, 0.55, 0.16);
      weather(spot, 0.7);
      return;
    case 'concrete':
      bond(spot, 2.4, 1.2, 0.025, 0.62, 0.08);
      weather(spot, 0.9);
      return;
    case 'render':
      weather(spot, 0.55);
      return;
    case 'metal':
      spot.tone(0.9 + 0.2 * clamp((wrap(spot.u, 0.34) / 0.34 - 0.5) * 3 + 0.5, 0, 1));
      weather(spot, 0.5);
      return;
    case 'smooth':
      weather(spot, 0.18);
  }
}
