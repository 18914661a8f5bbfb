import { grain, line } from './grain.ts';
import { hash } from './noise.ts';
import { glowThroughBlind, lookInto, roomLevel } from './room.ts';
import { Spot } from './spot.ts';
import type { Openings, Surface } from './surface.ts';
import { clamp } from './vector.ts';

/** The opening a point lies in, in metres within its bay and storey. */
interface Bay {
  i: number;
  j: number;
  x: number;
  y: number;
  width: number;
  height: number;
  left: number;
  right: number;
  sill: number;
  head: number;
}

const bay: Bay = { i: 0, j: 0, x: 0.5, y: 0.5, width: 0.5, height: 0.5, left: 0.5, right: 0.5, sill: 0.5, head: 0.5 };
const inside = new Spot();

/** Finds bay and storey of a point; false where the wall is whole. */
function find(spot: Spot, o: Openings): boolean {
  const clear = spot.uLength - 2 * o.pier;
  const bays = Math.max(1, Math.round(clear / o.bay));
  bay.width = clear / bays;
  bay.i = Math.floor((spot.u - o.pier) / bay.width);
  if (clear < 1 || bay.i < 0 || bay.i >= bays) return false;
  bay.x = spot.u - o.pier - bay.i * bay.width;
  const rise = spot.vLength - o.ground - o.parapet;
  const storeys = Math.max(1, Math.round(rise / o.storey));
  const low = o.ground > 0 && spot.v < o.ground;
  bay.height = low ? o.ground : rise / storeys;
  bay.j = low ? -1 : Math.floor((spot.v - o.ground) / bay.height);
  if (rise < 1.5 || bay.j >= storeys) return false;
  bay.y = low ? spot.v : spot.v - o.ground - bay.j * bay.height;
  const share = low ? Math.max(o.width, 0.78) : o.width;
  bay.left = (bay.width * (1 - share)) / 2;
  bay.right = bay.width - bay.left;
  bay.sill = low ? 0.5 : o.sill;
  bay.head = low ? o.ground - 0.75 : Math.min(o.head, bay.height - 0.12);
  return true;
}

/** Height of the opening's upper edge at `x`: straight, or a segment of an arch. */
function headAt(o: Openings, x: number): number {
  if (!o.arched) return bay.head;
  const half = (bay.right - bay.left) / 2;
  const t = clamp((x - bay.left - half) / half, -1, 1);
  return bay.head - half * 0.8 * (1 - Math.sqrt(1 - t * t));
}

/** A wall with windows: its stone or brick, the reveals, what the panes show, and lit rooms. */
export function facade(spot: Spot, surface: Surface & { kind: 'facade' }): void {
  const o = surface.openings;
  const [r, g, b] = surface.colour;
  spot.begin(r, g, b);
  grain(spot, surface.grain);
  if (!find(spot, o)) return;
  if (o.dressing) dress(spot, o);
  const head = headAt(o, bay.x);
  const across = Math.min(bay.x - bay.left, bay.right - bay.x) / spot.footU + 0.5;
  const upright = Math.min(bay.y - bay.sill, head - bay.y) / spot.footV + 0.5;
  const cover = clamp(across, 0, 1) * clamp(upright, 0, 1);
  if (cover <= 0) return;
  open(spot, surface);
  blend(spot, cover);
}

/** Dressed stone: a band at each floor, a sill under the window, a surround; and the soot below the sill. */
function dress(spot: Spot, o: Openings): void {
  const stone = o.dressing!;
  const nearEdge = Math.max(bay.left - bay.x, bay.x - bay.right, 0);
  const below = bay.sill - bay.y;
  const above = bay.y - bay.head;
  const inColumn = nearEdge < 0.16;
  const isSill = inColumn && below > 0 && below < 0.14;
  const isLintel = inColumn && above > -0.02 && above < 0.3;
  const isBand = bay.height - bay.y < 0.2 && (bay.j < 0 || bay.j % 3 === 2);
  if (!isSill && !isLintel && !isBand) {
    if (nearEdge < 0.3 && below > 0.14 && below < 1) spot.tone(1 - 0.16 * (1 - below));
    if (bay.height - bay.y > 0.2 && bay.height - bay.y < 0.32 && bay.j < 0) spot.sky *= 0.7;
    return;
  }
  const k = isSill ? 1.12 : 1;
  spot.r = stone[0] * k;
  spot.g = stone[1] * k;
  spot.b = stone[2] * k;
}

/** Fills `inside` with what the opening shows: its reveal, the frame, a blind, or glass with a room behind. */
function open(spot: Spot, surface: Surface & { kind: 'facade' }): void {
  const o = surface.openings;
  const k = o.reveal / Math.max(0.04, -spot.rayN);
  const x = bay.x + spot.rayU * k;
  const y = bay.y + spot.rayV * k;
  const [r, g, b] = o.dressing ?? surface.colour;
  inside.begin(r * 0.85, g * 0.85, b * 0.85);
  const head = headAt(o, x);
  if (x < bay.left) return reveal(spot.sunU / Math.max(0.05, spot.sunN), 0.55);
  if (x > bay.right) return reveal(-spot.sunU / Math.max(0.05, spot.sunN), 0.55);
  if (y > head) return reveal(0, 0.3);
  if (y < bay.sill) return reveal(spot.sunV / Math.max(0.05, spot.sunN), 0.95);
  pane(spot, o, x, y, head);
}

function reveal(sun: number, sky: number): void {
  inside.sun = clamp(sun, 0, 2);
  inside.sky = sky;
}

function pane(spot: Spot, o: Openings, x: number, y: number, head: number): void {
  const s = o.reveal / Math.max(0.03, spot.sunN);
  const lit = x + spot.sunU * s > bay.left && x + spot.sunU * s < bay.right && y + spot.sunV * s < head;
  const id = (bay.i * 7919 + bay.j * 104729 + spot.seed * 31) | 0;
  const bars = frameAt(spot, o, x, y);
  const level = roomLevel(bay.i, bay.j, spot.seed, bay.j < 0 ? spot.rooms * 1.15 : o.lit * spot.rooms, o.variety);
  const drawn = hash(id, 2, 13);
  const blind = drawn < 0.42 && bay.j >= 0 ? head - y < (head - bay.sill) * drawn * 2.2 : false;
  const back = blind ? 0.42 : 0.035;
  inside.r = o.frame[0] * bars + back * o.tint[0] * (1 - bars);
  inside.g = o.frame[1] * bars + back * o.tint[1] * (1 - bars);
  inside.b = o.frame[2] * bars + back * o.tint[2] * (1 - bars);
  inside.sun = lit ? (blind ? 0.7 : 1) : 0;
  inside.sky = 0.5 + 0.3 * clamp((head - y) / (head - bay.sill), 0, 1);
  inside.glass = 1 - bars;
  inside.mirror = o.mirror;
  inside.pane = (id * 16 + Math.floor(((x - bay.left) / (bay.right - bay.left)) * o.panesAcross)) | 0;
  if (level <= 0) return;
  const bright = bay.j < 0 ? level * 1.35 : level;
  if (blind) glowThroughBlind(inside, bright, id);
  else {
    inside.rayU = spot.rayU;
    inside.rayV = spot.rayV;
    inside.rayN = spot.rayN;
    lookInto(inside, x, y, bay.width, bay.height, bright, id);
  }
  inside.glowR *= 1 - bars;
  inside.glowG *= 1 - bars;
  inside.glowB *= 1 - bars;
}

/** Share of frame and glazing bars at a point of the window. */
function frameAt(spot: Spot, o: Openings, x: number, y: number): number {
  const edge = Math.min(x - bay.left, bay.right - x, y - bay.sill, bay.head - y);
  let bars = line(edge, 0.13, Math.max(spot.footU, spot.footV));
  const cell = (bay.right - bay.left) / o.panesAcross;
  const dx = (x - bay.left) / cell;
  bars = Math.max(bars, line((dx - Math.round(dx)) * cell, 0.06, spot.footU));
  const row = (bay.head - bay.sill) / o.panesUp;
  const dy = (y - bay.sill) / row;
  return Math.max(bars, line((dy - Math.round(dy)) * row, 0.06, spot.footV));
}

function blend(spot: Spot, cover: number): void {
  const keep = 1 - cover;
  spot.r = spot.r * keep + inside.r * cover;
  spot.g = spot.g * keep + inside.g * cover;
  spot.b = spot.b * keep + inside.b * cover;
  spot.sun = spot.sun * keep + inside.sun * cover;
  spot.sky = spot.sky * keep + inside.sky * cover;
  spot.glass = inside.glass * cover;
  spot.mirror = inside.mirror;
  spot.pane = inside.pane;
  spot.glowR = inside.glowR * cover;
  spot.glowG = inside.glowG * cover;
  spot.glowB = inside.glowB * cover;
}
