import type { Camera } from './camera.ts';
import { type Mesh, NORMAL, STRIDE, SURFACE } from './mesh.ts';
import { hash } from './noise.ts';
import { facesWhere, inParallel, inPerspective, type ParallelView, parallelView } from './project.ts';
import { Outlines, Raster } from './raster.ts';
import type { Sky } from './sky.ts';
import { type Colour, dot, type Vec3 } from './vector.ts';

const DIRECTIONS = 21;
const MAP = 400;

interface Patch {
  towards: Vec3;
  light: Colour;
  near: Float32Array;
  view: ParallelView;
}

/** The sky cut into patches, each with a map of what it sees of the city: together they give soft skylight. */
export class SkyPatches {
  readonly patches: Patch[] = [];
  /** Skylight on open level ground. */
  readonly open: Colour;

  constructor(mesh: Mesh, sky: Sky, centre: Vec3, radius: number) {
    const colour = new Float64Array(3);
    const open = [0, 0, 0];
    // What is smaller than a point of these maps would only cost time.
    const casting = facesWhere(mesh, 1.8, (kind) => kind !== 'water');
    const outlines = new Outlines(mesh.count);
    for (let i = 0; i < DIRECTIONS; i++) {
      // A spiral with equal areas of the hemisphere between its points.
      const y = (i + 0.5) / DIRECTIONS;
      const flat = Math.sqrt(1 - y * y);
      const towards: Vec3 = [Math.cos(i * 2.39996) * flat, y, Math.sin(i * 2.39996) * flat];
      sky.glance(towards[0], towards[1], towards[2], colour);
      const solid = (2 * Math.PI) / DIRECTIONS;
      const light: Colour = [colour[0]! * solid, colour[1]! * solid, colour[2]! * solid];
      for (let c = 0; c < 3; c++) open[c]! += light[c]! * y;
      const view = parallelView(towards, centre, radius, MAP);
      const raster = new Raster(MAP, MAP, false);
      raster.clear(-1e9);
      raster.draw(inParallel(mesh, view, casting, outlines));
      this.patches.push({ towards, light, near: raster.near, view });
    }
    this.open = [open[0]!, open[1]!, open[2]!];
  }

  /** Skylight and light thrown back by the city on a point that faces `n`, added to `out`. */
  gather(x: number, y: number, z: number, n: Vec3, bounce: Colour, jitter: number, out: Float64Array): void {
    const jx = hash(jitter, 1, 3) - 0.5;
    const jy = hash(jitter, 2, 3) - 0.5;
    let open = 0;
    let total = 0;
    for (let i = 0; i < DIRECTIONS; i++) {
      const { towards, light, near, view } = this.patches[i]!;
      const facing = n[0] * towards[0] + n[1] * towards[1] + n[2] * towards[2];
      if (facing <= 0) continue;
      total += facing;
      const k = view.pixelsPerMetre;
      const lift = 0.9 / k + 0.05;
      const px = x + n[0] * lift;
      const py = y + n[1] * lift;
      const pz = z + n[2] * lift;
      const s = ((px * view.side[0] + py * view.side[1] + pz * view.side[2] - view.startSide) * k + jx * 2.2) | 0;
      const o = ((px * view.over[0] + py * view.over[1] + pz * view.over[2] - view.startOver) * k + jy * 2.2) | 0;
      const height = px * towards[0] + py * towards[1] + pz * towards[2] + 0.8 / k;
      if (s >= 0 && o >= 0 && s < MAP && o < MAP && near[o * MAP + s]! > height) continue;
      open += facing;
      out[0]! += light[0] * facing;
      out[1]! += light[1] * facing;
      out[2]! += light[2] * facing;
    }
    // What the point sees instead of sky is ground and walls: they throw back part of what lights them.
    const hidden = 1 - (total > 0 ? open / total : 0);
    const ground = 0.5 - 0.5 * n[1];
    const share = 0.62 * hidden * (1 - ground) + ground * (0.9 - 0.45 * hidden);
    for (let c = 0; c < 3; c++) out[c]! += bounce[c]! * share;
  }
}

/** Skylight over one picture, worked out on a coarse raster and read between its points where the surface is the same. */
export class Skylight {
  private readonly width: number;
  private readonly rows: number;
  private readonly raster: Raster;
  private readonly light: Float32Array;

  constructor(
    private readonly mesh: Mesh,
    private readonly camera: Camera,
    private readonly patches: SkyPatches,
    private readonly bounce: Colour,
    floor = -Infinity,
  ) {
    this.width = camera.width;
    this.rows = camera.height;
    this.raster = new Raster(this.width, this.rows);
    this.raster.clear(0);
    this.raster.draw(inPerspective(mesh, camera, floor));
    this.light = new Float32Array(this.width * this.rows * 3);
    this.fill();
    this.smooth();
  }

  /** Skylight at picture position (s, t) in 0..1 for a surface of normal `n`, written to `out`. */
  at(s: number, t: number, face: number, n: Vec3, out: Float64Array): void {
    const x = s * this.width - 0.5;
    const y = t * this.rows - 0.5;
    const xi = Math.floor(x);
    const yi = Math.floor(y);
    let r = 0;
    let g = 0;
    let b = 0;
    let sum = 0;
    for (let j = 0; j < 2; j++) {
      for (let i = 0; i < 2; i++) {
        const px = xi + i;
        const py = yi + j;
        if (px < 0 || py < 0 || px >= this.width || py >= this.rows) continue;
        const at = py * this.width + px;
        const other = this.raster.face[at]!;
        if (other < 0) continue;
        let w = (i ? x - xi : 1 - x + xi) * (j ? y - yi : 1 - y + yi) + 1e-3;
        if (other !== face) w *= this.alike(other, n);
        sum += w;
        r += this.light[at * 3]! * w;
        g += this.light[at * 3 + 1]! * w;
        b += this.light[at * 3 + 2]! * w;
      }
    }
    if (sum < 1e-5) {
      const k = 0.45 + 0.25 * n[1];
      for (let c = 0; c < 3; c++) out[c] = this.patches.open[c]! * k + this.bounce[c]! * 0.2;
      return;
    }
    out[0] = r / sum;
    out[1] = g / sum;
    out[2] = b / sum;
  }

  private alike(face: number, n: Vec3): number {
    const f = face * STRIDE + NORMAL;
    const m = this.mesh.faces;
    return Math.abs(m[f]! * n[0] + m[f + 1]! * n[1] + m[f + 2]! * n[2]) > 0.95 ? 0.05 : 1e-7;
  }

  private fill(): void {
    const { position, right, up, forward, focal, centreX, centreY } = this.camera;
    const out = new Float64Array(3);
    for (let y = 0; y < this.rows; y++) {
      for (let x = 0; x < this.width; x++) {
        const at = y * this.width + x;
        const face = this.raster.face[at]!;
        if (face < 0) continue;
        const f = face * STRIDE;
        if (this.mesh.surfaces[this.mesh.faces[f + SURFACE]!]!.kind === 'water') continue;
        const far = 1 / this.raster.near[at]!;
        const rx = (x + 0.5 - centreX) / focal;
        const ry = (centreY - y - 0.5) / focal;
        const ray: Vec3 = [
          right[0] * rx + up[0] * ry + forward[0],
          right[1] * rx + up[1] * ry + forward[1],
          right[2] * rx + up[2] * ry + forward[2],
        ];
        let n: Vec3 = [this.mesh.faces[f + NORMAL]!, this.mesh.faces[f + NORMAL + 1]!, this.mesh.faces[f + NORMAL + 2]!];
        if (dot(n, ray) > 0) n = [-n[0], -n[1], -n[2]];
        out.fill(0);
        const [px, py, pz] = [position[0] + ray[0] * far, position[1] + ray[1] * far, position[2] + ray[2] * far];
        this.patches.gather(px, py, pz, n, this.bounce, (y * 7919 + x) | 0, out);
        this.light.set(out, at * 3);
      }
    }
  }

  /** Takes the scatter out, along rows then columns, never across an edge between surfaces. */
  private smooth(): void {
    this.smoothAlong(1, this.width);
    this.smoothAlong(this.width, this.width);
  }

  private smoothAlong(step: number, width: number): void {
    const before = this.light.slice();
    const { face } = this.raster;
    const total = width * this.rows;
    for (let at = 0; at < total; at++) {
      const here = face[at]!;
      if (here < 0) continue;
      let r = 0;
      let g = 0;
      let b = 0;
      let n = 0;
      for (let k = -3; k <= 3; k++) {
        const p = at + k * step;
        if (p < 0 || p >= total || face[p] !== here) continue;
        r += before[p * 3]!;
        g += before[p * 3 + 1]!;
        b += before[p * 3 + 2]!;
        n++;
      }
      this.light[at * 3] = r / n;
      this.light[at * 3 + 1] = g / n;
      this.light[at * 3 + 2] = b / n;
    }
  }
}
