import { hash } from './noise.ts';
import type { Spot } from './spot.ts';

/** Radiance of an ordinary lit room, as a share of full sunlight (150 cd/m2). */
const ROOM = 0.0012;
const lamps = [
  [1.0, 0.62, 0.3],
  [1.0, 0.7, 0.4],
  [1.0, 0.82, 0.6],
  [0.86, 0.95, 1.0],
] as const;

/** Whether the room behind a window is lit, and how strongly; 0 is dark. */
export function roomLevel(bay: number, storey: number, seed: number, share: number, variety: number): number {
  const own = hash(bay, storey, seed);
  const shared = hash(991, storey, seed);
  const chance = own * variety + shared * (1 - variety);
  if (chance >= share) return 0;
  const h = hash(bay, storey, seed + 71);
  return ROOM * (0.3 + 1.5 * h * h);
}

/**
 * Light that comes out of a room seen through its window. The ray goes on into a box as wide as the bay: bright
 * ceiling, walls with something on them, dark floor and furniture.
 *
 * @param x,y   where the ray passes the pane, in metres within the room's front
 * @param level radiance of the room
 */
export function lookInto(spot: Spot, x: number, y: number, bay: number, storey: number, level: number, id: number): void {
  const depth = 3.4 + 2.5 * hash(id, 3, 9);
  const inward = Math.max(0.05, -spot.rayN);
  const toBack = depth / inward;
  const toSide = spot.rayU > 0 ? (bay * 1.4 - x) / spot.rayU : spot.rayU < 0 ? (x + bay * 0.4) / -spot.rayU : 1e9;
  const toCeiling = spot.rayV > 0 ? (storey - 0.25 - y) / spot.rayV : 1e9;
  const toFloor = spot.rayV < 0 ? y / -spot.rayV : 1e9;
  const t = Math.min(toBack, toSide, toCeiling, toFloor);
  const along = x + spot.rayU * t;
  const up = y + spot.rayV * t;
  let bright = 0.62;
  if (t === toCeiling) bright = Math.abs(((inward * t) % 1.6) - 0.8) < 0.16 ? 3.2 : 1.15;
  else if (t === toFloor) bright = 0.3;
  else if (t === toSide) bright = 0.5 + 0.12 * up;
  else if (hash(Math.floor(along * 1.4), Math.floor(up * 1.1), id) < 0.3) bright = 0.34;
  // Desks, plants and shelves stand before the light as dark shapes.
  const furniture = hash(Math.floor(along * 2.1), 5, id) * 1.25;
  if (up < furniture && t !== toCeiling) bright *= 0.4;
  const colour = lamps[Math.floor(hash(id, 1, 17) * 4)]!;
  const power = (level * bright) / (1 + 0.05 * t);
  spot.glowR += colour[0] * power;
  spot.glowG += colour[1] * power;
  spot.glowB += colour[2] * power;
}

/** A drawn blind with the light on behind it. */
export function glowThroughBlind(spot: Spot, level: number, id: number): void {
  const colour = lamps[Math.floor(hash(id, 1, 17) * 4)]!;
  spot.glowR += colour[0] * level * 0.5;
  spot.glowG += colour[1] * level * 0.46;
  spot.glowB += colour[2] * level * 0.4;
}
