import type { CameraSetting } from './camera.ts';
import { type Light, type LightName, lights } from './light.ts';
import { Mesh } from './mesh.ts';
import { type Random, seeded } from './noise.ts';
import type { Subject } from './render.ts';

/** Shape of a frame: the sensor's 3:2 lying or standing, or cropped in the camera to 4:3. */
export type Format = 'landscape' | 'portrait' | 'four-thirds';

/** A place and an hour in Vessmouth, and where the camera stands. */
export interface Scene {
  name: string;
  /** What is to be seen, in words. */
  words: string;
  format: Format;
  camera: CameraSetting;
  light: LightName;
  /** Changes to that hour's light. */
  weather?: Partial<Light>;
  mirror: 'water' | 'wet' | null;
  seed: number;
  build(mesh: Mesh, random: Random): void;
}

/** How one take of a scene differs from its plan. */
export interface Variation {
  /** Step to the right, up and forward, in metres. */
  step?: readonly [number, number, number];
  /** Turn of the camera about its axis, in degrees. */
  roll?: number;
}

const WATER_LEVEL = -2.2;

/** Builds a scene ready to be rendered. */
export function subjectOf(scene: Scene, variation: Variation = {}): Subject {
  const mesh = new Mesh();
  scene.build(mesh, seeded(scene.seed));
  const [x, y, z] = scene.camera.position;
  const step = variation.step ?? [0, 0, 0];
  const light: Light = { ...lights[scene.light], ...scene.weather };
  return {
    mesh,
    light,
    camera: { ...scene.camera, position: [x + step[0], y + step[1], z + step[2]], roll: variation.roll ?? scene.camera.roll },
    mirror: scene.mirror === null ? null : { level: scene.mirror === 'water' ? WATER_LEVEL : 0, wet: scene.mirror === 'wet' },
    seed: scene.seed,
  };
}

/** A level camera: most of what is left out is zero. */
export const level = (position: CameraSetting['position'], focal: number, rest: Partial<CameraSetting> = {}): CameraSetting => ({ position, focal, yaw: 0, pitch: 0, roll: 0, rise: 0, ...rest }); // prettier-ignore
