import type { Mesh } from './mesh.ts';
import { type Random } from './noise.ts';
import { type Family, stuff, walls } from './styles.ts';
import type { Surface } from './surface.ts';
import type { Vec3 } from './vector.ts';

/** A building on its plot: the front left corner lies at the origin, the front faces -z. */
export interface Plan {
  family: Family;
  width: number;
  depth: number;
  height: number;
}

/** Builds a plan at the mesh's current place. */
export function building(mesh: Mesh, plan: Plan, random: Random): void {
  mesh.reseed(Math.floor(random() * 60000) + 1);
  const wall = walls[plan.family](random);
  if (plan.family === 'warehouse') return gabled(mesh, plan, wall, random() < 0.7 ? stuff.slate : stuff.tile, random);
  if (plan.family === 'house')
    return random() < 0.6 ? gabled(mesh, plan, wall, stuff.tile, random) : hipped(mesh, plan, wall, stuff.slate, random);
  if ((plan.family === 'stone' || plan.family === 'brick') && plan.height < 30) return corniced(mesh, plan, wall, random);
  if (plan.height > 55) return tower(mesh, plan, wall, random);
  block(mesh, plan, wall, random);
}

/** Flat-roofed: parapet, plant rooms, sometimes a recessed top storey. */
function block(mesh: Mesh, { width, depth, height }: Plan, wall: Surface, random: Random): void {
  mesh.box([0, 0, 0], [width, height, depth], wall, stuff.gravel);
  parapet(mesh, width, depth, height, 0.7);
  if (random() < 0.5) {
    const d = 2.5 + random() * 2;
    mesh.box([d, height, d], [width - d, height + 3.6, depth - d], wall, stuff.gravel);
  }
  plant(mesh, width, depth, height, random);
}

/** A tall one: a base, a shaft, and setbacks towards the top. */
function tower(mesh: Mesh, { width, depth, height }: Plan, wall: Surface, random: Random): void {
  const steps = random() < 0.55 ? 1 + Math.floor(random() * 3) : 0;
  let [x0, z0, x1, z1, y] = [0, 0, width, depth, 0];
  for (let i = 0; i <= steps; i++) {
    const top = i === steps ? height : y + (height - y) * (0.45 + random() * 0.25);
    mesh.box([x0, y, z0], [x1, top, z1], wall, stuff.gravel);
    mesh.at({ x: x0, z: z0 }, () => parapet(mesh, x1 - x0, z1 - z0, top, 0.5));
    const inset = 1.5 + random() * 2.5;
    y = top;
    if (i === steps || x1 - x0 < 9 + inset * 2) break;
    x0 += inset * (0.4 + random());
    x1 -= inset * (0.4 + random());
    z0 += inset * random();
    z1 -= inset * (0.4 + random());
  }
  mesh.at({ x: x0, z: z0 }, () => plant(mesh, x1 - x0, z1 - z0, y, random));
  if (random() < 0.35)
    mesh.bar([(x0 + x1) / 2, y, (z0 + z1) / 2], [(x0 + x1) / 2, y + 12 + random() * 14, (z0 + z1) / 2], 0.5, stuff.rail, 0.15);
}

/** An older street front: cornice, string course, attic or mansard, chimneys. */
function corniced(mesh: Mesh, { width, depth, height }: Plan, wall: Surface, random: Random): void {
  mesh.box([0, 0, 0], [width, height, depth], wall, stuff.gravel);
  ledge(mesh, width, depth, height - 0.5, 0.55, 0.5);
  ledge(mesh, width, depth, 4.1, 0.18, 0.3);
  if (random() < 0.6) {
    mesh.at({ x: 0, y: height, z: 0 }, () => mansard(mesh, width, depth, 3.6));
    chimneys(mesh, width, depth, height + 3.6, random);
  } else {
    parapet(mesh, width, depth, height, 1.0);
    plant(mesh, width, depth, height, random);
  }
}

/** A ledge all around, proud of the wall by `out` metres. */
export function ledge(mesh: Mesh, width: number, depth: number, y: number, out: number, thick: number): void {
  mesh.slab([-out, y, -out], [width + out, y + thick, 0], stuff.stone);
  mesh.slab([-out, y, depth], [width + out, y + thick, depth + out], stuff.stone);
  mesh.slab([-out, y, 0], [0, y + thick, depth], stuff.stone);
  mesh.slab([width, y, 0], [width + out, y + thick, depth], stuff.stone);
}

function parapet(mesh: Mesh, width: number, depth: number, y: number, high: number): void {
  const t = 0.3;
  mesh.box([0, y, 0], [width, y + high, t], stuff.concrete);
  mesh.box([0, y, depth - t], [width, y + high, depth], stuff.concrete);
  mesh.box([0, y, 0], [t, y + high, depth], stuff.concrete);
  mesh.box([width - t, y, 0], [width, y + high, depth], stuff.concrete);
}

function plant(mesh: Mesh, width: number, depth: number, y: number, random: Random): void {
  const n = 1 + Math.floor(random() * 4);
  for (let i = 0; i < n; i++) {
    const w = 1.5 + random() * Math.min(6, width * 0.3);
    const d = 1.5 + random() * Math.min(5, depth * 0.3);
    const x = 1 + random() * Math.max(0.1, width - w - 2);
    const z = 1 + random() * Math.max(0.1, depth - d - 2);
    mesh.box([x, y, z], [x + w, y + 1.2 + random() * 2.6, z + d], random() < 0.5 ? stuff.plant : stuff.concrete, stuff.gravel);
  }
  if (random() < 0.4) mesh.bar([width * 0.3, y, depth * 0.4], [width * 0.3, y + 5 + random() * 4, depth * 0.4], 0.12, stuff.rail);
}

/** A pitched roof along the longer side, with gables of the wall's own stuff and eaves that stand out. */
export function gabled(mesh: Mesh, { width, depth, height }: Plan, wall: Surface, roof: Surface, random: Random): void {
  mesh.box([0, 0, 0], [width, height, depth], wall);
  const gable: Surface = wall.kind === 'facade' ? { kind: 'wall', colour: wall.colour, grain: wall.grain } : wall;
  const alongX = width >= depth * (random() < 0.5 ? 1 : 0.6);
  const rise = (alongX ? depth : width) * (0.32 + random() * 0.16);
  const [e, top] = [0.45, height + rise];
  const low = height - e * 0.7;
  if (alongX) {
    const mid = depth / 2;
    mesh.face([[-e, low, -e], [width + e, low, -e], [width + e, top, mid], [-e, top, mid]], roof); // prettier-ignore
    mesh.face([[-e, low, depth + e], [width + e, low, depth + e], [width + e, top, mid], [-e, top, mid]], roof); // prettier-ignore
    for (const x of [0, width]) mesh.face([[x, height, 0], [x, height, depth], [x, top - 0.05, mid]], gable); // prettier-ignore
  } else {
    const mid = width / 2;
    mesh.face([[-e, low, -e], [-e, low, depth + e], [mid, top, depth + e], [mid, top, -e]], roof); // prettier-ignore
    mesh.face([[width + e, low, -e], [width + e, low, depth + e], [mid, top, depth + e], [mid, top, -e]], roof); // prettier-ignore
    for (const z of [0, depth]) mesh.face([[0, height, z], [width, height, z], [mid, top - 0.05, z]], gable); // prettier-ignore
    mesh.bar([0, height, -0.05], [mid, top - 0.05, -0.05], 0.25, stuff.stone);
    mesh.bar([width, height, -0.05], [mid, top - 0.05, -0.05], 0.25, stuff.stone);
  }
  chimneys(mesh, width, depth, height + rise * 0.5, random);
}

function hipped(mesh: Mesh, { width, depth, height }: Plan, wall: Surface, roof: Surface, random: Random): void {
  mesh.box([0, 0, 0], [width, height, depth], wall);
  const inset = Math.min(width, depth) / 2;
  const top = height + inset * 0.75;
  const e = 0.45;
  const low = height - 0.2;
  const a: Vec3 = width > depth ? [inset, top, depth / 2] : [width / 2, top, inset];
  const b: Vec3 = width > depth ? [width - inset, top, depth / 2] : [width / 2, top, depth - inset];
  const [p, q, r, s]: Vec3[] = [[-e, low, -e], [width + e, low, -e], [width + e, low, depth + e], [-e, low, depth + e]]; // prettier-ignore
  if (width > depth) {
    mesh.face([p!, q!, b, a], roof);
    mesh.face([s!, r!, b, a], roof);
    mesh.face([p!, s!, a], roof);
    mesh.face([q!, r!, b], roof);
  } else {
    mesh.face([p!, s!, b, a], roof);
    mesh.face([q!, r!, b, a], roof);
    mesh.face([p!, q!, a], roof);
    mesh.face([s!, r!, b], roof);
  }
  chimneys(mesh, width, depth, height + inset * 0.3, random);
}

function mansard(mesh: Mesh, width: number, depth: number, high: number): void {
  const i = 1.5;
  const roof = stuff.slate;
  mesh.face([[0, 0, 0], [width, 0, 0], [width - i, high, i], [i, high, i]], roof); // prettier-ignore
  mesh.face([[0, 0, depth], [width, 0, depth], [width - i, high, depth - i], [i, high, depth - i]], roof); // prettier-ignore
  mesh.face([[0, 0, 0], [0, 0, depth], [i, high, depth - i], [i, high, i]], roof); // prettier-ignore
  mesh.face([[width, 0, 0], [width, 0, depth], [width - i, high, depth - i], [width - i, high, i]], roof); // prettier-ignore
  mesh.face([[i, high, i], [width - i, high, i], [width - i, high, depth - i], [i, high, depth - i]], stuff.zinc); // prettier-ignore
  const dormers = Math.floor(width / 4.2);
  for (let d = 0; d < dormers; d++) {
    const x = (width / dormers) * (d + 0.5) - 0.8;
    mesh.box([x, 0.7, 0.25], [x + 1.6, 2.6, 2], stuff.white, stuff.zinc);
    mesh.face([[x + 0.2, 0.95, 0.24], [x + 1.4, 0.95, 0.24], [x + 1.4, 2.4, 0.24], [x + 0.2, 2.4, 0.24]], { kind: 'plain', colour: [0.03, 0.035, 0.04], gloss: 0.9 }); // prettier-ignore
  }
}

function chimneys(mesh: Mesh, width: number, depth: number, y: number, random: Random): void {
  const n = 1 + Math.floor(random() * 3);
  for (let i = 0; i < n; i++) {
    const x = width * (0.1 + 0.8 * random());
    const z = depth * (0.3 + 0.4 * random());
    mesh.box([x, y - 3, z], [x + 0.7, y + 2.4, z + 1.5], stuff.chimney);
    for (let p = 0; p < 3; p++) mesh.box([x + 0.2, y + 2.4, z + 0.15 + p * 0.45], [x + 0.48, y + 2.9, z + 0.42 + p * 0.45], stuff.tile);
  }
}
