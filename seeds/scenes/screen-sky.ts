import type { Camera } from './camera.ts';
import type { Sky } from './sky.ts';

/** The sky over one picture, looked at every few pixels and blended between: clouds have no sharp edges. */
export class ScreenSky {
  private readonly columns: number;
  private readonly rows: number;
  private readonly light: Float32Array;

  constructor(
    private readonly camera: Camera,
    private readonly sky: Sky,
    private readonly step: number,
  ) {
    this.columns = Math.ceil(camera.width / step) + 2;
    this.rows = Math.ceil(camera.height / step) + 2;
    this.light = new Float32Array(this.columns * this.rows * 3).fill(-1);
  }

  /** Radiance at a pixel, written to `out`. */
  at(px: number, py: number, out: Float64Array): void {
    const x = (px + 0.5) / this.step;
    const y = (py + 0.5) / this.step;
    const xi = x | 0;
    const yi = y | 0;
    const a = this.node(xi, yi);
    const b = this.node(xi + 1, yi);
    const c = this.node(xi, yi + 1);
    const d = this.node(xi + 1, yi + 1);
    for (let i = 0; i < 3; i++) {
      const top = this.light[a + i]! + (this.light[b + i]! - this.light[a + i]!) * (x - xi);
      const low = this.light[c + i]! + (this.light[d + i]! - this.light[c + i]!) * (x - xi);
      out[i] = top + (low - top) * (y - yi);
    }
  }

  private readonly look = new Float64Array(3);

  private node(i: number, j: number): number {
    const at = (j * this.columns + i) * 3;
    if (this.light[at]! >= 0) return at;
    const { right, up, forward, focal, centreX, centreY } = this.camera;
    const rx = (i * this.step - centreX) / focal;
    const ry = (centreY - j * this.step) / focal;
    const x = right[0] * rx + up[0] * ry + forward[0];
    const y = right[1] * rx + up[1] * ry + forward[1];
    const z = right[2] * rx + up[2] * ry + forward[2];
    const l = 1 / Math.hypot(x, y, z);
    this.sky.look(x * l, y * l, z * l, this.look);
    this.light.set(this.look, at);
    return at;
  }
}
