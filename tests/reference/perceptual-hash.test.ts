import { createRequire } from 'node:module';
import sharp, { type Sharp } from 'sharp';
import { describe, expect, it } from 'vitest';
import { hashDistance } from '../../api/domain/alike.ts';
import { hashOf, lowFrequencies, thumbOf } from '../../api/imaging/measure/hash.ts';
import { DERIVATIVE_LIMITS } from '../../api/domain/clipping.ts';
import { scanPicture } from '../../api/imaging/measure/scan.ts';
import { toRaw } from '../../api/imaging/upright.ts';
import { seededRandom } from '../support/drawn-pictures.ts';
import { photograph } from '../support/photograph.ts';

// Its types promise a default export that a CommonJS module does not have.
const phash = createRequire(import.meta.url)('sharp-phash') as (picture: Buffer) => Promise<string>;

async function hashOfPicture(picture: Sharp): Promise<string> {
  const raw = await toRaw(picture.removeAlpha().toColourspace('srgb'));
  return hashOf(thumbOf(scanPicture(raw, DERIVATIVE_LIMITS).luma))!;
}

/** Some picture of 32 × 32 greys, rough and smooth. */
function thumb(seed: number): Uint8Array {
  const random = seededRandom(seed);
  const waves = Array.from({ length: 6 }, () => [random() * 0.4, random() * 0.4, random() * 6, 5 + 25 * random()] as const);
  return Uint8Array.from({ length: 1024 }, (_, at) =>
    waves.reduce((sum, [u, v, phase, size]) => sum + size * Math.sin(u * (at % 32) + v * Math.floor(at / 32) + phase), 128),
  );
}

// sharp-phash 2.2.0 takes the same 64 coefficients of the DCT-II of 32 × 32 greys, but compares them with their mean.
describe('the frequencies of the hash', () => {
  it.each([1, 2, 3, 4, 5, 6, 7, 8])('against their mean give the bits of sharp-phash (picture %i)', async (seed) => {
    const pixels = thumb(seed);
    const png = await sharp(pixels, { raw: { width: 32, height: 32, channels: 1 } })
      .png()
      .toBuffer();
    const frequencies = lowFrequencies(pixels);
    const mean = frequencies.reduce((sum, value) => sum + value, 0) / 64;
    // Its bits run down the columns, ours along the rows.
    const bits = Array.from({ length: 64 }, (_, at) => (frequencies[(at % 8) * 8 + Math.floor(at / 8)]! > mean ? '1' : '0')).join('');
    expect(bits).toBe(await phash(png));
  });

  it('of a single cosine are one frequency alone (DCT-II, by its definition)', () => {
    const wave = Uint8Array.from({ length: 1024 }, (_, at) => Math.round(128 + 100 * Math.cos(((2 * (at % 32) + 1) * 3 * Math.PI) / 64)));
    // Constant down the columns: nothing is left once the first row is dropped.
    expect(Math.max(...lowFrequencies(wave).map(Math.abs))).toBeLessThan(1);
    const product = Uint8Array.from({ length: 1024 }, (_, at) => {
      const [x, y] = [at % 32, Math.floor(at / 32)];
      return Math.round(128 + 100 * Math.cos(((2 * x + 1) * 3 * Math.PI) / 64) * Math.cos(((2 * y + 1) * 2 * Math.PI) / 64));
    });
    const found = lowFrequencies(product);
    // 100 · 16 · 16 at the third column of the second row.
    expect(found[1 * 8 + 2]! / 25_600).toBeCloseTo(1, 2);
    expect(found.filter((value) => Math.abs(value) > 100)).toHaveLength(1);
  });

  it('are above their median for 32 bits of 64 (Zauner 2010, from memory)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const hash = hashOf(thumb(seed))!;
      expect(hash).toMatch(/^[0-9a-f]{16}$/);
      expect(BigInt(`0x${hash}`).toString(2).replaceAll('0', '')).toHaveLength(32);
    }
  });

  it('are none where there is nothing in the picture', () => {
    expect(hashOf(new Uint8Array(1024).fill(90))).toBeNull();
    expect(hashOf(Uint8Array.from({ length: 1024 }, (_, at) => 90 + (at % 3)))).toBeNull();
  });
});

// The bounds follow a survey of such hashes on photographs: at most 6 bits for a near-double, 20 and more for another picture.
describe('distances', () => {
  const original = () => photograph(960, 640);
  const reopened = async (picture: Sharp) => sharp(await picture.png().toBuffer());

  it.each<[string, (picture: Sharp) => Sharp | Promise<Sharp>]>([
    ['a JPEG of quality 50', async (picture) => sharp(await picture.jpeg({ quality: 50 }).toBuffer())],
    ['half the size', async (picture) => reopened(picture.resize(480, 320))],
    ['grey', async (picture) => reopened(picture.greyscale())],
    ['a third of the light less', async (picture) => reopened(picture.linear(0.67, 0))],
    ['a little softer', async (picture) => reopened(picture.blur(2))],
    ['a pixel or two aside', async (picture) => reopened(picture.extract({ left: 3, top: 2, width: 957, height: 638 }))],
  ])('%s is a near-double', async (_what, change) => {
    expect(hashDistance(await hashOfPicture(original()), await hashOfPicture(await change(original())))).toBeLessThanOrEqual(6);
  });

  it.each<[string, (picture: Sharp) => Sharp | Promise<Sharp>]>([
    ['its mirror image', async (picture) => reopened(picture.flop())],
    ['the picture upside down', async (picture) => reopened(picture.flip())],
    ['a quarter of it', async (picture) => reopened(picture.extract({ left: 0, top: 320, width: 480, height: 320 }))],
  ])('%s is another picture', async (_what, change) => {
    expect(hashDistance(await hashOfPicture(original()), await hashOfPicture(await change(original())))).toBeGreaterThanOrEqual(16);
  });

  it('are counted in bits', () => {
    expect(hashDistance('0000000000000000', 'ffffffffffffffff')).toBe(64);
    expect(hashDistance('8000000000000001', '0000000000000000')).toBe(2);
    expect(hashDistance('00000000f0000000', '0000000000000000')).toBe(4);
  });
});
