import { type Camera, mirrored, resized } from './camera.ts';
import { Lamplight } from './lamps.ts';
import type { Light } from './light.ts';
import type { Mesh } from './mesh.ts';
import { STRIDE, SURFACE } from './mesh.ts';
import { inPerspective } from './project.ts';
import { Raster } from './raster.ts';
import { SunShadow } from './shadow.ts';
import { Sky } from './sky.ts';
import { SkyPatches } from './skylight.ts';
import { Neighbours } from './trace.ts';
import type { Colour, Vec3 } from './vector.ts';

/** Everything that lights a scene, made once for a picture and its mirror. */
export interface Lighting {
  sky: Sky;
  shadow: SunShadow | null;
  patches: SkyPatches;
  neighbours: Neighbours;
  lamps: Lamplight;
  /** Light that ground and walls throw back. */
  bounce: Colour;
}

let last: { mesh: Mesh; light: Light; lighting: Lighting } | null = null;

/** The light over a scene; a second take from a step beside uses what the first one worked out. */
export function lightingFor(mesh: Mesh, camera: Camera, light: Light, seed: number): Lighting {
  if (last && last.mesh === mesh && last.light === light) return last.lighting;
  last = null;
  const lighting = lightUp(mesh, camera, light, seed);
  last = { mesh, light, lighting };
  return lighting;
}

/** Sets up the light over the part of the city that the camera sees. */
function lightUp(mesh: Mesh, camera: Camera, light: Light, seed: number): Lighting {
  const sky = new Sky(light, seed);
  const { centre, radius } = seen(mesh, camera);
  const patches = new SkyPatches(mesh, sky, centre, radius * 1.25 + 40);
  const up = Math.max(0, sky.sun[1]);
  const bounce: Colour = [0, 1, 2].map((c) => 0.2 * (patches.open[c]! * 0.6 + sky.sunlight[c]! * (0.35 * up + 0.06))) as unknown as Colour;
  const shines = sky.sunlight[0] > 1e-5 && sky.sun[1] > 0;
  return {
    sky,
    shadow: shines ? new SunShadow(mesh, sky.sun, centre, radius, 2560) : null,
    patches,
    neighbours: new Neighbours(mesh, sky, patches.open, centre, radius * 1.25 + 40),
    lamps: new Lamplight(mesh.lamps, light.lamps, patches.open[1]),
    bounce,
  };
}

/** The ball of ground and walls that fills the picture, without the last far bits. */
function seen(mesh: Mesh, camera: Camera): { centre: Vec3; radius: number } {
  const points: Vec3[] = [];
  for (const view of [resized(camera, 160), mirrored(resized(camera, 96), 0)]) {
    const raster = new Raster(view.width, view.height);
    raster.clear(0);
    raster.draw(inPerspective(mesh, view));
    raster.face.forEach((face, at) => {
      if (face < 0 || mesh.surfaces[mesh.faces[face * STRIDE + SURFACE]!]!.kind === 'water') return;
      const far = 1 / raster.near[at]!;
      if (far < 1400) points.push(pointAt(view, at, far));
    });
  }
  return ball(points.length > 0 ? points : [camera.position]);
}

function pointAt(camera: Camera, at: number, far: number): Vec3 {
  const rx = ((at % camera.width) + 0.5 - camera.centreX) / camera.focal;
  const ry = (camera.centreY - Math.floor(at / camera.width) - 0.5) / camera.focal;
  const along = (c: 0 | 1 | 2): number => camera.position[c] + (camera.right[c] * rx + camera.up[c] * ry + camera.forward[c]) * far;
  return [along(0), along(1), along(2)];
}

function ball(points: Vec3[]): { centre: Vec3; radius: number } {
  const range = (c: 0 | 1 | 2): [number, number] => {
    const sorted = points.map((p) => p[c]).sort((a, b) => a - b);
    return [sorted[Math.floor(sorted.length * 0.02)]!, sorted[Math.floor((sorted.length - 1) * 0.98)]!];
  };
  const [x0, x1] = range(0);
  const [y0, y1] = range(1);
  const [z0, z1] = range(2);
  const radius = Math.min(420, Math.max(40, Math.hypot(x1 - x0, y1 - y0, z1 - z0) / 2 + 12));
  return { centre: [(x0 + x1) / 2, (y0 + y1) / 2, (z0 + z1) / 2], radius };
}
