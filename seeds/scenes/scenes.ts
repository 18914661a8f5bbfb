import { bridgeScenes } from './bridge-scenes.ts';
import { exchangeScenes } from './exchange-scenes.ts';
import { libraryScenes } from './library-scenes.ts';
import type { Scene } from './scene.ts';
import { skylineScenes } from './skyline-scenes.ts';

/** All scenes of Vessmouth, by commission. */
export const scenes: readonly Scene[] = [...libraryScenes, ...bridgeScenes, ...skylineScenes, ...exchangeScenes];

/** The scene of that name. */
export function sceneNamed(name: string): Scene {
  const scene = scenes.find((each) => each.name === name);
  if (!scene) throw new Error(`There is no scene called ${name}.`);
  return scene;
}
