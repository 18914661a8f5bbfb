import type { Camera } from './camera.ts';
import { type Mesh, NORMAL, STRIDE, SURFACE, U_LENGTH, V_LENGTH } from './mesh.ts';
import { Outlines } from './raster.ts';
import type { Surface } from './surface.ts';
import { cross, dot, unit, type Vec3 } from './vector.ts';

/** Nothing nearer than this is drawn. */
const NEAR = 0.25;

/** Corners of one face while it is clipped: up to six, three numbers each. */
const clipped = new Float64Array(24);
const source = new Float64Array(24);
const flat = new Float64Array(16);

/** Keeps the part of a polygon where coordinate `axis` is at least `limit` (Sutherland and Hodgman). */
function clip(from: Float64Array, n: number, axis: number, limit: number, to: Float64Array): number {
  let out = 0;
  for (let k = 0; k < n; k++) {
    const p = k * 3;
    const q = ((k + 1) % n) * 3;
    const a = from[p + axis]! - limit;
    const b = from[q + axis]! - limit;
    if (a >= 0) {
      for (let i = 0; i < 3; i++) to[out * 3 + i] = from[p + i]!;
      out++;
    }
    if (a >= 0 !== b >= 0) {
      const t = a / (a - b);
      for (let i = 0; i < 3; i++) to[out * 3 + i] = from[p + i]! + (from[q + i]! - from[p + i]!) * t;
      out++;
    }
  }
  return out;
}

/** Drops a corner that repeats the one before: triangles are stored as four corners. */
function corners(faces: Float32Array, f: number): number {
  for (let i = 0; i < 12; i++) source[i] = faces[f + i]!;
  return source[6] === source[9] && source[7] === source[10] && source[8] === source[11] ? 3 : 4;
}

/**
 * Outlines of a mesh as the camera sees it. What lies under height `floor` is left out: a mirror shows only what is
 * above it.
 */
export function inPerspective(mesh: Mesh, camera: Camera, floor = -Infinity): Outlines {
  const outlines = new Outlines(mesh.count);
  const { position: c, right, up, forward, focal, centreX, centreY, width } = camera;
  for (let i = 0; i < mesh.count; i++) {
    const f = i * STRIDE;
    let n = corners(mesh.faces, f);
    if (floor > -Infinity) {
      n = clip(source, n, 1, floor, clipped);
      source.set(clipped);
    }
    toCamera(n, c, right, up, forward);
    n = clip(source, n, 2, NEAR, clipped);
    if (n < 3) continue;
    const normal: Vec3 = [mesh.faces[f + NORMAL]!, mesh.faces[f + NORMAL + 1]!, mesh.faces[f + NORMAL + 2]!];
    const [nx, ny, nz] = [dot(normal, right), dot(normal, up), dot(normal, forward)];
    const d = nx * clipped[0]! + ny * clipped[1]! + nz * clipped[2]!;
    if (Math.abs(d) < 1e-5) continue;
    for (let k = 0; k < n; k++) {
      const z = clipped[k * 3 + 2]!;
      flat[k * 2] = centreX + (focal * clipped[k * 3]!) / z;
      flat[k * 2 + 1] = centreY - (focal * clipped[k * 3 + 1]!) / z;
    }
    const [a, b] = [nx / (focal * d), -ny / (focal * d)];
    outlines.add(flat, n, a, b, nz / d - a * centreX - b * centreY, i, width);
  }
  return outlines;
}

function toCamera(n: number, c: Vec3, right: Vec3, up: Vec3, forward: Vec3): void {
  for (let k = 0; k < n * 3; k += 3) {
    const x = source[k]! - c[0];
    const y = source[k + 1]! - c[1];
    const z = source[k + 2]! - c[2];
    source[k] = x * right[0] + y * right[1] + z * right[2];
    source[k + 1] = x * up[0] + y * up[1] + z * up[2];
    source[k + 2] = x * forward[0] + y * forward[1] + z * forward[2];
  }
}

/** A parallel view from a far light: axes, and how metres become pixels. */
export interface ParallelView {
  towards: Vec3;
  side: Vec3;
  over: Vec3;
  startSide: number;
  startOver: number;
  pixelsPerMetre: number;
  width: number;
}

/** Looks from direction `towards` (pointing at the light) at a ball around `centre`. */
export function parallelView(towards: Vec3, centre: Vec3, radius: number, width: number): ParallelView {
  const side = unit(cross(Math.abs(towards[1]) > 0.99 ? [0, 0, 1] : [0, 1, 0], towards));
  const over = cross(towards, side);
  return {
    towards,
    side,
    over,
    startSide: dot(centre, side) - radius,
    startOver: dot(centre, over) - radius,
    pixelsPerMetre: width / (radius * 2),
    width,
  };
}

/**
 * Outlines of a mesh in a parallel view; the depth value is the height towards the light, in metres. `keep` says which
 * faces are drawn; outlines are written over `outlines`, which must have room for all faces.
 */
export function inParallel(mesh: Mesh, view: ParallelView, keep: Uint8Array, outlines: Outlines): Outlines {
  outlines.count = 0;
  const { towards: t, side: s, over: o, startSide, startOver, pixelsPerMetre: k } = view;
  const { faces } = mesh;
  for (let i = 0; i < mesh.count; i++) {
    if (keep[i] === 0) continue;
    const f = i * STRIDE;
    const nx = faces[f + NORMAL]!;
    const ny = faces[f + NORMAL + 1]!;
    const nz = faces[f + NORMAL + 2]!;
    const facing = nx * t[0] + ny * t[1] + nz * t[2];
    if (Math.abs(facing) < 1e-3) continue;
    const n = corners(faces, f);
    for (let c = 0; c < n; c++) {
      const x = source[c * 3]!;
      const y = source[c * 3 + 1]!;
      const z = source[c * 3 + 2]!;
      flat[c * 2] = (x * s[0] + y * s[1] + z * s[2] - startSide) * k;
      flat[c * 2 + 1] = (x * o[0] + y * o[1] + z * o[2] - startOver) * k;
    }
    // The face's plane in the view's axes: height changes by -slope for each metre sideways.
    const a = -(nx * s[0] + ny * s[1] + nz * s[2]) / facing / k;
    const b = -(nx * o[0] + ny * o[1] + nz * o[2]) / facing / k;
    const height = source[0]! * t[0] + source[1]! * t[1] + source[2]! * t[2];
    outlines.add(flat, n, a, b, height - a * flat[0]! - b * flat[1]!, i, view.width);
  }
  return outlines;
}

/** Marks the faces of the given kinds that measure at least `metres` across. */
export function facesWhere(mesh: Mesh, metres: number, keep: (kind: Surface['kind']) => boolean): Uint8Array {
  const wanted = mesh.surfaces.map((surface) => keep(surface.kind));
  return Uint8Array.from({ length: mesh.count }, (_, i) => {
    const f = i * STRIDE;
    const size = Math.max(mesh.faces[f + U_LENGTH]!, mesh.faces[f + V_LENGTH]!);
    return wanted[mesh.faces[f + SURFACE]!] && size >= metres ? 1 : 0;
  });
}
