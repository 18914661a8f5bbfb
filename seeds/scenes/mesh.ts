import type { Lamp, Surface } from './surface.ts';
import { cross, subtract, unit, type Vec3 } from './vector.ts';

/** Numbers a face takes in `Mesh.faces`. */
export const STRIDE = 24;
/** Offsets inside a face: corners at 0..11, then these. */
export const NORMAL = 12;
export const U_AXIS = 15;
export const U_START = 18;
export const V_START = 19;
export const SURFACE = 20;
export const SEED = 21;
export const U_LENGTH = 22;
export const V_LENGTH = 23;

/** Where a part stands: it is drawn around its own origin and turned by `yaw` (radians). */
export interface Place {
  x: number;
  y?: number;
  z: number;
  yaw?: number;
}

/**
 * Everything solid in a scene: flat faces of three or four corners in one growing array, so that the inner
 * loops read numbers and nothing else.
 */
export class Mesh {
  faces = new Float32Array(STRIDE * 4096);
  count = 0;
  readonly surfaces: Surface[] = [];
  readonly lamps: Lamp[] = [];
  private readonly known = new Map<Surface, number>();
  private place: Required<Place> = { x: 0, y: 0, z: 0, yaw: 0 };
  private seed = 1;

  /** Draws a part with its own origin; places nest. */
  at(place: Place, part: () => void): void {
    const before = this.place;
    const [x, y, z] = this.world([place.x, place.y ?? 0, place.z]);
    this.place = { x, y, z, yaw: before.yaw + (place.yaw ?? 0) };
    part();
    this.place = before;
  }

  /** All faces until the next call share this number, which picks lit rooms, stains and tones. */
  reseed(seed: number): void {
    this.seed = seed & 0xffff;
  }

  /** Adds a flat face of three or four corners; which way round does not matter. */
  face(corners: readonly Vec3[], surface: Surface): void {
    const world = corners.map((corner) => this.world(corner));
    const [a, b, c] = [world[0]!, world[1]!, world[2]!];
    const d = world[3] ?? c;
    const normal = unit(cross(subtract(b, a), subtract(c, a)));
    this.write([a, b, c, d], normal, surface);
  }

  /** An upright box from `low` to `high`, open below, with one surface for the sides and one for the top. */
  box(low: Vec3, high: Vec3, sides: Surface, top: Surface = sides): void {
    const [x0, y0, z0] = low;
    const [x1, y1, z1] = high;
    this.face([[x0, y0, z0], [x1, y0, z0], [x1, y1, z0], [x0, y1, z0]], sides); // prettier-ignore
    this.face([[x0, y0, z1], [x1, y0, z1], [x1, y1, z1], [x0, y1, z1]], sides); // prettier-ignore
    this.face([[x0, y0, z0], [x0, y0, z1], [x0, y1, z1], [x0, y1, z0]], sides); // prettier-ignore
    this.face([[x1, y0, z0], [x1, y0, z1], [x1, y1, z1], [x1, y1, z0]], sides); // prettier-ignore
    this.face([[x0, y1, z0], [x1, y1, z0], [x1, y1, z1], [x0, y1, z1]], top); // prettier-ignore
  }

  /** A box that is seen from below as well. */
  slab(low: Vec3, high: Vec3, sides: Surface, top: Surface = sides): void {
    this.box(low, high, sides, top);
    const [x0, y, z0] = low;
    const [x1, , z1] = high;
    this.face([[x0, y, z0], [x1, y, z0], [x1, y, z1], [x0, y, z1]], sides); // prettier-ignore
  }

  /** A straight member with a square section, for lattices, cables, rails and branches. */
  bar(from: Vec3, to: Vec3, width: number, surface: Surface, widthAtEnd = width): void {
    const along = unit(subtract(to, from));
    const side = unit(cross(along, Math.abs(along[1]) > 0.9 ? [1, 0, 0] : [0, 1, 0]));
    const other = cross(side, along);
    const ring = (at: Vec3, w: number): Vec3[] =>
      [[-1, -1], [1, -1], [1, 1], [-1, 1]].map(([p, q]) => [
        at[0] + ((side[0] * p! + other[0] * q!) * w) / 2,
        at[1] + ((side[1] * p! + other[1] * q!) * w) / 2,
        at[2] + ((side[2] * p! + other[2] * q!) * w) / 2,
      ]); // prettier-ignore
    const [start, end] = [ring(from, width), ring(to, widthAtEnd)];
    for (let i = 0; i < 4; i++) {
      const j = (i + 1) % 4;
      this.face([start[i]!, start[j]!, end[j]!, end[i]!], surface);
    }
  }

  /** A solid of revolution about the y axis: pairs of height and radius, from the bottom up. */
  lathe(profile: readonly (readonly [number, number])[], sides: number, surface: Surface, squash = 1): void {
    const corner = (i: number, step: number): Vec3 => {
      const [y, r] = profile[i]!;
      const angle = (step / sides) * Math.PI * 2;
      return [Math.cos(angle) * r, y, Math.sin(angle) * r * squash];
    };
    for (let i = 0; i + 1 < profile.length; i++) {
      for (let s = 0; s < sides; s++) {
        this.face([corner(i, s), corner(i, s + 1), corner(i + 1, s + 1), corner(i + 1, s)], surface);
      }
    }
  }

  lamp(at: Vec3, colour: Vec3, power: number): void {
    const [x, y, z] = this.world(at);
    this.lamps.push({ x, y, z, colour, power });
  }

  private world(p: Vec3): Vec3 {
    const { x, y, z, yaw } = this.place;
    const c = Math.cos(yaw);
    const s = Math.sin(yaw);
    return [x + p[0] * c + p[2] * s, y + p[1], z - p[0] * s + p[2] * c];
  }

  private write(corners: Vec3[], normal: Vec3, surface: Surface): void {
    if ((this.count + 1) * STRIDE > this.faces.length) {
      const grown = new Float32Array(this.faces.length * 2);
      grown.set(this.faces);
      this.faces = grown;
    }
    const f = this.count++ * STRIDE;
    corners.forEach((corner, i) => this.faces.set(corner, f + i * 3));
    // Walls run along u and rise along v, flat things lie along x and z.
    const flat = Math.abs(normal[1]) > 0.999;
    const u: Vec3 = flat ? [1, 0, 0] : unit(cross([0, 1, 0], normal));
    const v = cross(normal, u);
    const us = corners.map((p) => p[0] * u[0] + p[1] * u[1] + p[2] * u[2]);
    const vs = corners.map((p) => p[0] * v[0] + p[1] * v[1] + p[2] * v[2]);
    const [u0, v0] = [Math.min(...us), Math.min(...vs)];
    this.faces.set(normal, f + NORMAL);
    this.faces.set(u, f + U_AXIS);
    this.faces.set([u0, v0, this.index(surface), this.seed], f + U_START);
    this.faces.set([Math.max(...us) - u0, Math.max(...vs) - v0], f + U_LENGTH);
  }

  private index(surface: Surface): number {
    let i = this.known.get(surface);
    if (i === undefined) {
      i = this.surfaces.push(surface) - 1;
      this.known.set(surface, i);
    }
    return i;
  }
}
