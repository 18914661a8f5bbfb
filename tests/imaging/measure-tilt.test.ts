import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { turnOf } from '../../api/domain/checks/tilt.ts';
import { scanPicture } from '../../api/imaging/measure/scan.ts';
import { measureTilt } from '../../api/imaging/measure/tilt.ts';
import { toRaw } from '../../api/imaging/upright.ts';
import { develop, meter } from '../../seeds/scenes/develop.ts';
import { render } from '../../seeds/scenes/render.ts';
import { subjectOf } from '../../seeds/scenes/scene.ts';
import { sceneNamed } from '../../seeds/scenes/scenes.ts';
import { planeOf, seededNormal, seededRandom } from '../support/drawn-pictures.ts';
import { photographPixels } from '../support/photograph.ts';

const LIMITS = { high: 253, low: 2 };
const [WIDTH, HEIGHT] = [1280, 854];

async function tiltOfDrawing(shapes: string) {
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="${WIDTH}" height="${HEIGHT}" viewBox="${-WIDTH / 2} ${-HEIGHT / 2} ${WIDTH} ${HEIGHT}">
    <rect x="-2000" y="-2000" width="4000" height="4000" fill="#8a97a5"/>${shapes}</svg>`;
  const jpeg = await sharp(Buffer.from(svg)).jpeg({ quality: 82 }).toBuffer();
  return measureTilt(scanPicture(await toRaw(sharp(jpeg)), LIMITS).luma);
}

/** A front with eight by five windows, turned clockwise about the picture's middle. */
function front(angle: number): string {
  const windows = Array.from({ length: 40 }, (_, i) => {
    const [x, y] = [(i % 8) * 100 - 380, Math.floor(i / 8) * 90 - 200];
    return `<rect x="${x}" y="${y}" width="48" height="62" fill="#26303a"/>`;
  });
  return `<g transform="rotate(${angle})"><rect x="-420" y="-240" width="840" height="520" fill="#b9a58e"/>${windows.join('')}</g>`;
}

/** Masts seen by a camera that looks up: each goes to the point at which they all meet. */
function masts(vanishing: number): string {
  return Array.from({ length: 15 }, (_, i) => {
    const foot = i * 84 - 588;
    const at = (x: number, y: number) => `${x * (1 + y / vanishing)},${y}`;
    const [y0, y1] = [-380, 380];
    const corners = [at(foot, y0), at(foot + 18, y0), at(foot + 18, y1), at(foot, y1)];
    return `<polygon points="${corners.join(' ')}" fill="#20262c"/>`;
  }).join('');
}

const ANGLES = [-5, -3, -2, -1, -0.5, 0, 0.5, 1, 2, 3, 5];

describe('a front turned by a known angle', () => {
  it.each(ANGLES)('%d° is found within 0.3°, by its uprights and by its level lines', async (angle) => {
    const tilt = await tiltOfDrawing(front(angle));
    expect(Math.abs(tilt.uprights!.angle - angle)).toBeLessThan(0.3);
    expect(Math.abs(tilt.uprights!.converging)).toBeLessThan(0.3);
    expect(Math.abs(tilt.horizon!.angle - angle)).toBeLessThan(0.3);
    expect(Math.abs(turnOf(tilt)!.angle - angle)).toBeLessThan(0.3);
  });
});

/** A scene of the demo, drawn by a camera that is rolled. */
async function scene(name: string, roll: number) {
  const subject = subjectOf(sceneNamed(name), { roll });
  const [width, height] = sceneNamed(name).format === 'portrait' ? [640, 960] : [960, 640];
  const picture = render(subject, width, height);
  const exposure = { factor: meter(picture, subject.light.key), steps: 0, balance: subject.light.balance, sensitivity: 100, seed: 1 };
  const { codes } = await develop(picture, exposure, width, height);
  const jpeg = await sharp(codes, { raw: { width, height, channels: 3 } })
    .toColourspace('srgb')
    .jpeg({ quality: 82 })
    .toBuffer();
  return measureTilt(scanPicture(await toRaw(sharp(jpeg)), LIMITS).luma);
}

// The scenes are drawn by a ray caster: the roll of its camera is the truth.
describe('a street drawn by a rolled camera', () => {
  it.each([
    ['library-oriel', -5],
    ['library-oriel', 0.6],
    ['library-oriel', 3],
    ['skyline-morning', -3],
    ['skyline-morning', 1.5],
  ])(
    '%s, rolled by %d°',
    async (name, roll) => {
      expect(Math.abs(turnOf(await scene(name, roll))!.angle - roll)).toBeLessThan(0.3);
    },
    60_000,
  );

  // Lean at the edge: tan⁻¹((x / f) · tan pitch), x half of 24 mm, f 20 mm, pitch 38°: exact geometry.
  it('library-up, looking up by 38°: converging, not tilted', async () => {
    const { uprights } = await scene('library-up', 0);
    expect(uprights!.converging).toBeCloseTo((Math.atan((12 / 20) * Math.tan((38 * Math.PI) / 180)) * 180) / Math.PI, 0);
    expect(Math.abs(uprights!.angle)).toBeLessThan(0.3);
    expect(uprights!.certainty).toBeGreaterThan(0.5);
  }, 60_000);
});

// f = 1280 / 2 / tan 25° = 1372.5 px; the vanishing point lies f / tan θ above the middle, and an upright at the edge leans by tan⁻¹((640 / f) · tan θ):
// exact geometry, the same rows as for 1600 px and 50° across.
describe('converging uprights', () => {
  const focal = WIDTH / 2 / Math.tan((25 * Math.PI) / 180);

  it.each([
    [1, 0.466],
    [2, 0.933],
    [5, 2.336],
    [10, 4.7],
    [-5, -2.336],
  ])('a camera pitched by %d° gives %d° at the edge, and no turn', async (pitch, lean) => {
    const { uprights } = await tiltOfDrawing(masts(focal / Math.tan((pitch * Math.PI) / 180)));
    expect(Math.abs(uprights!.converging - lean)).toBeLessThan(0.15);
    expect(Math.abs(uprights!.angle)).toBeLessThan(0.15);
    expect(uprights!.certainty).toBeGreaterThan(0.5);
  });

  it('pitched and rolled: both are told', async () => {
    const { uprights } = await tiltOfDrawing(`<g transform="rotate(2)">${masts(focal / Math.tan((10 * Math.PI) / 180))}</g>`);
    expect(Math.abs(uprights!.angle - 2)).toBeLessThan(0.3);
    expect(Math.abs(uprights!.converging - 4.7)).toBeLessThan(0.3);
  });
});

describe('where there is nothing straight', () => {
  const normal = seededNormal(2);

  it.each([
    ['a sky', planeOf(960, 640, (x, y) => 200 - y / 8 + x / 40)],
    ['noise', planeOf(960, 640, () => 128 + 20 * normal())],
    ['fog with soft shapes', planeOf(960, 640, (x, y) => 150 + 30 * Math.sin(x / 90 + Math.sin(y / 70)) + 2 * normal())],
    ['rings on water', planeOf(960, 640, (x, y) => 128 + 50 * Math.sin(Math.hypot(x - 300, y - 500) / 6))],
    ['a single pixel', planeOf(1, 1, () => 9)],
  ])('nothing is said: %s', (_what, plane) => {
    expect(turnOf(measureTilt(plane))).toBeNull();
  });

  it('nothing is said: leaves', async () => {
    const random = seededRandom(12);
    const leaves = Array.from({ length: 2500 }, () => {
      const [x, y] = [random() * WIDTH - WIDTH / 2, random() * HEIGHT - HEIGHT / 2];
      const turn = `rotate(${random() * 360} ${x} ${y})`;
      return `<ellipse cx="${x}" cy="${y}" rx="${8 + 14 * random()}" ry="${4 + 7 * random()}" transform="${turn}" fill="hsl(${80 + 40 * random()} 40% ${15 + 50 * random()}%)"/>`;
    });
    expect(turnOf(await tiltOfDrawing(leaves.join('')))).toBeNull();
  });

  it('one mast beside the middle tells no turn from a camera that looks up', async () => {
    const tilt = await tiltOfDrawing('<rect x="300" y="-300" width="14" height="600" fill="#111" transform="rotate(2)"/>');
    expect(tilt.uprights!.certainty).toBeLessThan(0.3);
  });

  it('a street of towers with grain is found upright', () => {
    const data = photographPixels(1280, 854);
    const tilt = measureTilt(scanPicture({ data, width: 1280, height: 854, channels: 3 }, LIMITS).luma);
    expect(Math.abs(turnOf(tilt)?.angle ?? 0)).toBeLessThan(0.3);
  });
});
