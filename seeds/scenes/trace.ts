import { type Mesh, STRIDE, SURFACE } from './mesh.ts';
import { facesWhere, inParallel, type ParallelView, parallelView } from './project.ts';
import { Outlines, Raster } from './raster.ts';
import type { Sky } from './sky.ts';
import { type Colour, type Vec3 } from './vector.ts';

const GRID = 512;
const STEPS = 80;

/**
 * The city as heights over a grid, for what panes reflect: a ray walks from cell to cell until it runs into something
 * taller than itself.
 */
export class Neighbours {
  private readonly raster = new Raster(GRID, GRID);
  private readonly view: ParallelView;

  constructor(
    private readonly mesh: Mesh,
    private readonly sky: Sky,
    private readonly skylight: Colour,
    centre: Vec3,
    radius: number,
  ) {
    this.view = parallelView([0, 1, 0], centre, radius, GRID);
    this.raster.clear(-1e9);
    const standing = facesWhere(mesh, 1, (kind) => kind !== 'leaf');
    this.raster.draw(inParallel(mesh, this.view, standing, new Outlines(mesh.count)));
  }

  /** Radiance that comes from direction (dx, dy, dz) at a point of a wall, written to `out`. */
  reflect(x: number, y: number, z: number, dx: number, dy: number, dz: number, out: Float64Array): void {
    const { side, over, startSide, startOver, pixelsPerMetre: k } = this.view;
    const s = (x * side[0] + z * side[2] - startSide) * k;
    const o = (x * over[0] + z * over[2] - startOver) * k;
    const ds = (dx * side[0] + dz * side[2]) * k;
    const dO = (dx * over[0] + dz * over[2]) * k;
    const stepS = 1 / Math.max(1e-6, Math.abs(ds));
    const stepO = 1 / Math.max(1e-6, Math.abs(dO));
    let cellS = Math.floor(s);
    let cellO = Math.floor(o);
    let nextS = (ds > 0 ? cellS + 1 - s : s - cellS) * stepS;
    let nextO = (dO > 0 ? cellO + 1 - o : o - cellO) * stepO;
    const dirS = ds > 0 ? 1 : -1;
    const dirO = dO > 0 ? 1 : -1;
    for (let i = 0; i < STEPS; i++) {
      const alongS = nextS < nextO;
      const t = alongS ? nextS : nextO;
      if (alongS) {
        cellS += dirS;
        nextS += stepS;
      } else {
        cellO += dirO;
        nextO += stepO;
      }
      if (cellS < 0 || cellO < 0 || cellS >= GRID || cellO >= GRID) break;
      const height = y + dy * t;
      if (i > 1 && this.raster.near[cellO * GRID + cellS]! > height) {
        const face = this.raster.face[cellO * GRID + cellS]!;
        return this.hit(face, x + dx * t, height, z + dz * t, alongS ? -dirS * side[0] : 0, alongS ? 0 : -dirO * over[2], out);
      }
      if (height < -6 || height > 300) break;
    }
    if (dy >= 0) this.sky.glance(dx, dy, dz, out);
    else this.hit(-1, x, 0, z, 0, 0, out);
  }

  /** A neighbour's wall, roughly: its colour in this light, broken by a grid of dark windows. */
  private hit(face: number, x: number, y: number, z: number, nx: number, nz: number, out: Float64Array): void {
    const surface = face < 0 ? null : this.mesh.surfaces[this.mesh.faces[face * STRIDE + SURFACE]!]!;
    const colour = surface?.colour ?? [0.2, 0.2, 0.2];
    const up = nx === 0 && nz === 0 ? 1 : 0;
    const sun = Math.max(0, nx * this.sky.sun[0] + nz * this.sky.sun[2] + up * this.sky.sun[1]) * 0.8;
    const along = nx !== 0 ? z : x;
    const dark = up === 0 && along - Math.floor(along / 3) * 3 < 1.4 && y - Math.floor(y / 3.4) * 3.4 > 1.2;
    const k = dark ? 0.35 : 1;
    for (let c = 0; c < 3; c++) {
      const light = this.sky.sunlight[c]! * sun + this.skylight[c]! * 0.42;
      out[c] = ((colour[c]! * light) / Math.PI) * k;
    }
  }
}
