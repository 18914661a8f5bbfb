import type { Camera } from './camera.ts';
import type { Light } from './light.ts';
import { material } from './material.ts';
import { type Mesh, NORMAL, SEED, STRIDE, SURFACE, U_AXIS, U_LENGTH, U_START, V_LENGTH, V_START } from './mesh.ts';
import type { MirrorPicture } from './mirror.ts';
import { hash } from './noise.ts';
import type { Skylight } from './skylight.ts';
import { Spot } from './spot.ts';
import type { Lighting } from './view.ts';
import { type Meeting, water, wetGround } from './water.ts';
import type { Vec3 } from './vector.ts';

const AIR = 256;

/** Works out what light comes from a face seen at one point of the picture. */
export class Shader {
  private readonly spot = new Spot();
  private readonly normal: [number, number, number] = [0.5, 0.5, 0.5];
  private readonly sum = new Float64Array(3);
  private readonly extra = new Float64Array(3);
  private readonly air = new Float32Array(AIR * 3);
  private readonly meeting: Meeting = { x: 0.5, y: 0.5, z: 0.5, dx: 0.5, dy: 0.5, dz: 0.5, away: 0.5, foot: 0.5, s: 0.5, t: 0.5 };

  constructor(
    private readonly mesh: Mesh,
    private readonly camera: Camera,
    private readonly light: Light,
    private readonly lighting: Lighting,
    private readonly skylight: Skylight,
    private readonly mirror: MirrorPicture | null,
    private readonly wet: boolean,
    /** Panes show the sky alone: enough for what waves will break up. */
    private readonly quick = false,
  ) {
    for (let i = 0; i < AIR; i++) {
      const angle = ((i + 0.5) / AIR) * Math.PI * 2;
      lighting.sky.air(Math.sin(angle), Math.cos(angle), this.sum);
      this.fillAir(i);
    }
    this.spot.rooms = light.rooms;
  }

  /**
   * Radiance of face `id` at picture position (px, py) in pixels, written to `out`.
   *
   * @param away distance along the view's axis
   * @param ray  direction of sight, scaled so that its share along the axis is 1
   */
  shade(id: number, px: number, py: number, away: number, ray: Vec3, out: Float64Array): void {
    const { faces, surfaces } = this.mesh;
    const f = id * STRIDE;
    const surface = surfaces[faces[f + SURFACE]!]!;
    const eye = this.camera.position;
    const x = eye[0] + ray[0] * away;
    const y = eye[1] + ray[1] * away;
    const z = eye[2] + ray[2] * away;
    const long = Math.sqrt(ray[0] * ray[0] + ray[1] * ray[1] + ray[2] * ray[2]);
    const dx = ray[0] / long;
    const dy = ray[1] / long;
    const dz = ray[2] / long;
    const s = px / this.camera.width;
    const t = py / this.camera.height;
    if (surface.kind === 'water') {
      if (!this.mirror) out.fill(0);
      else {
        this.meet(x, y, z, dx, dy, dz, away, s, t);
        const { open } = this.lighting.patches;
        const c = surface.colour;
        const body: Vec3 = [c[0] * open[0], c[1] * open[1], c[2] * open[2]];
        water(this.meeting, this.mirror, this.lighting.sky, body, this.light.wind, out);
      }
      return this.throughAir(away * long, y, dx, dz, out);
    }
    const n = this.normal;
    const towards = faces[f + NORMAL]! * dx + faces[f + NORMAL + 1]! * dy + faces[f + NORMAL + 2]! * dz;
    const side = towards > 0 ? -1 : 1;
    for (let c = 0; c < 3; c++) n[c] = faces[f + NORMAL + c]! * side;
    this.prepare(f, x, y, z, dx, dy, dz, -Math.abs(towards), away * long);
    material(this.spot, surface);
    this.illuminate(id, surface.kind === 'leaf', x, y, z, s, t, out);
    if (this.spot.glass > 0) this.reflect(x, y, z, dx, dy, dz, -Math.abs(towards), out);
    if (this.wet && this.mirror && n[1] > 0.9 && y < 0.3) {
      this.meet(x, y, z, dx, dy, dz, away, s, t);
      wetGround(this.meeting, this.mirror, this.lighting.sky, out);
    }
    this.throughAir(away * long, y, dx, dz, out);
  }

  /** Puts the point into the face's own axes. */
  private prepare(f: number, x: number, y: number, z: number, dx: number, dy: number, dz: number, facing: number, distance: number): void {
    const { faces } = this.mesh;
    const { spot, normal: n } = this;
    const sun = this.lighting.sky.sun;
    const ux = faces[f + U_AXIS]!;
    const uy = faces[f + U_AXIS + 1]!;
    const uz = faces[f + U_AXIS + 2]!;
    // v is at right angles to the stored normal, not to the one turned to the eye.
    const mx = faces[f + NORMAL]!;
    const my = faces[f + NORMAL + 1]!;
    const mz = faces[f + NORMAL + 2]!;
    const vx = my * uz - mz * uy;
    const vy = mz * ux - mx * uz;
    const vz = mx * uy - my * ux;
    spot.u = x * ux + y * uy + z * uz - faces[f + U_START]!;
    spot.v = x * vx + y * vy + z * vz - faces[f + V_START]!;
    spot.uLength = faces[f + U_LENGTH]!;
    spot.vLength = faces[f + V_LENGTH]!;
    spot.seed = faces[f + SEED]!;
    spot.rayU = dx * ux + dy * uy + dz * uz;
    spot.rayV = dx * vx + dy * vy + dz * vz;
    spot.rayN = facing;
    spot.sunU = sun[0] * ux + sun[1] * uy + sun[2] * uz;
    spot.sunV = sun[0] * vx + sun[1] * vy + sun[2] * vz;
    spot.sunN = sun[0] * n[0] + sun[1] * n[1] + sun[2] * n[2];
    const foot = distance / this.camera.focal;
    const slant = Math.max(0.02, -facing);
    const uShare = Math.abs(spot.rayU) / Math.max(1e-3, Math.sqrt(spot.rayU * spot.rayU + spot.rayV * spot.rayV));
    spot.footU = foot * (1 + (1 / slant - 1) * uShare);
    spot.footV = foot * (1 + (1 / slant - 1) * (1 - uShare));
  }

  private illuminate(id: number, leaf: boolean, x: number, y: number, z: number, s: number, t: number, out: Float64Array): void {
    const { spot, normal: n, sum, lighting } = this;
    this.skylight.at(s, t, id, n, sum);
    const sky = spot.sky;
    sum[0]! *= sky;
    sum[1]! *= sky;
    sum[2]! *= sky;
    // Leaves let light through: they glow against the sun.
    const facing = leaf ? Math.max(0.25, spot.sunN, -spot.sunN * 0.6) : spot.sunN;
    if (lighting.shadow && facing > 0 && spot.sun > 0) {
      const turn = hash((x * 613) | 0, (y * 613) | 0, (z * 613) | 0);
      const lit = lighting.shadow.lit(x + n[0] * 0.05, y + n[1] * 0.05, z + n[2] * 0.05, turn);
      const k = facing * lit * spot.sun;
      const c = lighting.sky.sunlight;
      sum[0]! += c[0] * k;
      sum[1]! += c[1] * k;
      sum[2]! += c[2] * k;
    }
    lighting.lamps.add(x, y, z, n, sum);
    out[0] = (spot.r * sum[0]!) / Math.PI + spot.glowR;
    out[1] = (spot.g * sum[1]!) / Math.PI + spot.glowG;
    out[2] = (spot.b * sum[2]!) / Math.PI + spot.glowB;
  }

  /** What a pane adds: sky or neighbours, each pane standing a little out of true. */
  private reflect(x: number, y: number, z: number, dx: number, dy: number, dz: number, facing: number, out: Float64Array): void {
    const { spot, normal: n, extra } = this;
    const tilt = spot.pane === 0 ? 0 : 0.012;
    const bend = tilt * 0.25;
    const a = (hash(spot.pane, 1, 1) - 0.5) * 2 * tilt + Math.sin(spot.u * 2.1 + spot.pane) * bend;
    const b = (hash(spot.pane, 2, 1) - 0.5) * 2 * tilt + Math.sin(spot.v * 1.7 + spot.pane) * bend;
    let rx = dx - 2 * facing * n[0] + a * n[2];
    let ry = dy - 2 * facing * n[1] + b;
    let rz = dz - 2 * facing * n[2] - a * n[0];
    const l = 1 / Math.sqrt(rx * rx + ry * ry + rz * rz);
    rx *= l;
    ry *= l;
    rz *= l;
    if (this.quick) this.lighting.sky.glance(rx, ry, rz, extra);
    else this.lighting.neighbours.reflect(x + n[0] * 0.6, y, z + n[2] * 0.6, rx, ry, rz, extra);
    const grazing = (1 + facing) * (1 + facing);
    const fresnel = spot.mirror + (1 - spot.mirror) * grazing * grazing * (1 + facing);
    const k = spot.glass * fresnel;
    out[0] = out[0]! * (1 - k * 0.5) + extra[0]! * k;
    out[1] = out[1]! * (1 - k * 0.5) + extra[1]! * k;
    out[2] = out[2]! * (1 - k * 0.5) + extra[2]! * k;
  }

  private throughAir(distance: number, y: number, dx: number, dz: number, out: Float64Array): void {
    const height = Math.max(0, (y + this.camera.position[1]) / 2);
    const thickness = this.light.overcast > 0 && this.light.visibility < 400 ? Math.exp(-height / 90) : Math.exp(-height / 220);
    const through = Math.exp((-distance * thickness) / this.light.visibility);
    const at = (((Math.atan2(dx, dz) / (Math.PI * 2) + 1) % 1) * AIR) | 0;
    for (let c = 0; c < 3; c++) out[c] = out[c]! * through + this.air[at * 3 + c]! * (1 - through);
  }

  /**
   * The air of a few streets is lit by the whole sky; only over many miles does it take the colour of the horizon
   * behind it.
   */
  private fillAir(i: number): void {
    const { open } = this.lighting.patches;
    const mean = (open[0] + open[1] + open[2]) / 3 / Math.PI;
    const level = (this.sum[0]! + this.sum[1]! + this.sum[2]!) / 3;
    const far = this.light.overcast > 0 ? 1 : 0.6;
    const tame = Math.min(level, 1.6 * mean) * far;
    const { sunlight } = this.lighting.sky;
    const sun = sunlight[0] + sunlight[1] + sunlight[2] + 1e-9;
    // Haze near by is lit by the sun itself as much as by the sky.
    const share = this.light.overcast > 0 ? 0 : Math.min(0.5, sun * 2);
    for (let c = 0; c < 3; c++) {
      const colour = (this.sum[c]! / (level + 1e-9)) * (1 - share) + ((sunlight[c]! * 3) / sun) * share;
      this.air[i * 3 + c] = (colour * tame + (open[c]! / Math.PI) * (1 - far)) * 1.05;
    }
  }

  private meet(x: number, y: number, z: number, dx: number, dy: number, dz: number, away: number, s: number, t: number): void {
    const m = this.meeting;
    m.x = x;
    m.y = y;
    m.z = z;
    m.dx = dx;
    m.dy = dy;
    m.dz = dz;
    m.away = away;
    m.foot = away / this.camera.focal;
    m.s = s;
    m.t = t;
  }
}
