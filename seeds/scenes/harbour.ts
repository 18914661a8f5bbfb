import type { Mesh } from './mesh.ts';
import type { Random } from './noise.ts';
import { stuff } from './styles.ts';
import type { Surface } from './surface.ts';
import type { Vec3 } from './vector.ts';

/** Height of the harbour's water below the quays. */
export const WATER = -2.2;

/** Water as far as one can see. */
export function sea(mesh: Mesh): void {
  mesh.face([[-6000, WATER, -1500], [6000, WATER, -1500], [6000, WATER, 9000], [-6000, WATER, 9000]], stuff.water); // prettier-ignore
}

/** A piece of ground with quay walls down into the water. */
export function ground(mesh: Mesh, x0: number, z0: number, x1: number, z1: number, top: Surface = stuff.setts): void {
  mesh.reseed(7);
  mesh.box([x0, -6, z0], [x1, 0, z1], stuff.quay, top);
  const k = 0.55;
  mesh.box([x0 - 0.06, -0.32, z0 - 0.06], [x1 + 0.06, 0.03, z0 + k], stuff.kerb);
}

/** A working or a pleasure boat, bow towards +z, afloat. */
export function boat(mesh: Mesh, x: number, z: number, yaw: number, long: number, random: Random): void {
  const hulls: Surface[] = [stuff.green, stuff.red, stuff.white, { kind: 'plain', colour: [0.03, 0.05, 0.1], gloss: 0.2 }];
  const hull = hulls[Math.floor(random() * hulls.length)]!;
  const wide = long * 0.15;
  const deck = 0.9 + long * 0.03;
  mesh.at({ x, y: WATER, z, yaw }, () => {
    const rings = [-0.5, -0.42, -0.15, 0.15, 0.36, 0.5].map((t, i) => {
      const half = wide * [0.72, 0.9, 1, 0.95, 0.6, 0.03][i]!;
      const sheer = deck * (1 + 0.35 * (t + 0.1) ** 2 * 2);
      return { z: t * long, half, sheer };
    });
    for (let i = 0; i + 1 < rings.length; i++) {
      const [a, b] = [rings[i]!, rings[i + 1]!];
      for (const s of [-1, 1]) {
        mesh.face([[s * a.half * 0.8, -0.3, a.z], [s * b.half * 0.7, -0.3, b.z], [s * b.half, b.sheer, b.z]], hull); // prettier-ignore
        mesh.face([[s * a.half * 0.8, -0.3, a.z], [s * b.half, b.sheer, b.z], [s * a.half, a.sheer, a.z]], hull); // prettier-ignore
      }
      mesh.face([[-a.half, a.sheer - 0.2, a.z], [a.half, a.sheer - 0.2, a.z], [b.half, b.sheer - 0.2, b.z]], stuff.wood); // prettier-ignore
      mesh.face([[-a.half, a.sheer - 0.2, a.z], [b.half, b.sheer - 0.2, b.z], [-b.half, b.sheer - 0.2, b.z]], stuff.wood); // prettier-ignore
    }
    const r = rings[0]!;
    mesh.face([[-r.half, r.sheer, r.z], [r.half, r.sheer, r.z], [r.half * 0.8, -0.3, r.z], [-r.half * 0.8, -0.3, r.z]], hull); // prettier-ignore
    cabin(mesh, long, wide, deck, random);
  });
}

function cabin(mesh: Mesh, long: number, wide: number, deck: number, random: Random): void {
  const glass: Surface = { kind: 'plain', colour: [0.02, 0.025, 0.03], gloss: 1 };
  const [z0, z1] = [-long * 0.25, -long * 0.02 + random() * long * 0.12];
  const w = wide * 0.62;
  mesh.box([-w, deck - 0.2, z0], [w, deck + 1.9, z1], stuff.white, stuff.zinc);
  mesh.face([[-w * 0.85, deck + 1, z1 + 0.02], [w * 0.85, deck + 1, z1 + 0.02], [w * 0.85, deck + 1.65, z1 + 0.02], [-w * 0.85, deck + 1.65, z1 + 0.02]], glass); // prettier-ignore
  for (const s of [-1, 1]) mesh.face([[s * (w + 0.02), deck + 1, z0 + 0.3], [s * (w + 0.02), deck + 1, z1 - 0.2], [s * (w + 0.02), deck + 1.6, z1 - 0.2], [s * (w + 0.02), deck + 1.6, z0 + 0.3]], glass); // prettier-ignore
  const mast: Vec3 = [0, deck + long * (0.55 + random() * 0.5), long * 0.12];
  mesh.bar([0, deck - 0.2, long * 0.12], mast, 0.14, stuff.wood, 0.07);
  mesh.bar(mast, [0, deck + 0.3, long * 0.49], 0.03, stuff.rail);
  mesh.bar(mast, [0, deck + 0.3, -long * 0.49], 0.03, stuff.rail);
  for (const s of [-1, 1]) mesh.bar(mast, [s * wide * 0.9, deck, long * 0.1], 0.03, stuff.rail);
}

/** A member with a rectangular outline and crossed bracing: two chords and a zigzag. */
function truss(mesh: Mesh, from: Vec3, to: Vec3, up: Vec3, deep: number, thick: number, surface: Surface): void {
  const d: Vec3 = [to[0] - from[0], to[1] - from[1], to[2] - from[2]];
  const n = Math.max(2, Math.round(Math.hypot(...d) / deep));
  const at = (t: number, k: number): Vec3 => [from[0] + d[0] * t + up[0] * k, from[1] + d[1] * t + up[1] * k, from[2] + d[2] * t + up[2] * k]; // prettier-ignore
  mesh.bar(at(0, 0), at(1, 0), thick, surface);
  mesh.bar(at(0, deep), at(1, deep), thick, surface);
  for (let i = 0; i < n; i++) {
    mesh.bar(at(i / n, i % 2 ? deep : 0), at((i + 1) / n, i % 2 ? 0 : deep), thick * 0.6, surface);
    mesh.bar(at(i / n, 0), at(i / n, deep), thick * 0.5, surface);
  }
}

/** An old level-luffing dock crane on four legs, jib towards +z. */
export function dockCrane(mesh: Mesh, x: number, z: number, yaw: number, surface: Surface = stuff.green): void {
  mesh.at({ x, z, yaw }, () => {
    for (const [px, pz] of [[-3, -3], [3, -3], [3, 3], [-3, 3]]) mesh.bar([px!, 0, pz!], [px! * 0.55, 13, pz! * 0.55], 0.7, surface, 0.5); // prettier-ignore
    for (const y of [5, 13]) {
      const k = 3 - (y / 13) * 1.35;
      mesh.bar([-k, y, -k], [k, y, -k], 0.4, surface);
      mesh.bar([-k, y, k], [k, y, k], 0.4, surface);
      mesh.bar([-k, y, -k], [-k, y, k], 0.4, surface);
      mesh.bar([k, y, -k], [k, y, k], 0.4, surface);
    }
    mesh.slab([-2.4, 13.2, -4.5], [2.4, 16.6, 2.2], surface, stuff.zinc);
    mesh.face([[-1.9, 14.6, 2.22], [1.9, 14.6, 2.22], [1.9, 16.1, 2.22], [-1.9, 16.1, 2.22]], { kind: 'plain', colour: [0.02, 0.02, 0.02], gloss: 1 }); // prettier-ignore
    for (const s of [-1, 1]) {
      truss(mesh, [s * 1.1, 15, 2.2], [s * 0.35, 38, 22], [0, 0.55, -0.8], 1.5, 0.2, surface);
      mesh.bar([s, 16.6, -3.5], [s * 0.4, 26, -1], 0.3, surface);
    }
    mesh.bar([0, 26, -1], [0, 38.5, 21.6], 0.1, stuff.rail);
    mesh.bar([0, 26, -1], [0, 16.6, -4.2], 0.12, stuff.rail);
    mesh.bar([0, 38, 22], [0, 12, 22.4], 0.06, stuff.rail);
  });
}

/** A builder's tower crane. */
export function towerCrane(mesh: Mesh, x: number, z: number, yaw: number, high: number): void {
  const paint: Surface = { kind: 'plain', colour: [0.5, 0.36, 0.06], gloss: 0.1 };
  mesh.at({ x, z, yaw }, () => {
    for (const s of [-0.9, 0.9]) {
      truss(mesh, [s, 0, -0.9], [s, high, -0.9], [0, 0, 1], 1.8, 0.2, paint);
      truss(mesh, [-0.9, 0, s], [-0.9, high, s], [1, 0, 0], 1.8, 0.2, paint);
    }
    truss(mesh, [0, high, -14], [0, high, 42], [0, 1, 0], 1.6, 0.22, paint);
    mesh.bar([0, high, 0], [0, high + 8, 0], 0.5, paint, 0.2);
    mesh.bar([0, high + 8, 0], [0, high + 1.6, 30], 0.1, stuff.rail);
    mesh.bar([0, high + 8, 0], [0, high + 1.6, -13], 0.1, stuff.rail);
    mesh.slab([-0.9, high - 2.6, -14], [0.9, high - 0.1, -10.5], stuff.concrete);
    mesh.slab([0.3, high - 2.4, 0.9], [1.9, high - 0.1, 2.6], stuff.white);
  });
}

export { truss };
