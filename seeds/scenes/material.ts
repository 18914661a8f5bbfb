import { facade } from './facade.ts';
import { grain, line } from './grain.ts';
import { fractal, hash, noise } from './noise.ts';
import type { Spot } from './spot.ts';
import type { Surface } from './surface.ts';
import { clamp } from './vector.ts';

const wrap = (v: number, period: number): number => v - Math.floor(v / period) * period;

/** Fills a point with what its surface is made of. */
export function material(spot: Spot, surface: Surface): void {
  if (surface.kind === 'facade') return facade(spot, surface);
  const [r, g, b] = surface.colour;
  spot.begin(r, g, b);
  switch (surface.kind) {
    case 'wall':
      return grain(spot, surface.grain);
    case 'quay':
      return quay(spot);
    case 'roof':
      return roof(spot, surface.course);
    case 'asphalt':
      return asphalt(spot);
    case 'slabs':
      return paved(spot, 0.9, 0.6, 0.015);
    case 'setts':
      return paved(spot, 0.2, 0.12, 0.018);
    case 'gravel':
    case 'grass':
      return rough(spot);
    case 'leaf':
      return spot.tone(0.6 + 0.8 * hash(spot.u * 3, spot.v * 3, spot.seed));
    case 'plain':
      spot.glass = surface.gloss;
      spot.pane = 0;
      return spot.tone(0.9 + 0.2 * noise(spot.u * 3 + spot.seed, spot.v * 3));
    case 'glow':
      spot.glowR = r * surface.power;
      spot.glowG = g * surface.power;
      spot.glowB = b * surface.power;
  }
}

/** Harbour masonry: big blocks, a dark band where the tide stands, weed at the water. */
function quay(spot: Spot): void {
  const course = Math.floor(spot.v / 0.55);
  const along = spot.u + hash(course, 1, 4) * 1.4;
  const block = Math.floor(along / 1.4);
  const x = wrap(along, 1.4);
  const y = wrap(spot.v, 0.55);
  const joint = Math.max(line(Math.min(x, 1.4 - x), 0.03, spot.footU), line(Math.min(y, 0.55 - y), 0.03, spot.footV));
  spot.tone((0.82 + 0.36 * hash(block, course, 3)) * (1 - 0.45 * joint));
  spot.tone(0.75 + 0.5 * fractal(spot.u * 1.3, spot.v * 1.9, 3));
  const tide = clamp((spot.vLength - spot.v - 1.0 + (noise(spot.u * 0.8, 3) - 0.5) * 0.4) * 2.2, 0, 1);
  spot.tone(1 - 0.62 * tide);
  spot.g *= 1 + 0.16 * tide;
}

function roof(spot: Spot, course: number): void {
  const row = Math.floor(spot.v / course);
  const tile = Math.floor((spot.u + (row & 1) * course * 0.5) / course);
  const detail = clamp(1.5 - spot.footV / course, 0, 1);
  const step = wrap(spot.v, course) / course;
  spot.tone(1 + detail * ((hash(tile, row, spot.seed) - 0.5) * 0.28 - 0.3 * (step > 0.85 ? 1 : 0)));
  spot.tone(0.8 + 0.4 * fractal(spot.u * 0.35 + spot.seed, spot.v * 0.5, 3));
}

function asphalt(spot: Spot): void {
  const patches = fractal(spot.u * 0.09, spot.v * 0.09, 4);
  const wear = noise(spot.u * 0.45, spot.v * 0.06) - 0.5;
  const grit = noise(spot.u * 14, spot.v * 14) - 0.5;
  const seams = line(wrap(spot.u + 2 * noise(spot.v * 0.1, 4), 9) - 4.5, 0.05, spot.footU);
  spot.tone((0.68 + 0.64 * patches) * (1 + 0.2 * wear + 0.16 * grit * clamp(1.2 - spot.footU * 8, 0, 1) - 0.3 * seams));
}

function paved(spot: Spot, width: number, height: number, joint: number): void {
  const row = Math.floor(spot.v / height);
  const along = spot.u + (row & 1 ? width / 2 : 0);
  const stone = Math.floor(along / width);
  const detail = clamp(1.5 - Math.max(spot.footV / height, spot.footU / width), 0, 1);
  const x = wrap(along, width);
  const y = wrap(spot.v, height);
  const gap = Math.max(line(Math.min(x, width - x), joint, spot.footU), line(Math.min(y, height - y), joint, spot.footV));
  spot.tone(1 + detail * ((hash(stone, row, 21) - 0.5) * 0.3 - 0.45 * gap));
  spot.tone(0.72 + 0.56 * fractal(spot.u * 0.17, spot.v * 0.17, 4));
  spot.tone(0.94 + 0.12 * noise(spot.u * 9, spot.v * 9));
}

function rough(spot: Spot): void {
  spot.tone(0.6 + 0.8 * fractal(spot.u * 0.6, spot.v * 0.6, 5));
}
