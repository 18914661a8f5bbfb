import type { Mesh } from './mesh.ts';
import { type Random, seeded } from './noise.ts';
import { stuff } from './styles.ts';
import type { Surface } from './surface.ts';
import type { Vec3 } from './vector.ts';

/** Power of a street lamp: some 50 lux on the ground six metres below, a bright quay. */
const STREET_LAMP = 0.018;
const warm: Vec3 = [1, 0.64, 0.32];

/** A lamp post with one lantern, arm towards +x. */
export function lampPost(mesh: Mesh, x: number, z: number, high = 6, arm = 0): void {
  mesh.at({ x, z }, () => {
    mesh.bar([0, 0, 0], [0, high, 0], 0.16, stuff.iron, 0.09);
    mesh.box([-0.16, 0, -0.16], [0.16, 0.7, 0.16], stuff.iron);
    if (arm !== 0) mesh.bar([0, high, 0], [arm, high + 0.25, 0], 0.09, stuff.iron);
    const y = high + (arm !== 0 ? 0.02 : 0.12);
    if (arm !== 0) mesh.slab([arm - 0.32, y, -0.13], [arm + 0.32, y + 0.1, 0.13], stuff.lampGlass, stuff.iron);
    else {
      mesh.lathe([[high, 0.06], [high + 0.1, 0.16], [high + 0.5, 0.22], [high + 0.52, 0.05]], 6, stuff.lampGlass); // prettier-ignore
      mesh.lathe(
        [
          [high + 0.5, 0.26],
          [high + 0.72, 0.02],
        ],
        6,
        stuff.iron,
      );
    }
    mesh.lamp([arm, y - 0.15, 0], warm, STREET_LAMP);
  });
}

/** A railing of posts and three rails between two points on the ground. */
export function railing(mesh: Mesh, from: Vec3, to: Vec3, surface: Surface = stuff.rail, high = 1.1): void {
  const n = Math.max(1, Math.round(Math.hypot(to[0] - from[0], to[2] - from[2]) / 1.8));
  const at = (t: number, y: number): Vec3 => [
    from[0] + (to[0] - from[0]) * t,
    from[1] + (to[1] - from[1]) * t + y,
    from[2] + (to[2] - from[2]) * t,
  ];
  for (let i = 0; i <= n; i++) mesh.bar(at(i / n, 0), at(i / n, high), 0.07, surface);
  for (const y of [high, high * 0.66, high * 0.33]) mesh.bar(at(0, y), at(1, y), y === high ? 0.08 : 0.035, surface);
}

export function bollard(mesh: Mesh, x: number, z: number): void {
  mesh.at({ x, z }, () => mesh.lathe([[0, 0.2], [0.35, 0.16], [0.48, 0.24], [0.56, 0.2], [0.58, 0]], 8, stuff.iron)); // prettier-ignore
}

export function bench(mesh: Mesh, x: number, z: number, yaw = 0): void {
  mesh.at({ x, z, yaw }, () => {
    mesh.slab([-0.9, 0.42, -0.25], [0.9, 0.48, 0.25], stuff.wood);
    mesh.slab([-0.9, 0.6, 0.22], [0.9, 0.95, 0.27], stuff.wood);
    for (const s of [-0.75, 0.75]) mesh.box([s - 0.04, 0, -0.22], [s + 0.04, 0.42, 0.22], stuff.iron);
  });
}

/** A tree without leaves: limbs that fork, thinner each time. */
export function bareTree(mesh: Mesh, x: number, z: number, high: number, random: Random): void {
  const branch = (from: Vec3, along: Vec3, long: number, thick: number, level: number): void => {
    const to: Vec3 = [from[0] + along[0] * long, from[1] + along[1] * long, from[2] + along[2] * long];
    mesh.bar(from, to, thick, stuff.bark, thick * 0.68);
    if (level === 0) return;
    const n = level > 3 ? 3 : 2 + Math.floor(random() * 2);
    const turn = random() * 6.28;
    for (let i = 0; i < n; i++) {
      const a = turn + (i / n) * 6.28 + random() * 0.9;
      const lean = 0.35 + random() * 0.4;
      const next: Vec3 = [along[0] * 0.75 + Math.cos(a) * lean, along[1] * 0.8 + 0.22, along[2] * 0.75 + Math.sin(a) * lean];
      const l = Math.hypot(...next);
      branch(to, [next[0] / l, next[1] / l, next[2] / l], long * (0.66 + random() * 0.16), thick * 0.64, level - 1);
    }
  };
  mesh.at({ x, z }, () => branch([0, 0, 0], [0.02, 1, 0.01], high * 0.3, high * 0.032, 5));
}

const leafColours = [[0.07, 0.1, 0.03], [0.11, 0.12, 0.035], [0.17, 0.12, 0.03], [0.2, 0.1, 0.03]] as const; // prettier-ignore

/** A tree in leaf: limbs and a cloud of small flat leaves, denser outside. */
export function leafyTree(mesh: Mesh, x: number, z: number, high: number, random: Random, leaves = 900, size = 0.3): void {
  const colour = leafColours[Math.floor(random() * leafColours.length)]!;
  const leaf: Surface = { kind: 'leaf', colour };
  mesh.at({ x, z }, () => {
    mesh.bar([0, 0, 0], [0.1, high * 0.45, 0], high * 0.035, stuff.bark, high * 0.02);
    for (let i = 0; i < 5; i++) {
      const a = i * 1.3;
      mesh.bar([0.1, high * 0.36, 0], [Math.cos(a) * high * 0.2, high * 0.7, Math.sin(a) * high * 0.2], 0.14, stuff.bark, 0.04);
    }
    const lumps = Array.from(
      { length: 9 },
      () =>
        [
          (random() - 0.5) * high * 0.4,
          high * (0.5 + random() * 0.36),
          (random() - 0.5) * high * 0.4,
          high * (0.13 + random() * 0.1),
        ] as const,
    );
    for (let i = 0; i < leaves; i++) {
      const [cx, cy, cz, r] = lumps[i % lumps.length]!;
      const [a, b] = [random() * 6.283, Math.acos(2 * random() - 1)];
      const reach = r * random() ** 0.34;
      const p: Vec3 = [cx + reach * Math.sin(b) * Math.cos(a), cy + reach * Math.cos(b), cz + reach * Math.sin(b) * Math.sin(a)];
      leafAt(mesh, p, size * (0.6 + random() * 0.7), random, leaf);
    }
  });
}

function leafAt(mesh: Mesh, p: Vec3, size: number, random: Random, leaf: Surface): void {
  const v = (): number => (random() - 0.5) * 2 * size;
  mesh.face([[p[0] + v(), p[1] + v(), p[2] + v()], [p[0] + v(), p[1] + v(), p[2] + v()], [p[0] + v(), p[1] + v(), p[2] + v()]], leaf); // prettier-ignore
}

const coats = [[0.03, 0.032, 0.04], [0.06, 0.05, 0.045], [0.1, 0.02, 0.02], [0.16, 0.13, 0.09], [0.02, 0.03, 0.06]] as const; // prettier-ignore

/** Somebody on foot, in a coat, in mid-stride; `yaw` in radians is where they walk. */
export function walker(mesh: Mesh, x: number, z: number, yaw: number, seed: number, y = 0): void {
  const random = seeded(seed);
  const cloth = (k: number): Surface => {
    const c = coats[Math.floor(random() * coats.length)]!;
    return { kind: 'plain', colour: [c[0] * k, c[1] * k, c[2] * k], gloss: 0 };
  };
  const coat = cloth(1);
  const trousers = cloth(0.6);
  const skin: Surface = { kind: 'plain', colour: [0.36, 0.24, 0.18], gloss: 0 };
  const hair: Surface = { kind: 'plain', colour: [0.05, 0.035, 0.025], gloss: 0 };
  const size = 0.94 + random() * 0.12;
  const stride = 0.13 + random() * 0.12;
  mesh.at({ x, y, z, yaw }, () => {
    for (const s of [-1, 1]) {
      mesh.bar([s * 0.1, 0.86 * size, 0], [s * 0.1, 0.45 * size, s * stride * 0.55], 0.17, trousers, 0.13);
      mesh.bar([s * 0.1, 0.47 * size, s * stride * 0.55], [s * 0.1, 0.06, s * stride - 0.04], 0.13, trousers, 0.09);
      mesh.bar([s * 0.1, 0.05, s * stride - 0.1], [s * 0.1, 0.04, s * stride + 0.16], 0.1, hair);
      mesh.bar([s * 0.24, 1.4 * size, 0], [s * 0.29, 1.1 * size, -s * 0.12], 0.12, coat, 0.1);
      mesh.bar([s * 0.29, 1.12 * size, -s * 0.12], [s * 0.27, 0.88 * size, -s * 0.22 + 0.06], 0.1, coat, 0.07);
    }
    const profile = [[0.52 + random() * 0.25, 0.235], [0.95, 0.2], [1.1, 0.18], [1.35, 0.22], [1.45, 0.19], [1.52, 0.08]]; // prettier-ignore
    mesh.lathe(
      profile.map(([h, r]) => [h! * size, r!] as const),
      10,
      coat,
      0.72,
    );
    mesh.lathe([[1.48, 0.055], [1.56, 0.06], [1.6, 0.09], [1.68, 0.105]].map(([h, r]) => [h! * size, r!] as const), 9, skin); // prettier-ignore
    mesh.lathe([[1.66, 0.112], [1.73, 0.105], [1.79, 0.06], [1.81, 0]].map(([h, r]) => [h! * size, r!] as const), 9, hair); // prettier-ignore
  });
}

/** A parked car as it is seen from afar: body, cabin, wheels. */
export function car(mesh: Mesh, x: number, z: number, yaw: number, seed: number): void {
  const paint = [[0.02, 0.02, 0.025], [0.35, 0.36, 0.37], [0.5, 0.5, 0.48], [0.12, 0.02, 0.02], [0.03, 0.05, 0.1]][seed % 5]!; // prettier-ignore
  const body: Surface = { kind: 'plain', colour: [paint[0]!, paint[1]!, paint[2]!], gloss: 0.6 };
  const glass: Surface = { kind: 'plain', colour: [0.02, 0.022, 0.025], gloss: 1 };
  const side = [[-2.1, 0.35], [-2.15, 0.75], [-1.3, 0.92], [1.75, 0.95], [2.05, 0.8], [2.1, 0.35]] as const; // prettier-ignore
  const cabin = [
    [-1.25, 0.92],
    [-0.55, 1.42],
    [0.9, 1.44],
    [1.7, 0.95],
  ] as const;
  mesh.at({ x, z, yaw }, () => {
    extrude(mesh, side, 0.86, body);
    extrude(mesh, cabin, 0.74, glass);
    mesh.face([[-0.74, 1.445, -0.55], [0.74, 1.445, -0.55], [0.74, 1.455, 0.9], [-0.74, 1.455, 0.9]], body); // prettier-ignore
    for (const [wx, wz] of [
      [-0.8, -1.35],
      [0.8, -1.35],
      [-0.8, 1.35],
      [0.8, 1.35],
    ]) {
      mesh.box([wx! - 0.11, 0, wz! - 0.31], [wx! + 0.11, 0.62, wz! + 0.31], stuff.iron);
    }
  });
}

/** A profile of (z, y) pairs drawn out to `half` on either side. */
function extrude(mesh: Mesh, profile: readonly (readonly [number, number])[], half: number, surface: Surface): void {
  for (let i = 0; i + 1 < profile.length; i++) {
    const [[z0, y0], [z1, y1]] = [profile[i]!, profile[i + 1]!];
    mesh.face([[-half, y0, z0], [half, y0, z0], [half, y1, z1], [-half, y1, z1]], surface); // prettier-ignore
    const base = profile[0]![1];
    for (const s of [-half, half]) mesh.face([[s, base, z0], [s, base, z1], [s, y1, z1], [s, y0, z0]], surface); // prettier-ignore
  }
}
