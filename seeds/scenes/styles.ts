import type { Random } from './noise.ts';
import type { Grain, Openings, Surface } from './surface.ts';
import type { Colour } from './vector.ts';

type Facade = Surface & { kind: 'facade' };

const white: Colour = [0.72, 0.7, 0.66];
const dark: Colour = [0.05, 0.055, 0.06];

const sash: Openings = {
  bay: 3.1, storey: 3.5, ground: 4.3, pier: 0.9, parapet: 0.9, width: 0.4, sill: 0.85, head: 2.85, reveal: 0.16,
  panesAcross: 2, panesUp: 2, arched: false, frame: white, mirror: 0.09, tint: [1, 1, 1], lit: 0.5, variety: 0.9, dressing: [0.55, 0.52, 0.46],
}; // prettier-ignore

/** Window schemes the city is built with. */
export const openings = {
  sash,
  warehouse: { ...sash, bay: 3.6, storey: 3.7, ground: 0, pier: 1.1, parapet: 0.5, width: 0.46, sill: 0.9, head: 3.05, reveal: 0.28, panesAcross: 3, panesUp: 4, arched: true, frame: dark, lit: 0.45, dressing: null },
  hall: { ...sash, bay: 4.4, storey: 7.4, ground: 0, pier: 1.5, parapet: 1.4, width: 0.5, sill: 1.5, head: 6.3, reveal: 0.5, panesAcross: 3, panesUp: 6, arched: true, frame: dark, lit: 1, variety: 0.2, dressing: [0.58, 0.54, 0.47] },
  terrace: { ...sash, bay: 2.7, storey: 3.1, ground: 3.5, pier: 0.6, parapet: 0.4, width: 0.38, panesUp: 3 },
  ribbon: { ...sash, bay: 6, storey: 3.5, ground: 4.4, pier: 0.4, parapet: 1.0, width: 0.97, sill: 1.0, head: 2.9, reveal: 0.22, panesAcross: 4, panesUp: 1, frame: [0.2, 0.2, 0.2], mirror: 0.14, lit: 0.6, variety: 0.45, dressing: null },
  grid: { ...sash, bay: 3.0, storey: 3.6, ground: 4.8, pier: 0.35, parapet: 0.8, width: 0.78, sill: 0.45, head: 3.2, reveal: 0.55, panesAcross: 2, panesUp: 1, frame: [0.12, 0.12, 0.12], mirror: 0.14, lit: 0.55, variety: 0.55, dressing: null },
  flats: { ...sash, bay: 3.9, storey: 3.0, ground: 3.6, pier: 0.7, parapet: 0.7, width: 0.52, sill: 0.15, head: 2.5, reveal: 0.3, panesAcross: 2, panesUp: 1, frame: [0.3, 0.3, 0.3], lit: 0.5, variety: 1, dressing: null },
  curtain: { ...sash, bay: 1.5, storey: 3.7, ground: 5, pier: 0.1, parapet: 0.3, width: 0.965, sill: 0.75, head: 3.66, reveal: 0.05, panesAcross: 1, panesUp: 1, frame: [0.14, 0.15, 0.16], mirror: 0.3, tint: [0.7, 0.85, 0.9], lit: 0.6, variety: 0.35, dressing: null },
  narrow: { ...sash, bay: 2.1, storey: 3.6, ground: 5, pier: 1.2, parapet: 1.4, width: 0.4, sill: 0.5, head: 3.2, reveal: 0.5, panesAcross: 1, panesUp: 1, frame: dark, mirror: 0.12, lit: 0.5, variety: 0.7, dressing: null },
} satisfies Record<string, Openings>; // prettier-ignore

export const facade = (colour: Colour, grain: Grain, scheme: Openings): Facade => ({ kind: 'facade', colour, grain, openings: scheme });

const shade = (c: Colour, k: number): Colour => [c[0] * k, c[1] * k, c[2] * k];
const choose = <T>(random: Random, list: readonly T[]): T => list[Math.floor(random() * list.length)]!;

const bricks: Colour[] = [[0.3, 0.135, 0.09], [0.34, 0.19, 0.12], [0.24, 0.12, 0.09], [0.42, 0.31, 0.2], [0.22, 0.16, 0.13]]; // prettier-ignore
const stones: Colour[] = [
  [0.5, 0.45, 0.36],
  [0.44, 0.41, 0.36],
  [0.52, 0.49, 0.44],
  [0.38, 0.35, 0.31],
];
const renders: Colour[] = [[0.66, 0.62, 0.55], [0.6, 0.49, 0.35], [0.57, 0.58, 0.56], [0.5, 0.36, 0.28], [0.45, 0.5, 0.5]]; // prettier-ignore
const concretes: Colour[] = [
  [0.36, 0.34, 0.32],
  [0.42, 0.41, 0.39],
  [0.3, 0.29, 0.28],
  [0.5, 0.48, 0.45],
];

/** A wall of one of the city's families, each a little different from the next. */
export const walls = {
  warehouse: (random: Random): Facade => facade(shade(choose(random, bricks), 0.85 + random() * 0.3), 'brick', openings.warehouse),
  house: (random: Random): Facade =>
    random() < 0.55
      ? facade(shade(choose(random, bricks), 0.9 + random() * 0.3), 'brick', openings.terrace)
      : facade(shade(choose(random, renders), 0.85 + random() * 0.25), 'render', openings.terrace),
  stone: (random: Random): Facade => facade(shade(choose(random, stones), 0.9 + random() * 0.2), 'ashlar', openings.sash),
  brick: (random: Random): Facade => facade(shade(choose(random, bricks), 0.9 + random() * 0.3), 'brick', openings.sash),
  office: (random: Random): Facade => facade(shade(choose(random, concretes), 0.9 + random() * 0.2), 'concrete', choose(random, [openings.ribbon, openings.grid, openings.narrow])),
  flats: (random: Random): Facade => facade(shade(choose(random, [...renders, ...concretes, bricks[3]!]), 0.9), 'render', openings.flats),
  glass: (random: Random): Facade => {
    const tint = choose<Colour>(random, [[0.65, 0.85, 0.92], [0.8, 0.9, 0.85], [0.6, 0.7, 0.8], [0.85, 0.8, 0.7]]);
    const frame = choose<Colour>(random, [[0.1, 0.11, 0.12], [0.35, 0.35, 0.35], [0.2, 0.16, 0.12]]);
    return facade([0.08, 0.1, 0.11], 'smooth', { ...openings.curtain, tint, frame, bay: 1.3 + random() * 0.5 });
  },
}; // prettier-ignore

export type Family = keyof typeof walls;

/** Plain stuff used all over the city. */
export const stuff = {
  slate: { kind: 'roof', colour: [0.1, 0.105, 0.115], course: 0.32 },
  tile: { kind: 'roof', colour: [0.27, 0.12, 0.075], course: 0.3 },
  zinc: { kind: 'roof', colour: [0.3, 0.32, 0.34], course: 0.6 },
  gravel: { kind: 'gravel', colour: [0.27, 0.26, 0.25] },
  stone: { kind: 'wall', colour: [0.5, 0.46, 0.39], grain: 'smooth' },
  ashlar: { kind: 'wall', colour: [0.47, 0.43, 0.36], grain: 'ashlar' },
  concrete: { kind: 'wall', colour: [0.4, 0.39, 0.37], grain: 'concrete' },
  chimney: { kind: 'wall', colour: [0.25, 0.13, 0.09], grain: 'brick' },
  plant: { kind: 'wall', colour: [0.34, 0.35, 0.35], grain: 'metal' },
  iron: { kind: 'plain', colour: [0.035, 0.037, 0.04], gloss: 0.15 },
  rail: { kind: 'plain', colour: [0.1, 0.105, 0.11], gloss: 0.2 },
  green: { kind: 'plain', colour: [0.06, 0.12, 0.1], gloss: 0.2 },
  white: { kind: 'plain', colour: [0.7, 0.69, 0.66], gloss: 0.1 },
  red: { kind: 'plain', colour: [0.25, 0.055, 0.045], gloss: 0.15 },
  wood: { kind: 'plain', colour: [0.2, 0.13, 0.08], gloss: 0 },
  bark: { kind: 'plain', colour: [0.075, 0.062, 0.05], gloss: 0 },
  quay: { kind: 'quay', colour: [0.3, 0.28, 0.25] },
  kerb: { kind: 'wall', colour: [0.42, 0.41, 0.39], grain: 'smooth' },
  asphalt: { kind: 'asphalt', colour: [0.12, 0.12, 0.122] },
  slabs: { kind: 'slabs', colour: [0.31, 0.295, 0.27] },
  setts: { kind: 'setts', colour: [0.2, 0.19, 0.18] },
  grass: { kind: 'grass', colour: [0.07, 0.1, 0.035] },
  paint: { kind: 'plain', colour: [0.55, 0.55, 0.52], gloss: 0 },
  water: { kind: 'water', colour: [0.018, 0.03, 0.028] },
  lampGlass: { kind: 'glow', colour: [1, 0.66, 0.34], power: 0.035 },
} satisfies Record<string, Surface>;
