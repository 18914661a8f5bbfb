import type { Lamp } from './surface.ts';
import type { Vec3 } from './vector.ts';

const CELL = 12;
/** Light below this share of the skylight is not seen, and neither is what is under 0.2 lux. */
const SEEN_SHARE = 0.012;
const LEAST = 0.000002;

/** Lamps by the piece of ground they reach, so that a point asks only the few that matter. */
export class Lamplight {
  private readonly cells = new Map<number, Lamp[]>();

  /** @param skylight light on open ground, beside which lamps show or do not */
  constructor(lamps: readonly Lamp[], strength: number, skylight: number) {
    if (strength <= 0) return;
    const least = Math.max(LEAST, skylight * SEEN_SHARE);
    for (const lamp of lamps) this.place({ ...lamp, power: lamp.power * strength }, least);
  }

  private place(lamp: Lamp, least: number): void {
    const reach = Math.min(70, Math.sqrt(lamp.power / least));
    for (let x = Math.floor((lamp.x - reach) / CELL); x <= (lamp.x + reach) / CELL; x++) {
      for (let z = Math.floor((lamp.z - reach) / CELL); z <= (lamp.z + reach) / CELL; z++) {
        const key = x * 65536 + z;
        const cell = this.cells.get(key);
        if (cell) cell.push(lamp);
        else this.cells.set(key, [lamp]);
      }
    }
  }

  /** Adds the lamps' light on a point that faces `n` to `out`. */
  add(x: number, y: number, z: number, n: Vec3, out: Float64Array): void {
    const cell = this.cells.get(Math.floor(x / CELL) * 65536 + Math.floor(z / CELL));
    if (!cell) return;
    for (const lamp of cell) {
      const dx = lamp.x - x;
      const dy = lamp.y - y;
      const dz = lamp.z - z;
      const square = dx * dx + dy * dy + dz * dz + 0.3;
      const distance = Math.sqrt(square);
      const facing = (n[0] * dx + n[1] * dy + n[2] * dz) / distance;
      if (facing <= 0) continue;
      const edge = 1 - Math.min(1, square / 4900);
      const light = (lamp.power * facing * edge * edge) / square;
      out[0]! += light * lamp.colour[0];
      out[1]! += light * lamp.colour[1];
      out[2]! += light * lamp.colour[2];
    }
  }
}
