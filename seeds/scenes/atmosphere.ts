import { type Colour, dot, luminance, mix, ramp, type Vec3 } from './vector.ts';

/**
 * Single scattering in a clear atmosphere, with ozone, plus a share of light scattered more than once. Coefficients per
 * metre at sea level are those in common use for rendered skies (from memory): Rayleigh 5.8/13.5/33.1e-6, Mie 4e-6 at
 * clear air, ozone absorption 0.65/1.88/0.085e-6 around 25 km.
 */
const PLANET = 6_360_000;
const TOP = 6_460_000;
const RAYLEIGH: Colour = [5.8e-6, 13.5e-6, 33.1e-6];
const OZONE: Colour = [0.65e-6, 1.881e-6, 0.085e-6];
const MIE = 4e-6;
const VIEW_STEPS = 20;
const LIGHT_STEPS = 8;

/** Where a ray from radius `r` with upward slope `mu` leaves a sphere of radius `R`, or -1 where it misses. */
function exit(r: number, mu: number, R: number): number {
  const under = R * R - r * r * (1 - mu * mu);
  return under < 0 ? -1 : -r * mu + Math.sqrt(under);
}

/** Optical depth from a point to the top of the air along slope `mu`. */
function depth(r: number, mu: number, haze: number, out: Float64Array): void {
  const step = exit(r, mu, TOP) / LIGHT_STEPS;
  let [rayleigh, mie, ozone] = [0, 0, 0];
  for (let i = 0; i < LIGHT_STEPS; i++) {
    const t = (i + 0.5) * step;
    const height = Math.max(0, Math.sqrt(r * r + t * t + 2 * r * mu * t) - PLANET);
    rayleigh += Math.exp(-height / 8000) * step;
    mie += Math.exp(-height / 1200) * step;
    ozone += Math.max(0, 1 - Math.abs(height - 25000) / 15000) * step;
  }
  for (let c = 0; c < 3; c++) out[c] = RAYLEIGH[c]! * rayleigh + MIE * haze * 1.1 * mie + OZONE[c]! * ozone;
}

const scratch = new Float64Array(3);

/** Share of sunlight that reaches height `metres` from elevation `sun[1]`; nothing once the earth is in the way. */
export function sunThroughAir(sun: Vec3, metres: number, haze: number): Colour {
  const r = PLANET + metres;
  const horizon = -Math.sqrt(1 - (PLANET / r) ** 2);
  if (sun[1] < horizon - 0.01) return [0, 0, 0];
  depth(r, Math.max(sun[1], horizon + 1e-4), haze, scratch);
  const fade = Math.min(1, (sun[1] - horizon + 0.01) / 0.02);
  return [Math.exp(-scratch[0]!) * fade, Math.exp(-scratch[1]!) * fade, Math.exp(-scratch[2]!) * fade];
}

/** Light of the clear sky in a direction, for a sun of strength 1. `haze` is 1 in clear air, 4 in a milky one. */
export function clearSky(view: Vec3, sun: Vec3, haze: number): Colour {
  const mu = Math.max(view[1], 0.012);
  const r0 = PLANET + 20;
  const far = exit(r0, mu, TOP);
  const cosine = dot(view, sun);
  const rayleighPhase = 0.0597 * (1 + cosine * cosine);
  const g = 0.76;
  const miePhase = (0.0796 * (1 - g * g)) / (1 + g * g - 2 * g * cosine) ** 1.5;
  const sum = [0, 0, 0];
  const through = [0, 0, 0];
  for (let i = 0; i < VIEW_STEPS; i++) {
    // Steps grow with distance: most of the air is near.
    const near = (i / VIEW_STEPS) ** 2 * far;
    const step = ((i + 1) / VIEW_STEPS) ** 2 * far - near;
    const t = near + step / 2;
    const r = Math.sqrt(r0 * r0 + t * t + 2 * r0 * mu * t);
    const height = Math.max(0, r - PLANET);
    const rayleigh = Math.exp(-height / 8000);
    const mie = Math.exp(-height / 1200) * haze;
    const ozone = Math.max(0, 1 - Math.abs(height - 25000) / 15000);
    const slope = (r0 * sun[1] + t * cosine) / r;
    const light = sunAt(r, slope, haze);
    for (let c = 0; c < 3; c++) {
      const lost = RAYLEIGH[c]! * rayleigh + MIE * 1.1 * mie + OZONE[c]! * ozone;
      const scattered = RAYLEIGH[c]! * rayleigh * (rayleighPhase + 0.085) + MIE * mie * (miePhase + 0.055);
      sum[c]! += Math.exp(-through[c]! - (lost * step) / 2) * scattered * light[c]! * step;
      through[c]! += lost * step;
    }
  }
  return twilight([sum[0]!, sum[1]!, sum[2]!], view, sun);
}

/**
 * Near and after sunset most light has been scattered twice or more and crossed the ozone, which single scattering does
 * not know: away from the glow over the sun it turns blue.
 */
function twilight(sky: Colour, view: Vec3, sun: Vec3): Colour {
  const late = 1 - ramp(sun[1], -0.06, 0.12);
  const flat = Math.hypot(sun[0], sun[2]) * Math.hypot(view[0], view[2]) || 1;
  const towards = Math.max(0, (view[0] * sun[0] + view[2] * sun[2]) / flat);
  const glow = Math.exp(-Math.max(0, view[1]) / 0.16) * towards ** 3;
  // A low sun's sky comes out greenish otherwise.
  const rosy: Colour = [sky[0], sky[1] * (1 - 0.1 * (1 - ramp(sun[1], 0.1, 0.34))), sky[2]];
  const k = late * (0.9 - 0.62 * glow);
  // What is left all around the sky: a tenth for each five degrees under the horizon (an order of magnitude, from memory).
  const degrees = (Math.asin(sun[1]) * 180) / Math.PI;
  const rest = 10 ** (-3.1 + Math.min(0, degrees) * 0.2) * (1 - 0.35 * view[1]);
  const level = luminance(sky[0], sky[1], sky[2]) * 1.1 + rest;
  const blue: Colour = [level * 0.52, level * 0.8, level * 1.55];
  return mix(rosy, blue, k);
}

function sunAt(r: number, slope: number, haze: number): Colour {
  const horizon = -Math.sqrt(Math.max(0, 1 - (PLANET / r) ** 2));
  // The soft edge of the earth's shadow, wider than the sun to stand for light scattered twice.
  const lit = Math.min(1, Math.max(0, (slope - horizon + 0.05) / 0.06));
  if (lit === 0) return [0, 0, 0];
  depth(r, Math.max(slope, horizon + 1e-4), haze, scratch);
  return [Math.exp(-scratch[0]!) * lit, Math.exp(-scratch[1]!) * lit, Math.exp(-scratch[2]!) * lit];
}
