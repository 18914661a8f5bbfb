import { building, type Plan } from './buildings.ts';
import type { Mesh } from './mesh.ts';
import type { Random } from './noise.ts';
import type { Family } from './styles.ts';

/** How a district is built: which families, how often, and how high in metres. */
export type Mix = readonly (readonly [Family, number, number, number])[];

export const mixes = {
  quayside: [['warehouse', 5, 13, 20], ['house', 2, 8, 12], ['brick', 2, 14, 22], ['stone', 2, 15, 24], ['flats', 2, 16, 26], ['glass', 1, 18, 34]],
  old: [['house', 5, 8, 12], ['stone', 4, 14, 23], ['brick', 3, 13, 22], ['warehouse', 2, 12, 17]],
  centre: [['stone', 4, 18, 28], ['office', 4, 24, 60], ['glass', 4, 28, 80], ['brick', 2, 18, 28], ['flats', 1, 20, 36]],
  towers: [['glass', 5, 50, 118], ['office', 4, 40, 92], ['flats', 2, 30, 62]],
  docks: [['warehouse', 6, 9, 16], ['brick', 1, 10, 14]],
} satisfies Record<string, Mix>; // prettier-ignore

function draw(mix: Mix, random: Random): { family: Family; height: number } {
  const total = mix.reduce((sum, [, share]) => sum + share, 0);
  let pick = random() * total;
  for (const [family, share, low, high] of mix) {
    pick -= share;
    if (pick <= 0) return { family, height: low + random() * random() * (high - low) * 1.4 };
  }
  return { family: mix[0]![0], height: mix[0]![2] };
}

/** Houses side by side from x0 to x1, fronts at z, facing -z; with `back` they face +z instead. */
export function row(mesh: Mesh, x0: number, x1: number, z: number, mix: Mix, random: Random, gaps = 0.18): void {
  let x = x0;
  while (x < x1 - 8) {
    const plan = { ...draw(mix, random), ...plot(random) };
    if (plan.family === 'house') plan.width = 6 + random() * 5;
    if (plan.height > 50) plan.width = Math.max(plan.width, 20);
    plan.width = Math.min(plan.width, x1 - x);
    mesh.at({ x, z: z + (random() < 0.25 ? random() * 1.5 : 0) }, () => building(mesh, plan, random));
    x += plan.width + (random() < gaps ? 3 + random() * 8 : 0.05);
  }
}

const plot = (random: Random): Pick<Plan, 'width' | 'depth'> => ({ width: 11 + random() * 20, depth: 14 + random() * 14 });

/** Rows behind rows, with streets between. */
export function district(mesh: Mesh, x0: number, x1: number, z0: number, z1: number, mix: Mix, random: Random): void {
  for (let z = z0; z < z1; z += 40) row(mesh, x0, x1, z, mix, random, 0.3);
}

/** One side of a street that runs along +z: fronts at x, on the left or right hand of somebody walking along it. */
export function streetSide(mesh: Mesh, x: number, z0: number, z1: number, side: 'left' | 'right', mix: Mix, random: Random): void {
  // A row is built facing -z and turned to face the street.
  const right = side === 'right';
  mesh.at({ x, z: right ? z1 : z0, yaw: right ? Math.PI / 2 : -Math.PI / 2 }, () => row(mesh, 0, z1 - z0, 0, mix, random, 0.06));
}
