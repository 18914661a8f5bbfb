import { EXCHANGE, cornExchange } from './landmarks.ts';
import type { Mesh } from './mesh.ts';
import type { Random } from './noise.ts';
import { level, type Scene } from './scene.ts';
import { bareTree, bench, car, lampPost, walker } from './street.ts';
import { stuff } from './styles.ts';
import { district, mixes, row, streetSide } from './town.ts';

const FRONT = 62;
const warm = [1, 0.7, 0.4] as const;

/** Exchange Square: paving, trees at the sides, the Corn Exchange at its head and Harrow Lane leading up to it. */
function square(mesh: Mesh, random: Random): void {
  mesh.face([[-900, 0, -500], [900, 0, -500], [900, 0, 1200], [-900, 0, 1200]], stuff.asphalt); // prettier-ignore
  mesh.box([-34, 0, 2], [34, 0.13, FRONT + 60], stuff.kerb, stuff.slabs);
  mesh.at({ x: -EXCHANGE.width / 2, y: 0.13, z: FRONT }, () => cornExchange(mesh));
  row(mesh, -160, -46, FRONT + 6, mixes.centre, random, 0.05);
  row(mesh, 46, 160, FRONT + 6, mixes.centre, random, 0.05);
  streetSide(mesh, -46, -6, FRONT - 4, 'left', mixes.centre, random);
  streetSide(mesh, 46, -6, FRONT - 4, 'right', mixes.centre, random);
  district(mesh, -180, 180, FRONT + 60, 330, mixes.centre, random);
  lane(mesh, random);
  furnish(mesh, random);
}

/** Harrow Lane: pavements, kerbs, lamps, cars, shops. */
function lane(mesh: Mesh, random: Random): void {
  for (const s of [-1, 1]) {
    const [a, b] = s < 0 ? [-14, -6.2] : [6.2, 14];
    mesh.box([a, 0, -180], [b, 0.13, -4], stuff.kerb, stuff.slabs);
    streetSide(mesh, s * 12.5, -180, -12, s < 0 ? 'left' : 'right', mixes.centre, random);
    for (let z = -176; z < -8; z += 14) {
      lampPost(mesh, s * 7, z, 6.4, -s * 1.1);
      if (z > -66 && random() < 0.75) car(mesh, s * 5, z + 7, s < 0 ? 0 : Math.PI, Math.floor(random() * 50));
      mesh.lamp([s * 10.5, 3.2, z + 5], warm, 0.0022);
      for (let i = 0; i < 2; i++)
        if (z > -80 && random() < 0.6)
          walker(mesh, s * (8 + random() * 3.5), z + random() * 12, random() < 0.5 ? 0 : Math.PI, Math.floor(random() * 900));
    }
  }
  for (let z = -176; z < -10; z += 6) mesh.face([[-0.08, 0.012, z], [0.08, 0.012, z], [0.08, 0.012, z + 3], [-0.08, 0.012, z + 3]], stuff.paint); // prettier-ignore
}

function furnish(mesh: Mesh, random: Random): void {
  for (let z = 8; z < FRONT - 10; z += 11) {
    for (const s of [-1, 1]) {
      mesh.at({ x: 0, y: 0.13, z: 0 }, () => lampPost(mesh, s * 22, z, 5.6));
      bareTree(mesh, s * 28, z + 5, 9 + random() * 3, random);
      if (z % 2 === 0) mesh.at({ x: 0, y: 0.13, z: 0 }, () => bench(mesh, s * 24.5, z + 5, (s * Math.PI) / 2));
      mesh.lamp([s * 43, 3.2, z], warm, 0.0024);
    }
  }
  for (let i = 0; i < 18; i++) walker(mesh, (random() - 0.5) * 44, 26 + random() * 24, random() * 6.3, i + 700, 0.13);
}

export const exchangeScenes: Scene[] = [
  { name: 'exchange-blue', words: 'Corn Exchange on the centre line, relit', format: 'landscape', camera: level([0, 1.75, 3], 27, { rise: 5.2 }), light: 'blue', weather: { sunAzimuth: 200 }, mirror: 'wet', seed: 41, build: square },
  { name: 'exchange-night', words: 'Wet square at night', format: 'landscape', camera: level([-19, 1.6, 12], 24, { yaw: 18, rise: 5 }), light: 'night', mirror: 'wet', seed: 41, build: square },
  { name: 'exchange-up', words: 'Columns and pediment, looking up', format: 'portrait', camera: level([-9.5, 1.5, 44], 24, { pitch: 34, yaw: 22 }), light: 'gold', weather: { sunAzimuth: 226, sunElevation: 20, clouds: 0.5, key: 0.22 }, mirror: null, seed: 41, build: square },
  { name: 'harrow-lane', words: 'Harrow Lane towards the Exchange, evening sun', format: 'portrait', camera: level([1.6, 1.7, -92], 45, { rise: 6 }), light: 'gold', weather: { sunAzimuth: 205, sunElevation: 16 }, mirror: null, seed: 41, build: square },
  { name: 'exchange-day', words: 'Exchange Square, somebody crossing', format: 'four-thirds', camera: level([14, 1.7, 9], 28, { yaw: -12, rise: 4.5 }), light: 'overcast', mirror: null, seed: 41, build: (mesh, random) => { square(mesh, random); walker(mesh, 8.2, 20, -1.2, 12, 0.13); } },
  { name: 'lane-night', words: 'Harrow Lane after rain', format: 'landscape', camera: level([0, 1.65, -96], 30, { rise: 3 }), light: 'night', mirror: 'wet', seed: 41, build: square },
]; // prettier-ignore
