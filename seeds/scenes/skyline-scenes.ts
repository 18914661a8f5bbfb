import { boat, dockCrane, ground, sea, towerCrane } from './harbour.ts';
import { cornExchange, tidalTower } from './landmarks.ts';
import type { Mesh } from './mesh.ts';
import type { Random } from './noise.ts';
import { level, type Scene } from './scene.ts';
import { bareTree, lampPost, railing, walker } from './street.ts';
import { stuff } from './styles.ts';
import { district, mixes, row } from './town.ts';

/** The city behind its harbour, water before it. */
function harbour(mesh: Mesh, random: Random): void {
  sea(mesh);
  ground(mesh, -1200, 215, 1200, 2200, stuff.slabs);
  ground(mesh, -190, 168, -96, 216, stuff.setts);
  row(mesh, -420, 420, 236, mixes.quayside, random);
  district(mesh, -380, 380, 278, 330, mixes.old, random);
  district(mesh, -340, 340, 350, 440, mixes.centre, random);
  district(mesh, -300, 330, 470, 640, mixes.towers, random);
  district(mesh, -620, 620, 700, 800, mixes.centre, random);
  mesh.at({ x: 58, z: 430 }, () => tidalTower(mesh));
  mesh.at({ x: -72, z: 300 }, () => cornExchange(mesh));
  waterfront(mesh, random);
}

function waterfront(mesh: Mesh, random: Random): void {
  for (let x = -180; x <= -104; x += 26) dockCrane(mesh, x, 180, Math.PI + 0.3 * random());
  towerCrane(mesh, 176, 400, 2.1, 74);
  towerCrane(mesh, -210, 470, 0.7, 88);
  for (let x = -320; x < 320; x += 18) {
    lampPost(mesh, x, 219, 6);
    if (random() < 0.6) bareTree(mesh, x + 9, 225, 8 + random() * 4, random);
  }
  for (let i = 0; i < 16; i++)
    boat(mesh, -80 + i * 15 + random() * 8, 205 + random() * 7, Math.PI / 2 + (random() - 0.5) * 0.2, 8 + random() * 9, random);
  boat(mesh, 24, 96, 1.2, 12, random);
  boat(mesh, -46, 138, -1.3, 17, random);
  for (let i = 0; i < 24; i++) walker(mesh, -150 + random() * 300, 217 + random() * 8, random() * 6.3, i + 300);
}

/** From a roof in the middle of the old town. */
function roofs(mesh: Mesh, random: Random): void {
  sea(mesh);
  ground(mesh, -900, -120, 900, 620, stuff.asphalt);
  ground(mesh, -900, 760, 900, 1500, stuff.slabs);
  mesh.box([-16, 0, -40], [16, 40, -1.2], stuff.concrete, stuff.gravel);
  district(mesh, -320, 320, 24, 250, mixes.old, random);
  district(mesh, -330, 330, 265, 400, mixes.centre, random);
  district(mesh, -330, 330, 440, 560, mixes.towers, random);
  mesh.at({ x: -52, z: 130 }, () => cornExchange(mesh));
  mesh.at({ x: 92, z: 470 }, () => tidalTower(mesh));
  district(mesh, -420, 420, 780, 860, mixes.docks, random);
  for (let x = -200; x < 220; x += 20) for (let z = 16; z < 240; z += 40) lampPost(mesh, x, z, 6);
}

/** The outer docks: sheds, cranes, a mole. */
function docks(mesh: Mesh, random: Random): void {
  sea(mesh);
  ground(mesh, -400, 60, 400, 900, stuff.setts);
  for (const [x, z] of [
    [-44, 68],
    [-8, 70],
    [34, 69],
    [80, 74],
  ])
    dockCrane(mesh, x!, z!, Math.PI + (random() - 0.5) * 0.8, random() < 0.5 ? stuff.green : stuff.rail);
  row(mesh, -160, 180, 92, mixes.docks, random);
  row(mesh, -160, 180, 150, mixes.quayside, random);
  for (let x = -70; x < 120; x += 22) boat(mesh, x + random() * 6, 55, Math.PI / 2, 11 + random() * 9, random);
  for (let x = -100; x < 140; x += 17) lampPost(mesh, x, 63, 6);
  railing(mesh, [-12, 0, -1], [30, 0, -1]);
  mesh.box([-200, -6, -30], [200, 0, -0.6], stuff.quay, stuff.setts);
  for (let i = 0; i < 5; i++) walker(mesh, -30 + random() * 80, 61 + random() * 5, random() * 6.3, i + 500);
}

export const skylineScenes: Scene[] = [
  { name: 'skyline-dusk', words: 'Vessmouth across the harbour, after sunset', format: 'landscape', camera: level([0, 4, -30], 34, { rise: 3.4, yaw: 2 }), light: 'dusk', mirror: 'water', seed: 31, build: harbour },
  { name: 'skyline-blue', words: 'City lights on the harbour', format: 'landscape', camera: level([50, 3.5, 10], 48, { rise: 2.6, yaw: -3 }), light: 'blue', weather: { sunAzimuth: 15, sunElevation: -5.6, key: 0.068 }, mirror: 'water', seed: 31, build: harbour },
  { name: 'skyline-long', words: 'Towers through a long lens, evening haze', format: 'landscape', camera: level([-60, 24, -460], 150, { pitch: 1.6, yaw: 5.5 }), light: 'gold', weather: { sunAzimuth: 244, sunElevation: 8, visibility: 2600 }, mirror: 'water', seed: 31, build: harbour },
  { name: 'skyline-against', words: 'Skyline against the light', format: 'landscape', camera: level([-30, 4, 0], 35, { rise: 3, yaw: 4 }), light: 'day', weather: { sunAzimuth: 8, sunElevation: 24, clouds: 0.3, haze: 3, visibility: 2600 }, mirror: 'water', seed: 31, build: harbour },
  { name: 'roofs-dusk', words: 'Over the roofs of the old town', format: 'landscape', camera: level([0, 43, -1.5], 28, { pitch: -5 }), light: 'dusk', weather: { sunAzimuth: 340, sunElevation: -2.4, rooms: 0.8 }, mirror: 'water', seed: 34, build: roofs },
  { name: 'skyline-morning', words: 'Skyline with moving clouds, morning', format: 'landscape', camera: level([20, 3, -12], 40, { rise: 3 }), light: 'morning', weather: { sunAzimuth: 122, sunElevation: 22, clouds: 0.6, visibility: 5000 }, mirror: 'water', seed: 31, build: harbour },
  { name: 'docks-fog', words: 'Cranes in the fog', format: 'four-thirds', camera: level([8, 2.2, -6], 50, { rise: 4.5 }), light: 'fog', weather: { visibility: 130 }, mirror: 'water', seed: 37, build: docks },
]; // prettier-ignore
