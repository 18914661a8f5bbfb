import { boat, ground, sea } from './harbour.ts';
import { LIBRARY, library } from './landmarks.ts';
import type { Mesh } from './mesh.ts';
import type { Random } from './noise.ts';
import { level, type Scene } from './scene.ts';
import { bareTree, bench, bollard, lampPost, leafyTree, walker } from './street.ts';
import { stuff } from './styles.ts';
import { district, mixes, row } from './town.ts';

const QUAY = 58;
const FRONT = 84;

/** Ropewalk Quay: the library behind a promenade with trees and lamps, the basin before it. */
function ropewalk(mesh: Mesh, random: Random, leaves: boolean): void {
  sea(mesh);
  ground(mesh, -700, QUAY, 700, 1500, stuff.setts);
  ground(mesh, -700, -300, 700, -9, stuff.setts);
  mesh.box([-700, 0, FRONT - 4], [700, 0.14, FRONT + 3], stuff.kerb, stuff.slabs);
  mesh.at({ x: -LIBRARY.width / 2, z: FRONT }, () => library(mesh));
  row(mesh, -260, -40, FRONT, mixes.quayside, random);
  row(mesh, 40, 260, FRONT, mixes.quayside, random);
  district(mesh, -260, 260, FRONT + 44, 330, mixes.old, random);
  district(mesh, -300, 300, 340, 480, mixes.centre, random);
  promenade(mesh, random, leaves);
  for (const [x, long] of [
    [-44, 11],
    [-27, 8],
    [31, 13],
    [52, 9],
    [74, 10],
  ] as const)
    boat(mesh, x, QUAY - 2.6, Math.PI / 2, long, random);
}

function promenade(mesh: Mesh, random: Random, leaves: boolean): void {
  for (let x = -128; x <= 128; x += 16) {
    lampPost(mesh, x, QUAY + 4.5, 5.4);
    if (Math.abs(x) > 12 && x % 32 === 0) bench(mesh, x + 4, QUAY + 5.5, Math.PI);
    if (Math.abs(x + 8) < 14) continue;
    if (leaves) leafyTree(mesh, x + 8, QUAY + 9, 8.5 + random() * 2.5, random, x < -30 ? 6500 : 1800, x < -30 ? 0.09 : 0.2);
    else bareTree(mesh, x + 8, QUAY + 9, 9 + random() * 3, random);
  }
  for (let x = -120; x <= 120; x += 6) bollard(mesh, x + 1, QUAY + 0.8);
  for (let i = 0; i < 14; i++) walker(mesh, (random() - 0.5) * 120, QUAY + 12 + random() * 10, random() < 0.5 ? 1.5 : -1.6, i + 40);
}

const build = (mesh: Mesh, random: Random): void => ropewalk(mesh, random, false);

export const libraryScenes: Scene[] = [
  { name: 'library-dawn', words: 'Ropewalk Library across the basin, first light', format: 'landscape', camera: level([0, 1.7, -9.5], 33, { rise: 3.2 }), light: 'dawn', weather: { sunAzimuth: 150, sunElevation: 5, clouds: 0.45 }, mirror: 'water', seed: 11, build },
  { name: 'library-blue', words: 'East front across the basin, lamps lit', format: 'landscape', camera: level([0, 1.7, -9.5], 33, { rise: 3.2 }), light: 'blue', mirror: 'water', seed: 11, build },
  { name: 'library-fog', words: 'The three gables in harbour fog', format: 'landscape', camera: level([-16, 1.7, -9.5], 40, { rise: 3, yaw: 4 }), light: 'fog', mirror: 'water', seed: 11, build },
  { name: 'library-oriel', words: 'The oriel from the quay edge', format: 'landscape', camera: level([-4, 1.6, QUAY + 0.8], 20, { rise: 7.5, yaw: 5 }), light: 'overcast', mirror: null, seed: 11, build },
  { name: 'library-up', words: 'Under the oriel, looking up', format: 'portrait', camera: level([-9, 1.2, FRONT - 9.5], 20, { pitch: 38, yaw: 18 }), light: 'day', weather: { sunAzimuth: 232, sunElevation: 41, clouds: 0.56 }, mirror: null, seed: 11, build },
  { name: 'library-approach', words: 'Along the promenade on the centre line, one figure', format: 'landscape', camera: level([-70, 1.65, 71.5], 30, { yaw: 90, rise: 3 }), light: 'morning', weather: { sunAzimuth: 118 }, mirror: null, seed: 11, build: (mesh, random) => { ropewalk(mesh, random, true); walker(mesh, -55, 71.3, -1.57, 3); } },
  { name: 'library-gable', words: 'North gable, late sun', format: 'portrait', camera: level([-28, 1.7, -9.5], 68, { rise: 6, yaw: 2 }), light: 'gold', weather: { sunAzimuth: 236, sunElevation: 15 }, mirror: 'water', seed: 11, build },
  { name: 'library-afternoon', words: 'Library and neighbours in the afternoon, oblique', format: 'four-thirds', camera: level([62, 1.7, -8], 34, { yaw: -30, rise: 3.5 }), light: 'day', weather: { sunAzimuth: 222, sunElevation: 30, clouds: 0.52 }, mirror: 'water', seed: 11, build: (mesh, random) => ropewalk(mesh, random, true) },
]; // prettier-ignore
