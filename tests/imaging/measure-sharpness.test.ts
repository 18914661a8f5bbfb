import { describe, expect, it } from 'vitest';
import type { Plane } from '../../api/imaging/measure/plane.ts';
import { sharpnessOf, tileVariance } from '../../api/imaging/measure/sharpness.ts';
import { planeOf, seededNormal, seededRandom } from '../support/drawn-pictures.ts';

/** Variance of the Laplacian of the whole picture, a pixel of margin left out. */
function wholeVariance(plane: Plane, margin = 1): number {
  return tileVariance(plane, margin, margin, plane.width - margin, plane.height - margin).laplacian;
}

const sine = (amplitude: number, period: number) => planeOf(514, 66, (x) => 128 + amplitude * Math.sin((2 * Math.PI * (x - 1)) / period));

/** Convolves with a Gaussian along rows and columns; the kernel reaches six standard deviations. */
function blurred(plane: Plane, sigma: number): Plane {
  const reach = Math.ceil(sigma * 6);
  const kernel = Array.from({ length: reach * 2 + 1 }, (_, i) => Math.exp(-((i - reach) ** 2) / (2 * sigma * sigma)));
  const whole = kernel.reduce((sum, weight) => sum + weight, 0);
  const along = ({ width, height, values }: Plane, dx: number, dy: number): Plane =>
    planeOf(width, height, (x, y) =>
      kernel.reduce((sum, weight, i) => {
        const [u, v] = [x + (i - reach) * dx, y + (i - reach) * dy];
        return sum + (weight / whole) * values[Math.min(height - 1, Math.max(0, v)) * width + Math.min(width - 1, Math.max(0, u))]!;
      }, 0),
    );
  return along(along(plane, 1, 0), 0, 1);
}

/** A wall of rectangles with hard edges and a little grain. */
function wall(contrast: number, grain = 0): Plane {
  const random = seededRandom(5);
  const normal = seededNormal(6);
  const tones = Array.from({ length: 4096 }, () => random());
  return planeOf(
    450,
    386,
    (x, y) => 120 + contrast * (tones[(Math.floor(x / 13) * 61 + Math.floor(y / 11)) % 4096]! - 0.5) + grain * normal(),
  );
}

// Exact values of the kernel [0 1 0; 1 −4 1; 0 1 0], derived: A²/2·(2 − 2cos(2π/P))² for a sine, recomputed with numpy.
describe('the variance of the Laplacian', () => {
  it.each([
    [8, 1715.7288],
    [16, 115.8865],
  ])('of a sine of amplitude 100 and period %i is %d', (period, variance) => {
    expect(wholeVariance(sine(100, period))).toBeCloseTo(variance, 1);
  });

  // A Gaussian multiplies a sine's variance by exp(−(2π/P)²σ²): its Fourier transform.
  it.each([
    [8, 1, 0.53964],
    [8, 2, 0.0848],
    [16, 1, 0.85709],
  ])('of a sine of period %i falls with a blur of %i px to %d', (period, sigma, factor) => {
    const before = wholeVariance(sine(100, period), 17);
    expect(wholeVariance(blurred(sine(100, period), sigma), 17) / before).toBeCloseTo(factor, 3);
  });

  it('of white noise of deviation s is 20 s²: the squares of the kernel', () => {
    const normal = seededNormal(3);
    const variance = wholeVariance(planeOf(600, 600, () => 128 + 5 * normal()));
    expect(Math.abs(variance - 500)).toBeLessThan(10);
  });

  it('of a checkerboard of 0 and 200 is 640,000', () => {
    expect(wholeVariance(planeOf(66, 66, (x, y) => ((x + y) % 2) * 200))).toBeCloseTo(640_000, 0);
  });
});

describe('the sharpness of a picture', () => {
  const sharp = sharpnessOf(wall(160, 1))!;

  it('falls with every blur, and far', () => {
    const series = [0.5, 1, 2, 4].map((sigma) => sharpnessOf(blurred(wall(160, 0), sigma))!);
    expect([sharp, ...series]).toEqual([sharp, ...series].toSorted((a, b) => b - a));
    expect(series[3]! / sharp).toBeLessThan(0.05);
  });

  it('stays the same with half or double the contrast, and with light added', () => {
    for (const contrast of [80, 240]) expect(sharpnessOf(wall(contrast, 0))! / sharpnessOf(wall(160, 0))!).toBeCloseTo(1, 3);
    const { width, height, values } = wall(160, 0);
    expect(sharpnessOf({ width, height, values: values.map((value) => value + 40) })! / sharpnessOf(wall(160, 0))!).toBeCloseTo(1, 3);
  });

  it('does not take noise for detail', () => {
    const bricks = wall(160, 0);
    // A third of the frame is bare sky, where the noise shows.
    const soft = blurred(
      planeOf(bricks.width, bricks.height, (x, y) => (y < 150 ? 180 : bricks.values[y * bricks.width + x]!)),
      3,
    );
    const normal = seededNormal(9);
    const noisy = planeOf(soft.width, soft.height, (x, y) => soft.values[y * soft.width + x]! + 6 * normal());
    expect(sharpnessOf(noisy)!).toBeLessThan(sharp / 3);
  });

  it('is unknown where there is nothing, and where the picture is too small', () => {
    expect(sharpnessOf(planeOf(300, 200, () => 90))).toBeNull();
    expect(sharpnessOf(planeOf(300, 200, (x) => x / 10))).toBeNull();
    expect(sharpnessOf(planeOf(4, 3, (x) => x * 60))).toBeNull();
  });
});
