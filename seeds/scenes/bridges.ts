import { truss, WATER } from './harbour.ts';
import type { Mesh } from './mesh.ts';
import { lampPost, railing } from './street.ts';
import { stuff } from './styles.ts';
import type { Surface } from './surface.ts';
import type { Vec3 } from './vector.ts';

const STRIPS = 14;

/** Height of a bridge's road above the quays: a gentle rise to the middle. */
const roadAt = (x: number, half: number): number => 2.6 * (1 - (x / half) ** 2) + 0.3;

/**
 * The Old Basin Bridge: masonry arches along x, road `wide` metres across z, centred on the origin.
 */
export function archBridge(mesh: Mesh, long: number, arches: number, wide: number): void {
  const half = long / 2;
  const span = long / arches;
  const pier = span * 0.13;
  const stone: Surface = { kind: 'wall', colour: [0.45, 0.4, 0.33], grain: 'ashlar' };
  for (let a = 0; a <= arches; a++) {
    // Floodlights on brackets wash the piers and the arches beside them.
    for (const s of [-1, 1]) mesh.lamp([-half + a * span, WATER + 1.2, s * (wide / 2 + 3.2)], [1, 0.72, 0.42], 0.014);
    if (a < arches) mesh.lamp([-half + (a + 0.5) * span, WATER + 0.8, 0], [1, 0.72, 0.42], 0.01);
  }
  mesh.reseed(77);
  for (let a = 0; a < arches; a++) {
    const left = -half + a * span + pier / 2;
    const clear = span - pier;
    const soffit = (t: number): number =>
      WATER + 0.6 + Math.sqrt(Math.max(0, 1 - (2 * t - 1) ** 2)) * (roadAt(left + clear / 2, half) - WATER - 1.7);
    for (let i = 0; i < STRIPS; i++) arched(mesh, left, clear, i / STRIPS, (i + 1) / STRIPS, soffit, half, wide, stone);
  }
  for (let a = 0; a <= arches; a++) piers(mesh, -half + a * span, pier, half, wide, stone);
  deck(mesh, half, wide);
}

function arched(
  mesh: Mesh,
  left: number,
  clear: number,
  t0: number,
  t1: number,
  soffit: (t: number) => number,
  half: number,
  wide: number,
  stone: Surface,
): void {
  const [x0, x1] = [left + clear * t0, left + clear * t1];
  const [y0, y1] = [soffit(t0), soffit(t1)];
  const [h0, h1] = [roadAt(x0, half), roadAt(x1, half)];
  const z = wide / 2;
  for (const s of [-z, z]) {
    mesh.face([[x0, y0, s], [x1, y1, s], [x1, h1, s], [x0, h0, s]], stone); // prettier-ignore
    // The ring of voussoirs stands a little proud.
    const o = Math.sign(s) * 0.12;
    mesh.face([[x0, y0 - 0.05, s + o], [x1, y1 - 0.05, s + o], [x1, y1 + 0.7, s + o], [x0, y0 + 0.7, s + o]], stuff.stone); // prettier-ignore
  }
  mesh.face([[x0, y0, -z], [x1, y1, -z], [x1, y1, z], [x0, y0, z]], stone); // prettier-ignore
}

function piers(mesh: Mesh, x: number, pier: number, half: number, wide: number, stone: Surface): void {
  const z = wide / 2;
  const top = roadAt(Math.min(half, Math.abs(x)), half);
  mesh.box([x - pier / 2, -6, -z], [x + pier / 2, top, z], stone);
  for (const s of [-1, 1]) {
    // Cutwaters turn the current aside.
    const tip: Vec3 = [x, WATER + 1.6, s * (z + 2.2)];
    const foot: Vec3 = [x, -6, s * (z + 2.2)];
    for (const e of [-1, 1]) {
      const edge = x + (e * pier) / 2;
      mesh.face([[edge, -6, s * z], foot, tip, [edge, WATER + 1.6, s * z]], stone);
      mesh.face([tip, [edge, WATER + 1.6, s * z], [x, WATER + 2.8, s * z]], stone);
    }
  }
}

function deck(mesh: Mesh, half: number, wide: number): void {
  const n = 24;
  const z = wide / 2;
  for (let i = 0; i < n; i++) {
    const [x0, x1] = [-half + (i / n) * half * 2, -half + ((i + 1) / n) * half * 2];
    const [h0, h1] = [roadAt(x0, half), roadAt(x1, half)];
    mesh.face([[x0, h0, -z], [x1, h1, -z], [x1, h1, z], [x0, h0, z]], stuff.setts); // prettier-ignore
    for (const s of [-z, z]) {
      const o = Math.sign(s) * 0.25;
      mesh.face([[x0, h0 - 0.35, s + o], [x1, h1 - 0.35, s + o], [x1, h1, s + o], [x0, h0, s + o]], stuff.stone); // prettier-ignore
      mesh.face([[x0, h0 + 1.05, s - o], [x1, h1 + 1.05, s - o], [x1, h1 + 1.05, s + o], [x0, h0 + 1.05, s + o]], stuff.stone); // prettier-ignore
      for (const side of [s - o, s + o * 0.6]) mesh.face([[x0, h0, side], [x1, h1, side], [x1, h1 + 1.05, side], [x0, h0 + 1.05, side]], stuff.ashlar); // prettier-ignore
    }
  }
  for (let k = -2; k <= 2; k++) {
    const x = (k / 2.6) * half;
    for (const s of [-1, 1]) mesh.at({ x, y: roadAt(x, half) + 1.05, z: s * z }, () => lampPost(mesh, 0, 0, 3.4));
  }
}

/** The Swing Bridge: two riveted girders with a curved top chord, and a control cabin. */
export function swingBridge(mesh: Mesh, long: number, wide: number, surface: Surface = stuff.green): void {
  const half = long / 2;
  const top = (x: number): number => 2.2 + 6.6 * Math.cos((x / half) * 1.35);
  const n = 14;
  for (const z of [-wide / 2, wide / 2]) {
    for (let i = 0; i < n; i++) {
      const [x0, x1] = [-half + (i / n) * long, -half + ((i + 1) / n) * long];
      mesh.bar([x0, top(x0), z], [x1, top(x1), z], 0.55, surface);
      mesh.bar([x0, 0.5, z], [x0, top(x0), z], 0.34, surface);
      const rises = x0 < 0;
      mesh.bar([x0, rises ? 0.5 : top(x0), z], [x1, rises ? top(x1) : 0.5, z], 0.28, surface);
    }
    mesh.bar([half, 0.5, z], [half, top(half), z], 0.34, surface);
    mesh.slab([-half, -0.4, z - 0.3], [half, 0.6, z + 0.3], surface);
    railing(mesh, [-half, 0.35, z * 1.28], [half, 0.35, z * 1.28], surface);
  }
  for (let i = 3; i <= n - 3; i += 2) {
    const x = -half + (i / n) * long;
    mesh.bar([x, top(x), -wide / 2], [x, top(x), wide / 2], 0.35, surface);
  }
  mesh.slab([-half, -0.1, -wide * 0.64], [half, 0.32, wide * 0.64], surface, stuff.asphalt);
  mesh.lathe([[-6, 4.2], [-0.9, 4.2], [-0.9, 3.4], [-0.2, 3.4]], 20, stuff.ashlar); // prettier-ignore
  mesh.slab([-2, top(0) + 0.2, -wide / 2], [2, top(0) + 3, wide / 2], stuff.white, stuff.zinc);
  for (const z of [-wide / 2 - 0.02, wide / 2 + 0.02]) mesh.face([[-1.8, top(0) + 1.3, z], [1.8, top(0) + 1.3, z], [1.8, top(0) + 2.5, z], [-1.8, top(0) + 2.5, z]], { kind: 'plain', colour: [0.02, 0.025, 0.03], gloss: 1 }); // prettier-ignore
  for (let x = -half + 3; x < half; x += 11) mesh.at({ x, y: 0.3, z: 0 }, () => lampPost(mesh, 0, wide * 0.5, 4.5));
}

/** The Needle: a footbridge hung from one leaning mast by a fan of stays, along x. */
export function stayedBridge(mesh: Mesh, long: number, wide: number): void {
  const half = long / 2;
  const foot: Vec3 = [-half * 0.35, -2.5, 0];
  const head: Vec3 = [-half * 0.52, 34, 0];
  for (const s of [-1, 1]) mesh.bar([foot[0], foot[1], s * (wide / 2 + 0.7)], [head[0], head[1], s * 0.35], 1.1, stuff.white, 0.5);
  mesh.slab([-half, 0.2, -wide / 2], [half, 0.55, wide / 2], stuff.white, stuff.slabs);
  truss(mesh, [-half, -0.7, 0], [half, -0.7, 0], [0, 1, 0], 0.9, 0.16, stuff.white);
  for (const z of [-wide / 2, wide / 2]) {
    railing(mesh, [-half, 0.55, z], [half, 0.55, z], stuff.rail, 1.15);
    for (let i = 1; i <= 9; i++) {
      const x = foot[0] + (i / 9) * (half * 0.94 - foot[0]);
      mesh.bar([head[0], head[1] - i * 0.9, 0], [x, 0.6, z], 0.09, stuff.rail);
      if (i < 5) mesh.bar([head[0], head[1] - i * 0.9, 0], [foot[0] - (i / 4) * (half + foot[0]), 0.6, z], 0.09, stuff.rail);
    }
  }
  for (let x = -half + 4; x < half; x += 7) mesh.lamp([x, 1.2, 0], [1, 0.85, 0.65], 0.0016);
}
