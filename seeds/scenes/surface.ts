import type { Colour } from './vector.ts';

/** What the fine grain of a wall is made of. */
export type Grain = 'brick' | 'ashlar' | 'render' | 'concrete' | 'metal' | 'smooth';

/** How a wall is divided into bays and storeys, in metres. */
export interface Openings {
  bay: number;
  storey: number;
  /** Height of the ground floor, 0 where it is a storey like the others. */
  ground: number;
  /** Wall left free at the corners and above the last storey. */
  pier: number;
  parapet: number;
  /** The opening inside a bay: share of the bay's width, then sill and head in metres above the floor. */
  width: number;
  sill: number;
  head: number;
  /** How deep the pane lies behind the face of the wall. */
  reveal: number;
  panesAcross: number;
  panesUp: number;
  arched: boolean;
  frame: Colour;
  /** Reflectance of the pane seen straight on. */
  mirror: number;
  /** Tint of what lies behind and of what is reflected. */
  tint: Colour;
  /** Share of rooms lit when everybody is in. */
  lit: number;
  /** 1 = every room differs, 0 = a whole floor switches together. */
  variety: number;
  /** Dressed stone around the opening and at each floor. */
  dressing: Colour | null;
}

export type Surface =
  | { kind: 'facade'; colour: Colour; grain: Grain; openings: Openings }
  | { kind: 'wall'; colour: Colour; grain: Grain }
  | { kind: 'quay'; colour: Colour }
  | { kind: 'roof'; colour: Colour; course: number }
  | { kind: 'gravel' | 'asphalt' | 'slabs' | 'setts' | 'grass'; colour: Colour }
  | { kind: 'leaf'; colour: Colour }
  | { kind: 'plain'; colour: Colour; gloss: number }
  | { kind: 'glow'; colour: Colour; power: number }
  | { kind: 'water'; colour: Colour };

/** One lamp that lights its surroundings: a point without a shadow of its own. */
export interface Lamp {
  x: number;
  y: number;
  z: number;
  colour: Colour;
  power: number;
}
