import { type Camera } from './camera.ts';
import type { Sky } from './sky.ts';
import { clamp } from './vector.ts';

/** The scene upside down, as a still surface at one level would show it; waves read it a little beside the straight place. */
export interface MirrorPicture {
  /** The mirrored camera's picture lines up with this one, at a smaller size. */
  camera: Camera;
  /** Linear light, three numbers a pixel. */
  light: Float32Array;
  /** Distance along the view's axis, in metres; 0 is sky. */
  far: Float32Array;
}

/**
 * Light from direction (dx, dy, dz), dy > 0, that meets the water at (x, y, z).
 *
 * @param away distance along the view's axis from the camera to the water
 */
export function readMirror(
  mirror: MirrorPicture,
  sky: Sky,
  x: number,
  y: number,
  z: number,
  dx: number,
  dy: number,
  dz: number,
  away: number,
  straight: number,
  out: Float64Array,
): void {
  const { camera, light, far } = mirror;
  const beyond = straight > 0 ? Math.max(2, straight - away) : 2000;
  const px = x + dx * beyond - camera.position[0];
  const py = y + dy * beyond - camera.position[1];
  const pz = z + dz * beyond - camera.position[2];
  const depth = px * camera.forward[0] + py * camera.forward[1] + pz * camera.forward[2];
  const sx = camera.centreX + (camera.focal * (px * camera.right[0] + py * camera.right[1] + pz * camera.right[2])) / depth;
  const sy = camera.centreY - (camera.focal * (px * camera.up[0] + py * camera.up[1] + pz * camera.up[2])) / depth;
  if (depth < 0.5 || sy < 0 || sy >= camera.height) return sky.glance(dx, dy, dz, out);
  const column = clamp(sx, 0, camera.width - 1.001);
  const at = (sy | 0) * camera.width + (column | 0);
  if (far[at] === 0 && (sx < 0 || sx >= camera.width)) return sky.glance(dx, dy, dz, out);
  out[0] = light[at * 3]!;
  out[1] = light[at * 3 + 1]!;
  out[2] = light[at * 3 + 2]!;
}

/** Distance of what a still surface would show at picture position (s, t) in 0..1. */
export function straightAt(mirror: MirrorPicture, s: number, t: number): number {
  const x = clamp((s * mirror.camera.width) | 0, 0, mirror.camera.width - 1);
  const y = clamp((t * mirror.camera.height) | 0, 0, mirror.camera.height - 1);
  return mirror.far[y * mirror.camera.width + x]!;
}
