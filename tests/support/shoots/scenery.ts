import type { Chance } from './chance.ts';

/** Light of a place, all around it: 4 squares of 64 × 64 beside each other, row by row, in stops; 0 just fills a straight curve. */
export interface Place {
  stops: Float32Array;
}

export const HIGH = 64;
export const AROUND = 256;

/** Draws a street of towers with windows below a sky, by day or by night with lamps far brighter than the rest. */
export function drawPlace(chance: Chance): Place {
  const light = new Float32Array(AROUND * HIGH);
  const night = chance.is(0.4);
  const [sky, ground] = night ? [0.04, 0.12] : [chance.between(0.5, 1.6), chance.between(0.05, 0.2)];
  for (let y = 0; y < HIGH; y++) {
    for (let x = 0; x < AROUND; x++) light[y * AROUND + x] = y < 48 ? sky * (1.2 - y / 80) : ground * (0.8 + y / 160);
  }
  for (let x = 0; x < AROUND;) {
    const wide = chance.whole(5, 22);
    drawTower(light, chance, x, wide, night);
    x += wide + chance.whole(0, 7);
  }
  return { stops: soften(light).map(Math.log2) };
}

/** Windows are smaller than a column, so that most of them fall into two. */
function soften(light: Float32Array): Float32Array {
  return light.map((value, at) => {
    const left = at % AROUND === 0 ? at + AROUND - 1 : at - 1;
    const right = at % AROUND === AROUND - 1 ? at - AROUND + 1 : at + 1;
    return 0.5 * value + 0.25 * ((light[left] as number) + (light[right] as number));
  });
}

function drawTower(light: Float32Array, chance: Chance, from: number, wide: number, night: boolean): void {
  const top = chance.whole(6, 44);
  const wall = chance.between(0.02, 0.4) * (night ? 0.4 : 1);
  const [every, storey] = [chance.whole(2, 4), chance.whole(2, 5)];
  for (let y = top; y < 52; y++) {
    for (let x = from; x < Math.min(AROUND, from + wide); x++) {
      const window = (x - from) % every === 1 && (y - top) % storey === 1;
      const lit = window && chance.is(night ? 0.4 : 0.1);
      light[y * AROUND + x] = lit ? chance.between(0.5, night ? 6 : 1.2) : window ? wall * 0.4 : wall * chance.between(0.85, 1.15);
    }
  }
}

/** How a camera turns light into values: straight, or with a shoulder. Both end at white. */
export type Curve = 'straight' | 'shoulder';

const encode = (value: number) => 255 * (value <= 0.0031308 ? value * 12.92 : 1.055 * value ** (1 / 2.4) - 0.055);

/** Values of light from 2^-14 to 2^10, 64 a stop: the drawing of 40,000 thumbs needs a table. */
function tableOf(curve: Curve): Float32Array {
  return Float32Array.from({ length: 24 * 64 }, (_, step) => {
    const light = 2 ** (step / 64 - 14);
    return encode(Math.min(1, curve === 'straight' ? light : 1 - Math.exp(-1.5 * light)));
  });
}
const TABLES: Record<Curve, Float32Array> = { straight: tableOf('straight'), shoulder: tableOf('shoulder') };

/**
 * The thumb of a frame: the place seen in a direction (columns), `stops` brighter than metered, with sensor noise, as base64 of 32 × 32 values.
 */
export function thumbOf(place: Place, direction: number, stops: number, curve: Curve, chance: Chance): string {
  const bytes = Buffer.alloc(32 * 32);
  const grain = chance.between(0.3, 1.5);
  const value = (x: number, y: number) => {
    const seen = place.stops[y * AROUND + ((x + direction) % AROUND)] as number;
    const step = Math.round((seen + stops + 14) * 64);
    return TABLES[curve][Math.max(0, Math.min(TABLES[curve].length - 1, step))] as number;
  };
  for (let y = 0; y < 32; y++) {
    for (let x = 0; x < 32; x++) {
      const sum = value(2 * x, 2 * y) + value(2 * x + 1, 2 * y) + value(2 * x, 2 * y + 1) + value(2 * x + 1, 2 * y + 1);
      bytes[y * 32 + x] = Math.max(0, Math.min(255, Math.round(sum / 4 + chance.noise() * grain)));
    }
  }
  return bytes.toString('base64');
}
