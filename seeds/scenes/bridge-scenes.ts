import { archBridge, stayedBridge, swingBridge } from './bridges.ts';
import { boat, dockCrane, ground, sea } from './harbour.ts';
import { tidalTower } from './landmarks.ts';
import type { Mesh } from './mesh.ts';
import type { Random } from './noise.ts';
import { level, type Scene } from './scene.ts';
import { bareTree, bollard, lampPost, railing, walker } from './street.ts';
import { stuff } from './styles.ts';
import { district, mixes, streetSide } from './town.ts';

/** The basin runs along +z between two quays; three bridges cross it. */
const HALF = 40;

function basin(mesh: Mesh, random: Random): void {
  sea(mesh);
  ground(mesh, -500, -160, -HALF, 520, stuff.setts);
  ground(mesh, HALF, -160, 500, 520, stuff.setts);
  ground(mesh, -900, 430, 900, 1500, stuff.slabs);
  mesh.at({ x: 0, z: 62 }, () => archBridge(mesh, HALF * 2 + 2, 3, 11));
  mesh.at({ x: 0, z: 170 }, () => swingBridge(mesh, HALF * 2 + 4, 9));
  mesh.at({ x: 0, z: 270 }, () => stayedBridge(mesh, HALF * 2 + 4, 4.4));
  streetSide(mesh, -HALF - 17, -60, 410, 'left', mixes.quayside, random);
  streetSide(mesh, HALF + 17, -60, 410, 'right', mixes.quayside, random);
  streetSide(mesh, -HALF - 62, -60, 410, 'left', mixes.centre, random);
  streetSide(mesh, HALF + 62, -60, 410, 'right', mixes.centre, random);
  district(mesh, -240, 240, 450, 520, mixes.centre, random);
  district(mesh, -260, 260, 540, 660, mixes.towers, random);
  mesh.at({ x: 34, z: 560 }, () => tidalTower(mesh));
  quays(mesh, random);
}

function quays(mesh: Mesh, random: Random): void {
  for (let z = -48; z < 400; z += 15) {
    for (const s of [-1, 1]) {
      lampPost(mesh, s * (HALF + 3.5), z, 5.4);
      if (random() < 0.7) bareTree(mesh, s * (HALF + 8), z + 7, 8 + random() * 3, random);
      bollard(mesh, s * (HALF + 0.8), z + 3);
      bollard(mesh, s * (HALF + 0.8), z + 10);
    }
    if (random() < 0.6) boat(mesh, -HALF + 2.5, z + 4, 0, 7 + random() * 6, random);
    if (random() < 0.5) boat(mesh, HALF - 2.5, z + 8, Math.PI, 7 + random() * 6, random);
  }
  for (let i = 0; i < 16; i++)
    walker(mesh, (random() < 0.5 ? -1 : 1) * (HALF + 2 + random() * 9), -30 + random() * 160, random() * 6.3, i + 90);
  dockCrane(mesh, -HALF - 7, 118, Math.PI / 2);
}

/** The Needle alone, over a wide reach of the harbour. */
function needle(mesh: Mesh, random: Random): void {
  sea(mesh);
  ground(mesh, -600, -40, -HALF, 200, stuff.slabs);
  ground(mesh, HALF, -60, 600, 120, stuff.slabs);
  ground(mesh, -900, 300, 900, 1500, stuff.slabs);
  mesh.at({ x: 0, z: 0 }, () => stayedBridge(mesh, HALF * 2 + 4, 4.4));
  streetSide(mesh, HALF + 62, -170, -16, 'right', mixes.centre, random);
  streetSide(mesh, HALF + 62, 16, 170, 'right', mixes.centre, random);
  mesh.at({ x: 200, z: 30, yaw: Math.PI / 2 }, () => tidalTower(mesh));
  district(mesh, -300, 300, 316, 440, mixes.centre, random);
  district(mesh, -260, 260, 450, 540, mixes.towers, random);
  for (let z = -24; z < 40; z += 12) lampPost(mesh, HALF + 14, z, 5.4);
  for (let i = 0; i < 7; i++) bareTree(mesh, HALF + 24 + (i % 3) * 9, -30 + i * 11, 9, random);
  railing(mesh, [HALF + 0.6, 0, -60], [HALF + 0.6, 0, -3]);
  railing(mesh, [HALF + 0.6, 0, 3], [HALF + 0.6, 0, 120]);
}

export const bridgeScenes: Scene[] = [
  { name: 'arches-dawn', words: 'Old Basin Bridge from the water, dawn', format: 'landscape', camera: level([-7, 0.1, -4], 27, { yaw: 3, rise: 2.2 }), light: 'dawn', weather: { sunAzimuth: 25, clouds: 0.45, exposureValue: 9.3 }, mirror: 'water', seed: 21, build: basin },
  { name: 'arches-blue', words: 'Old Basin Bridge, lamps lit', format: 'landscape', camera: level([-33, 1.6, 6], 30, { yaw: 24, rise: 1.5 }), light: 'blue', mirror: 'water', seed: 21, build: basin },
  { name: 'swing-day', words: 'Swing Bridge from the east quay', format: 'landscape', camera: level([33, 2.5, 108], 34, { yaw: -22, rise: 1.5 }), light: 'day', weather: { sunAzimuth: 140, sunElevation: 32, clouds: 0.54 }, mirror: 'water', seed: 21, build: basin },
  { name: 'needle-walk', words: 'On the Needle, centre line, one figure', format: 'landscape', camera: level([-40.5, 2.15, 0], 26, { yaw: 90, rise: 4 }), light: 'overcast', weather: { clouds: 0.8 }, mirror: 'water', seed: 23, build: (mesh, random) => { needle(mesh, random); walker(mesh, -29, 0.35, 1.57, 5, 0.55); } },
  { name: 'needle-dusk', words: 'The Needle and its mast, after sunset', format: 'four-thirds', camera: level([28, -0.4, -62], 26, { yaw: -25, rise: 5.5 }), light: 'dusk', weather: { sunAzimuth: 330 }, mirror: 'water', seed: 23, build: needle },
  { name: 'bridges-long', words: 'Three bridges through a long lens, evening', format: 'landscape', camera: level([6, 7, -190], 135, { pitch: 0.6, rise: 1 }), light: 'gold', weather: { sunAzimuth: 212, sunElevation: 15, visibility: 2600 }, mirror: 'water', seed: 21, build: basin },
  { name: 'swing-portrait', words: 'Swing Bridge and crane, overcast', format: 'portrait', camera: level([-29, 0.4, 74], 28, { yaw: -4, rise: 6 }), light: 'overcast', mirror: 'water', seed: 21, build: basin },
]; // prettier-ignore
