import { add, cross, scale, unit, type Vec3 } from './vector.ts';

/** How a camera is set up. Angles in degrees; the sensor measures 36 mm along its longer side. */
export interface CameraSetting {
  position: Vec3;
  /** 0 looks along +z, positive to the right. */
  yaw: number;
  pitch: number;
  /** Positive turns the horizon clockwise in the picture. */
  roll: number;
  /** Focal length in mm on a sensor 36 mm wide. */
  focal: number;
  /** Vertical shift of the lens in mm: shows more above without tilting, so that uprights stay upright. */
  rise: number;
}

/** A camera ready to project: axes, and the picture's scale in pixels. */
export interface Camera {
  position: Vec3;
  right: Vec3;
  up: Vec3;
  forward: Vec3;
  /** Pixels per unit of slope, and the pixel straight ahead. */
  focal: number;
  centreX: number;
  centreY: number;
  width: number;
  height: number;
}

const radians = (degrees: number): number => (degrees * Math.PI) / 180;

/** Sets a camera up for a picture of the given size. */
export function aim(setting: CameraSetting, width: number, height: number): Camera {
  const yaw = radians(setting.yaw);
  const pitch = radians(setting.pitch);
  const roll = radians(setting.roll);
  const forward: Vec3 = [Math.sin(yaw) * Math.cos(pitch), Math.sin(pitch), Math.cos(yaw) * Math.cos(pitch)];
  const level: Vec3 = [Math.cos(yaw), 0, -Math.sin(yaw)];
  const upright = cross(forward, level);
  const right = unit(add(scale(level, Math.cos(roll)), scale(upright, Math.sin(roll))));
  const up = cross(forward, right);
  const pixelsPerMillimetre = Math.max(width, height) / 36;
  return {
    position: setting.position,
    right,
    up,
    forward,
    focal: setting.focal * pixelsPerMillimetre,
    centreX: width / 2,
    centreY: height / 2 + setting.rise * pixelsPerMillimetre,
    width,
    height,
  };
}

/** The same camera for a picture of another size. */
export function resized(camera: Camera, width: number): Camera {
  const k = width / camera.width;
  return {
    ...camera,
    focal: camera.focal * k,
    centreX: camera.centreX * k,
    centreY: camera.centreY * k,
    width,
    height: Math.round(camera.height * k),
  };
}

/** The camera as seen in a level mirror at height `level`: its picture lines up with the real one, pixel by pixel. */
export function mirrored(camera: Camera, level: number): Camera {
  const flip = (v: Vec3): Vec3 => [v[0], -v[1], v[2]];
  const [x, y, z] = camera.position;
  return {
    ...camera,
    position: [x, 2 * level - y, z],
    right: flip(camera.right),
    up: flip(camera.up),
    forward: flip(camera.forward),
  };
}
