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

/** What was built last: takes of one place follow each other, and a city costs time. */
let built: { build: Scene['build']; seed: number; mesh: Mesh } | null = null;
const weathers = new Map<string, Light>();

function cityOf({ build, seed }: Scene): Mesh {
  if (built && built.build === build && built.seed === seed) return built.mesh;
  const mesh = new Mesh();
  build(mesh, seeded(seed));
  built = { build, seed, mesh };
  return mesh;
}

function lightOver(scene: Scene): Light {
  const light = weathers.get(scene.name) ?? { ...lights[scene.light], ...scene.weather };
  weathers.set(scene.name, light);
  return light;
}

/** Builds a scene ready to be rendered. Takes of one scene share their mesh and light. */
export function subjectOf(scene: Scene, variation: Variation = {}): Subject {
  const mesh = cityOf(scene);
  const [x, y, z] = scene.camera.position;
  const step = variation.step ?? [0, 0, 0];
  const light = lightOver(scene);
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
