import { clearSky, sunThroughAir } from './atmosphere.ts';
import type { Light } from './light.ts';
import { fractal, noise } from './noise.ts';
import { type Colour, clamp, direction, ramp, type Vec3 } from './vector.ts';

const AROUND = 96;
const UP = 40;
const DOME_AROUND = 512;
const DOME_UP = 128;
const TURN = Math.PI * 2;

/** The sky of one scene: clear air worked out once on a coarse grid, clouds drawn over it where somebody looks. */
export class Sky {
  readonly sun: Vec3;
  /** Sunlight on a surface that faces the sun, at street level. */
  readonly sunlight: Colour;
  private readonly cloudlight: Colour;
  private readonly clear = new Float32Array(AROUND * UP * 3);
  private readonly dome = new Float32Array(DOME_AROUND * DOME_UP * 3);
  private readonly out = new Float64Array(3);
  private readonly fog = new Float64Array(3);
  private readonly shift: number;

  constructor(
    private readonly light: Light,
    seed: number,
  ) {
    this.shift = seed * 13.7;
    this.sun = direction(light.sunAzimuth, light.sunElevation);
    const through = (metres: number): Colour => sunThroughAir(this.sun, metres, light.haze);
    const direct = (1 - light.overcast) * ramp(light.sunElevation, -0.6, 0.8);
    const atStreet = through(30);
    this.sunlight = [atStreet[0] * direct, atStreet[1] * direct, atStreet[2] * direct];
    this.cloudlight = paler(through(2600));
    this.fillClear();
    this.fillDome();
  }

  /** Radiance towards direction (x, y, z), of unit length, clouds included. Written to `out`. */
  look(x: number, y: number, z: number, out: Float64Array): void {
    this.lookClear(x, y, z, out);
    if (this.light.overcast > 0) this.cloudOver(x, y, z, out);
    else this.addClouds(x, y, z, out);
    if (this.light.visibility < 400) this.fogOver(x, y, z, out);
  }

  /** Fog some 90 m deep hides the sky as it hides the houses. */
  private fogOver(x: number, y: number, z: number, out: Float64Array): void {
    const through = Math.exp(-90 / (Math.max(0.01, y) * this.light.visibility));
    this.air(x, z, this.fog);
    for (let c = 0; c < 3; c++) out[c] = this.fog[c]! + (out[c]! - this.fog[c]!) * through;
  }

  /** The same from a prepared table: quick and slightly soft, for reflections. */
  glance(x: number, y: number, z: number, out: Float64Array): void {
    const azimuth = (Math.atan2(x, z) / TURN + 1) % 1;
    const rise = Math.sqrt(clamp(Math.asin(clamp(y, 0, 1)) / (Math.PI / 2), 0, 1));
    sample(this.dome, DOME_AROUND, DOME_UP, azimuth, rise, out);
  }

  /** Light scattered into a long level view in this direction: the colour of distance. */
  air(x: number, z: number, out: Float64Array): void {
    const flat = Math.hypot(x, z) || 1;
    this.lookClear((x / flat) * 0.999, 0.045, (z / flat) * 0.999, out);
    if (this.light.overcast > 0) this.cloudOver(x, 0.03, z, out);
  }

  private lookClear(x: number, y: number, z: number, out: Float64Array): void {
    const azimuth = (Math.atan2(x, z) / TURN + 1) % 1;
    const rise = Math.sqrt(clamp(Math.asin(clamp(y, 0, 1)) / (Math.PI / 2), 0, 1));
    sample(this.clear, AROUND, UP, azimuth, rise, out);
  }

  private fillClear(): void {
    for (let j = 0; j < UP; j++) {
      const elevation = (j / (UP - 1)) ** 2 * 90;
      for (let i = 0; i < AROUND; i++) {
        const view = direction((i / AROUND) * 360, elevation);
        const colour = clearSky(view, this.sun, this.light.haze);
        // The glow a city throws on its own sky, strongest low down.
        const glow = this.light.lamps * 0.00003 * (0.3 + Math.exp(-elevation / 14));
        this.clear.set([colour[0] + glow * 1.2, colour[1] + glow * 0.9, colour[2] + glow * 0.8], (j * AROUND + i) * 3);
      }
    }
  }

  private fillDome(): void {
    for (let j = 0; j < DOME_UP; j++) {
      const elevation = (j / (DOME_UP - 1)) ** 2 * 90;
      for (let i = 0; i < DOME_AROUND; i++) {
        const [x, y, z] = direction((i / DOME_AROUND) * 360, elevation);
        this.look(x, y, z, this.out);
        this.dome.set(this.out, (j * DOME_AROUND + i) * 3);
      }
    }
  }

  /** A closed sky: brighter overhead than at the horizon (after the CIE overcast sky, 1 to 3), with soft lumps. */
  private cloudOver(x: number, y: number, z: number, out: Float64Array): void {
    const e = Math.max(0, y);
    const u = (x / (e + 0.22)) * 0.9 + this.shift;
    const v = (z / (e + 0.22)) * 0.9;
    const lumps = this.light.clouds > 0 ? (fractal(u, v, 5) - 0.5) * 1.1 + (fractal(u * 3.1, v * 3.1, 4) - 0.5) * 0.3 : 0;
    const towardsSun = x * this.sun[0] + y * this.sun[1] + z * this.sun[2];
    const level = 0.05 * (0.5 + 0.62 * Math.min(1, e * 1.4)) * (1 + 0.22 * towardsSun) * (1 + lumps * ramp(e, 0, 0.3));
    const over = this.light.overcast;
    out[0] = out[0]! * (1 - over) + level * 0.97 * over;
    out[1] = out[1]! * (1 - over) + level * 1.0 * over;
    out[2] = out[2]! * (1 - over) + level * 1.06 * over;
  }

  private addClouds(x: number, y: number, z: number, out: Float64Array): void {
    const e = Math.max(0, y);
    const u = x / (e + 0.075) + this.shift;
    const v = z / (e + 0.075);
    const sunward = Math.max(0, x * this.sun[0] + y * this.sun[1] + z * this.sun[2]);
    this.addVeil(u, v, e, sunward, out);
    const cover = this.light.clouds;
    if (cover <= 0) return;
    const here = cumulus(u, v);
    const edge = 0.74 - cover * 0.5;
    const body = ramp(here, edge, edge + 0.16);
    if (body <= 0) return;
    // Thickness towards the sun tells the lit rim from the grey heart.
    const step = 0.16;
    const beside = cumulus(u + this.sun[0] * step, v + this.sun[2] * step);
    const thick = ramp(here, edge + 0.02, edge + 0.34);
    const lit = clamp(0.62 + (here - beside) * 3.4 - thick * 0.42, 0.06, 1);
    const bright = lit * (0.11 + 0.5 * sunward ** 24 * (1 - thick)) * ramp(this.light.sunElevation, -6, 2);
    const alpha = body * ramp(e, 0.0, 0.11) * 0.94;
    for (let c = 0; c < 3; c++) {
      const under = out[c]!;
      const cloud = this.cloudlight[c]! * bright + under * (0.5 + 0.25 * lit);
      out[c] = under + (cloud - under) * alpha;
    }
  }

  /** High ice cloud: long streaks that take the last colour of the sun. */
  private addVeil(u: number, v: number, e: number, sunward: number, out: Float64Array): void {
    const warp = noise(u * 0.35 + 9, v * 0.35) * 1.6;
    const streak = fractal(u * 0.42 + v * 0.3 + warp, v * 1.15 - u * 0.25 + warp * 0.6, 5);
    const alpha = ramp(streak, 0.36, 0.78) * this.light.veil * ramp(e, 0.005, 0.16) * 0.75;
    if (alpha <= 0) return;
    const strength = 0.07 + 0.26 * sunward ** 10;
    for (let c = 0; c < 3; c++) {
      const under = out[c]!;
      out[c] = under + (this.cloudlight[c]! * strength * ramp(this.light.sunElevation, -5, 1.5) + under * 0.35) * alpha;
    }
  }
}

/** Clouds gather light from all around: their colour is less pure than the sun's. */
function paler(c: Colour): Colour {
  const grey = (c[0] + c[1] + c[2]) / 3;
  return [c[0] * 0.62 + grey * 0.38, c[1] * 0.62 + grey * 0.38, c[2] * 0.62 + grey * 0.38];
}

function cumulus(u: number, v: number): number {
  const warp = noise(u * 0.9 + 3, v * 0.9) * 0.5;
  return fractal(u * 0.62 + warp, v * 0.62 - warp, 6);
}

/** Reads a table that closes on itself sideways, between its points. */
function sample(table: Float32Array, width: number, height: number, s: number, t: number, out: Float64Array): void {
  const x = s * width;
  const y = t * (height - 1);
  const xi = Math.floor(x);
  const yi = Math.min(height - 2, Math.floor(y));
  const fx = x - xi;
  const fy = y - yi;
  const a = (yi * width + (xi % width)) * 3;
  const b = (yi * width + ((xi + 1) % width)) * 3;
  const down = width * 3;
  for (let c = 0; c < 3; c++) {
    const top = table[a + c]! + (table[b + c]! - table[a + c]!) * fx;
    const low = table[a + down + c]! + (table[b + down + c]! - table[a + down + c]!) * fx;
    out[c] = top + (low - top) * fy;
  }
}
