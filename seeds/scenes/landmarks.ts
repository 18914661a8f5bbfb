import { ledge } from './buildings.ts';
import type { Mesh } from './mesh.ts';
import { facade, openings, stuff } from './styles.ts';
import type { Surface } from './surface.ts';

const brick: Surface = facade([0.3, 0.165, 0.115], 'brick', openings.hall);
const plainBrick: Surface = { kind: 'wall', colour: [0.3, 0.165, 0.115], grain: 'brick' };
const curtain: Surface = facade([0.09, 0.1, 0.1], 'smooth', {
  ...openings.curtain,
  bay: 1.9,
  storey: 4.1,
  sill: 0.35,
  lit: 1,
  variety: 0.3,
  mirror: 0.2,
  frame: [0.2, 0.13, 0.07],
});

export const LIBRARY = { width: 66, depth: 34 };

/**
 * Ropewalk Library: three gabled sheds of brick joined side by side, and a glass oriel that stands out over the quay.
 * The front left corner lies at the origin, the front faces -z.
 */
export function library(mesh: Mesh): void {
  const wall = 15.2;
  for (let i = 0; i < 3; i++) {
    const x = i * 22;
    mesh.reseed(501 + i);
    mesh.box([x, 0, 0], [x + 22, wall, LIBRARY.depth], brick);
    shedRoof(mesh, x, 22, wall, 8.5);
    mesh.slab([x - 0.2, wall - 0.1, -0.35], [x + 22.2, wall + 0.35, 0.1], stuff.stone);
    roundel(mesh, x + 11, wall + 3.4);
    for (const l of [4, 11, 18]) mesh.lamp([x + l, 0.4, -1.6], [1, 0.72, 0.42], 0.004);
  }
  oriel(mesh, 27, 12);
  mesh.box([-0.3, 0, -0.25], [66.3, 0.9, 0], stuff.ashlar);
}

function shedRoof(mesh: Mesh, x: number, wide: number, y: number, rise: number): void {
  const [mid, d] = [x + wide / 2, LIBRARY.depth];
  mesh.face([[x - 0.2, y, -0.5], [x - 0.2, y, d + 0.5], [mid, y + rise, d + 0.5], [mid, y + rise, -0.5]], stuff.slate); // prettier-ignore
  mesh.face([[x + wide + 0.2, y, -0.5], [x + wide + 0.2, y, d + 0.5], [mid, y + rise, d + 0.5], [mid, y + rise, -0.5]], stuff.slate); // prettier-ignore
  for (const z of [0, d]) mesh.face([[x, y, z], [x + wide, y, z], [mid, y + rise, z]], plainBrick); // prettier-ignore
  mesh.bar([x, y + 0.1, -0.2], [mid, y + rise + 0.1, -0.2], 0.5, stuff.stone);
  mesh.bar([x + wide, y + 0.1, -0.2], [mid, y + rise + 0.1, -0.2], 0.5, stuff.stone);
  // A ridge light along the roof.
  mesh.box([mid - 1.3, y + rise - 1.2, 3], [mid + 1.3, y + rise + 0.7, d - 3], curtain, stuff.zinc);
}

function roundel(mesh: Mesh, x: number, y: number): void {
  const ring = 20;
  const glass: Surface = { kind: 'plain', colour: [0.025, 0.03, 0.035], gloss: 1 };
  for (let i = 0; i < ring; i++) {
    const [a, b] = [(i / ring) * 6.2832, ((i + 1) / ring) * 6.2832];
    mesh.face([[x, y, -0.04], [x + Math.cos(a) * 1.4, y + Math.sin(a) * 1.4, -0.04], [x + Math.cos(b) * 1.4, y + Math.sin(b) * 1.4, -0.04]], glass); // prettier-ignore
    mesh.bar([x + Math.cos(a) * 1.5, y + Math.sin(a) * 1.5, -0.1], [x + Math.cos(b) * 1.5, y + Math.sin(b) * 1.5, -0.1], 0.3, stuff.stone);
  }
  mesh.bar([x - 1.4, y, -0.08], [x + 1.4, y, -0.08], 0.1, stuff.iron);
  mesh.bar([x, y - 1.4, -0.08], [x, y + 1.4, -0.08], 0.1, stuff.iron);
}

/** The oriel: a glass box on brackets over the entrance, with bronze frames and a lit soffit. */
function oriel(mesh: Mesh, x: number, wide: number): void {
  const [out, low, high] = [3.4, 4.4, 16.8];
  mesh.reseed(611);
  mesh.slab([x, low, -out], [x + wide, high, 0.2], curtain, stuff.zinc);
  mesh.slab([x - 0.25, low - 0.5, -out - 0.25], [x + wide + 0.25, low, 0], { kind: 'plain', colour: [0.17, 0.11, 0.06], gloss: 0.2 });
  mesh.slab([x - 0.25, high, -out - 0.25], [x + wide + 0.25, high + 0.5, 0.3], { kind: 'plain', colour: [0.17, 0.11, 0.06], gloss: 0.2 });
  for (let i = 0; i <= 4; i++) {
    const px = x + 0.4 + (i / 4) * (wide - 0.8);
    mesh.bar([px, low - 0.4, -out + 0.5], [px, low - 2.4, -0.1], 0.22, stuff.iron);
    if (i < 4) mesh.lamp([px + 1.2, low - 0.9, -out * 0.55], [1, 0.75, 0.48], 0.0035);
  }
  const doors: Surface = facade([0.17, 0.11, 0.06], 'smooth', {
    ...openings.curtain,
    ground: 0,
    storey: 3.6,
    bay: 1.5,
    sill: 0.05,
    head: 3.5,
    lit: 1,
    parapet: 0.05,
    frame: [0.17, 0.11, 0.06],
  });
  mesh.face([[x + 0.4, 0, -0.1], [x + wide - 0.4, 0, -0.1], [x + wide - 0.4, 3.7, -0.1], [x + 0.4, 3.7, -0.1]], doors); // prettier-ignore
}

export const EXCHANGE = { width: 46, depth: 34 };

/**
 * The Corn Exchange: rusticated base, eight columns under a pediment, and a lantern with a clock. Floodlights stand at
 * its foot. Front left corner at the origin, front to -z.
 */
export function cornExchange(mesh: Mesh): void {
  const wall: Surface = facade([0.52, 0.46, 0.36], 'ashlar', {
    ...openings.hall,
    bay: 5.2,
    storey: 6.4,
    head: 5.4,
    arched: true,
    width: 0.4,
    dressing: [0.56, 0.5, 0.41],
  });
  const stone: Surface = { kind: 'wall', colour: [0.55, 0.49, 0.39], grain: 'ashlar' };
  const { width, depth } = EXCHANGE;
  mesh.reseed(811);
  mesh.box([0, 0, 0], [width, 15, depth], wall, stuff.gravel);
  ledge(mesh, width, depth, 14.2, 0.8, 0.8);
  ledge(mesh, width, depth, 7, 0.25, 0.35);
  mesh.box([0.2, 15, 0.2], [width - 0.2, 16.3, depth - 0.2], stone, stuff.zinc);
  portico(mesh, width / 2, stone);
  lantern(mesh, width / 2, 12, stone);
  for (let x = 2; x < width; x += 6) {
    mesh.lamp([x, 0.5, -2.2], [1, 0.72, 0.4], 0.0085);
    mesh.lamp([x, 16.6, 1.2], [1, 0.72, 0.4], 0.002);
  }
}

function portico(mesh: Mesh, centre: number, stone: Surface): void {
  const [half, out, foot, head] = [13, 6, 1.5, 12.6];
  for (let s = 0; s < 8; s++) mesh.box([centre - half - 1 - s * 0.36, 0, -out - 1 - s * 0.36], [centre + half + 1 + s * 0.36, foot - s * 0.19, 0.1], stone); // prettier-ignore
  for (let i = 0; i < 8; i++) {
    mesh.at({ x: centre - half + 1 + (i / 7) * (half * 2 - 2), z: -out + 0.9 }, () => {
      mesh.box([-0.85, foot, -0.85], [0.85, foot + 0.35, 0.85], stone);
      mesh.lathe([[foot + 0.35, 0.78], [foot + 0.6, 0.66], [head * 0.45, 0.65], [head - 0.9, 0.54], [head - 0.5, 0.78]], 14, stone); // prettier-ignore
      mesh.slab([-0.85, head - 0.5, -0.85], [0.85, head, 0.85], stone);
    });
  }
  mesh.slab([centre - half - 0.3, head, -out - 0.2], [centre + half + 0.3, head + 1.7, 0.5], stone);
  mesh.slab([centre - half - 1, head + 1.7, -out - 0.9], [centre + half + 1, head + 2.3, 0.5], stuff.stone);
  const [y, top] = [head + 2.3, head + 7.2];
  mesh.face([[centre - half, y, -out], [centre + half, y, -out], [centre, top - 0.4, -out]], stone); // prettier-ignore
  for (const s of [-1, 1]) {
    mesh.face([[centre + s * (half + 1), y + 0.3, -out - 0.9], [centre, top + 0.3, -out - 0.9], [centre, top + 0.3, 4], [centre + s * (half + 1), y + 0.3, 4]], stuff.zinc); // prettier-ignore
    mesh.bar([centre + s * (half + 0.8), y + 0.15, -out - 0.5], [centre, top + 0.1, -out - 0.5], 0.65, stuff.stone);
  }
  for (let i = 0; i < 7; i++) mesh.lamp([centre - half + 2.8 + (i / 7) * (half * 2 - 2), 1.8, -2.6], [1, 0.7, 0.38], 0.007);
  for (let i = -2; i <= 2; i++) mesh.lamp([centre + i * 7, 3.5, -19], [1, 0.76, 0.46], 0.034);
}

function lantern(mesh: Mesh, x: number, z: number, stone: Surface): void {
  const drum: Surface = facade([0.52, 0.46, 0.36], 'ashlar', {
    ...openings.sash,
    bay: 2.6,
    storey: 6,
    ground: 0,
    sill: 1,
    head: 5,
    arched: true,
    pier: 0.5,
    parapet: 0.5,
    lit: 1,
  });
  mesh.box([x - 5, 15, z], [x + 5, 23, z + 10], stone);
  mesh.at({ x: x - 5.4, y: 0, z: z - 0.4 }, () => ledge(mesh, 10.8, 10.8, 22.6, 0.3, 0.6));
  clock(mesh, x, 19.4, z - 0.05);
  mesh.at({ x, y: 23, z: z + 5 }, () => {
    mesh.lathe([[0, 4.3], [6.5, 4.3]], 12, drum); // prettier-ignore
    mesh.lathe([[6.5, 4.9], [7.1, 4.9], [7.1, 4.4], [8.6, 4.1], [10.4, 3.0], [11.6, 1.4], [12, 0.5], [13.6, 0.35], [15, 0]], 16, stuff.green); // prettier-ignore
    for (let i = 0; i < 6; i++) mesh.lamp([Math.cos(i * 1.05) * 5.6, 0.5, Math.sin(i * 1.05) * 5.6], [1, 0.75, 0.45], 0.0022);
  });
}

function clock(mesh: Mesh, x: number, y: number, z: number): void {
  const face: Surface = { kind: 'glow', colour: [1, 0.93, 0.78], power: 0.0022 };
  const n = 24;
  for (let i = 0; i < n; i++) {
    const [a, b] = [(i / n) * 6.2832, ((i + 1) / n) * 6.2832];
    mesh.face([[x, y, z - 0.02], [x + Math.cos(a) * 2.1, y + Math.sin(a) * 2.1, z - 0.02], [x + Math.cos(b) * 2.1, y + Math.sin(b) * 2.1, z - 0.02]], face); // prettier-ignore
    if (i % 2 === 0) mesh.bar([x + Math.cos(a) * 1.7, y + Math.sin(a) * 1.7, z - 0.06], [x + Math.cos(a) * 1.95, y + Math.sin(a) * 1.95, z - 0.06], 0.13, stuff.iron); // prettier-ignore
    mesh.bar(
      [x + Math.cos(a) * 2.2, y + Math.sin(a) * 2.2, z - 0.06],
      [x + Math.cos(b) * 2.2, y + Math.sin(b) * 2.2, z - 0.06],
      0.28,
      stuff.stone,
    );
  }
  mesh.bar([x, y, z - 0.1], [x - 0.95, y + 0.6, z - 0.1], 0.2, stuff.iron, 0.08);
  mesh.bar([x, y, z - 0.1], [x + 0.5, y - 1.55, z - 0.1], 0.14, stuff.iron, 0.06);
}

/** The Tidal Tower: the tallest thing in Vessmouth, tapering glass with a lit crown. */
export function tidalTower(mesh: Mesh): void {
  const skin: Surface = facade([0.08, 0.1, 0.11], 'smooth', { ...openings.curtain, bay: 1.6, tint: [0.65, 0.8, 0.88], lit: 0.5 });
  mesh.reseed(907);
  const rings = [[0, 17], [60, 16], [96, 13.2], [126, 9.4], [138, 7.5]] as const; // prettier-ignore
  for (let i = 0; i + 1 < rings.length; i++) {
    const [[y0, r0], [y1, r1]] = [rings[i]!, rings[i + 1]!];
    for (let k = 0; k < 4; k++) {
      const corner = (q: number, r: number, y: number) => [(q % 4 < 2 ? -1 : 1) * r, y, (q % 4 === 0 || q % 4 === 3 ? -1 : 1) * r] as const;
      mesh.face([corner(k, r0, y0), corner(k + 1, r0, y0), corner(k + 1, r1, y1), corner(k, r1, y1)], skin);
    }
  }
  mesh.box([-7.5, 138, -7.5], [7.5, 138.4, 7.5], stuff.zinc);
  mesh.box([-5, 138, -5], [5, 144, 5], { kind: 'glow', colour: [0.75, 0.9, 1], power: 0.0008 }, stuff.zinc);
  mesh.bar([0, 144, 0], [0, 170, 0], 0.9, stuff.rail, 0.2);
}
