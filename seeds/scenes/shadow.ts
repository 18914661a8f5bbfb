import type { Mesh } from './mesh.ts';
import { facesWhere, inParallel, type ParallelView, parallelView } from './project.ts';
import { Outlines, Raster } from './raster.ts';
import { clamp, type Vec3 } from './vector.ts';

const TAPS = 5;
/** Taps spread evenly over a disc: pairs of coordinates. */
const offsets = Float64Array.from({ length: TAPS * 2 }, (_, i) => {
  const angle = (i >> 1) * 2.39996;
  return Math.sqrt(((i >> 1) + 0.5) / TAPS) * (i & 1 ? Math.sin(angle) : Math.cos(angle));
});

/** What the sun sees: whether a point lies in its light, with the soft edge of a sun half a degree wide. */
export class SunShadow {
  private readonly raster: Raster;
  private readonly view: ParallelView;

  constructor(mesh: Mesh, sun: Vec3, centre: Vec3, radius: number, width: number) {
    this.view = parallelView(sun, centre, radius, width);
    this.raster = new Raster(width, width, false);
    this.raster.clear(-1e9);
    const casting = facesWhere(mesh, 0, (kind) => kind !== 'water');
    this.raster.draw(inParallel(mesh, this.view, casting, new Outlines(mesh.count)));
  }

  /** Share of the sun that reaches the point, 0 to 1. `dither` turns the pattern of taps. */
  lit(x: number, y: number, z: number, dither: number): number {
    const { towards, side, over, startSide, startOver, pixelsPerMetre: k } = this.view;
    const s = (x * side[0] + y * side[1] + z * side[2] - startSide) * k;
    const o = (x * over[0] + y * over[1] + z * over[2] - startOver) * k;
    const height = x * towards[0] + y * towards[1] + z * towards[2] + 0.04 + 0.7 / k;
    const width = this.view.width;
    if (s < 8 || o < 8 || s > width - 8 || o > width - 8) return 1;
    const blocker = this.raster.near[(o | 0) * width + (s | 0)]! - height;
    // The sun's half angle is 0.0047 rad: the edge grows with the distance to what throws the shadow.
    const soft = clamp(0.35 + 0.0055 * Math.max(blocker, 4) * k, 0.6, 7);
    const c = Math.cos(dither * 6.2832) * soft;
    const d = Math.sin(dither * 6.2832) * soft;
    let sum = 0;
    for (let i = 0; i < TAPS; i++) {
      const p = offsets[i * 2]!;
      const q = offsets[i * 2 + 1]!;
      const at = ((o + p * d + q * c) | 0) * width + ((s + p * c - q * d) | 0);
      if (this.raster.near[at]! <= height) sum++;
    }
    return sum / TAPS;
  }
}
