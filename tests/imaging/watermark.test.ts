import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import type { WatermarkSettings } from '../../api/domain/watermark-settings.ts';
import { missingLetters, outlineOf } from '../../api/imaging/letter-outlines.ts';
import { watermarkHash } from '../../api/imaging/watermark-hash.ts';
import { cleanWatermarkImage } from '../../api/imaging/watermark-mark.ts';
import { watermarkPicture } from '../../api/imaging/watermark.ts';
import { meanDifference, photograph } from '../support/photograph.ts';

const TEXT: WatermarkSettings = { kind: 'text', text: 'Harrow Lane Studio', opacity: 0.5, size: 0.4, tiled: false };
const [WIDTH, HEIGHT] = [1500, 1000];
let grey: Buffer;
let logo: Buffer;

beforeAll(async () => {
  grey = await sharp({ create: { width: WIDTH, height: HEIGHT, channels: 3, background: '#777777' } })
    .jpeg({ quality: 95 })
    .toBuffer();
  logo = await sharp({ create: { width: 400, height: 100, channels: 4, background: { r: 200, g: 0, b: 0, alpha: 1 } } })
    .png()
    .toBuffer();
});

async function large(settings: WatermarkSettings, image: Buffer | null = null, picture = grey): Promise<Buffer> {
  const [made] = await watermarkPicture(picture, settings, image, [2560]);
  return made?.data ?? Buffer.alloc(0);
}

/** Where a picture differs from plain grey: the box around it, the share of pixels, and the strongest change. */
async function marked(picture: Buffer) {
  const { data, info } = await sharp(picture).raw().toBuffer({ resolveWithObject: true });
  const box = { left: info.width, right: -1, top: info.height, bottom: -1 };
  let [count, most] = [0, 0];
  for (let at = 0; at < data.length; at += 3) {
    const change = Math.max(...[0, 1, 2].map((channel) => Math.abs((data[at + channel] ?? 0) - 0x77)));
    most = Math.max(most, change);
    if (change < 12) continue;
    const [x, y] = [(at / 3) % info.width, Math.floor(at / 3 / info.width)];
    count += 1;
    box.left = Math.min(box.left, x);
    box.right = Math.max(box.right, x);
    box.top = Math.min(box.top, y);
    box.bottom = Math.max(box.bottom, y);
  }
  const [width, height] = [box.right - box.left + 1, box.bottom - box.top + 1];
  return { ...box, width, height, share: count / (info.width * info.height), most };
}

describe('a text', () => {
  it('stands in the middle, as wide as it was set, leaning', async () => {
    for (const size of [0.2, 0.4, 0.8]) {
      const found = await marked(await large({ ...TEXT, size }));
      // A line of length s, leaning by 18 degrees, covers s·cos 18° of the width; the letters' height adds a little.
      const length = size * WIDTH;
      expect(found.width).toBeGreaterThan(length * Math.cos(Math.PI / 10) * 0.97);
      expect(found.width).toBeLessThan(length * 1.05);
      expect(found.height).toBeGreaterThan(length * Math.sin(Math.PI / 10));
      expect(Math.abs((found.left + found.right) / 2 - WIDTH / 2)).toBeLessThan(WIDTH * 0.02);
      expect(Math.abs((found.top + found.bottom) / 2 - HEIGHT / 2)).toBeLessThan(HEIGHT * 0.02);
    }
  });

  it('rises to the right', async () => {
    const { data, info } = await sharp(await large(TEXT))
      .greyscale()
      .raw()
      .toBuffer({ resolveWithObject: true });
    const middle = (from: number, to: number) => {
      let [total, count] = [0, 0];
      for (let y = 0; y < info.height; y++) {
        for (let x = from; x < to; x++) if (Math.abs((data[y * info.width + x] ?? 0) - 0x77) > 12) [total, count] = [total + y, count + 1];
      }
      return total / count;
    };
    expect(middle(0, WIDTH / 2)).toBeGreaterThan(middle(WIDTH / 2, WIDTH) + HEIGHT * 0.05);
  });

  it('is as strong as its opacity', async () => {
    const strengths = await Promise.all([0.1, 0.5, 1].map(async (opacity) => (await marked(await large({ ...TEXT, opacity }))).most));
    expect(strengths[0]).toBeLessThan(30);
    expect(strengths[1]).toBeGreaterThan(50);
    expect(strengths[2]).toBeGreaterThan(120);
    expect((await marked(await large({ ...TEXT, opacity: 0 }))).share).toBe(0);
  });

  it('shows on white and on black', async () => {
    for (const background of ['#ffffff', '#000000']) {
      const plain = await sharp({ create: { width: WIDTH, height: HEIGHT, channels: 3, background } })
        .jpeg()
        .toBuffer();
      expect(await meanDifference(plain, await large({ ...TEXT, tiled: true }, null, plain))).toBeGreaterThan(1);
    }
  });

  it('tiled covers the whole picture: something of it stands in every ninth', async () => {
    for (const size of [0.1, 0.3]) {
      const { data, info } = await sharp(await large({ ...TEXT, size, tiled: true }))
        .greyscale()
        .raw()
        .toBuffer({ resolveWithObject: true });
      const counts = new Array<number>(9).fill(0);
      data.forEach((value, at) => {
        const [x, y] = [at % info.width, Math.floor(at / info.width)];
        const field = Math.floor((x * 3) / info.width) + 3 * Math.floor((y * 3) / info.height);
        if (Math.abs(value - 0x77) > 12) counts[field] = (counts[field] ?? 0) + 1;
      });
      for (const count of counts) expect(count / (data.length / 9)).toBeGreaterThan(0.02);
    }
  });

  it('is the same on every size, and the same every time', async () => {
    const first = await watermarkPicture(grey, TEXT, null);
    const second = await watermarkPicture(grey, TEXT, null);
    expect(first.map(({ size, width, height }) => [size, width, height])).toEqual([
      [480, 480, 320],
      [960, 960, 640],
      [2560, 1500, 1000],
    ]);
    for (const [index, { data, width }] of first.entries()) {
      expect(data.equals(second[index]?.data ?? Buffer.alloc(0))).toBe(true);
      const found = await marked(data);
      expect(Math.abs(found.width / width - 0.39)).toBeLessThan(0.02);
    }
  });

  it('leaves the picture between the letters as it was', async () => {
    const picture = await photograph(900, 600).jpeg({ quality: 95 }).toBuffer();
    const over = await large({ ...TEXT, size: 0.3 }, null, picture);
    const outside = { left: 0, top: 0, width: 200, height: 150 };
    const [before, after] = await Promise.all([picture, over].map((each) => sharp(each).extract(outside).png().toBuffer()));
    expect(await meanDifference(before as Buffer, after as Buffer)).toBeLessThan(6);
  });

  it('lies over a tall picture and a tiny one', async () => {
    const tall = await sharp({ create: { width: 300, height: 2000, channels: 3, background: '#777777' } })
      .jpeg()
      .toBuffer();
    expect((await marked(await large({ ...TEXT, size: 1 }, null, tall))).share).toBeGreaterThan(0.005);
    const tiny = await sharp({ create: { width: 6, height: 4, channels: 3, background: '#777777' } })
      .jpeg()
      .toBuffer();
    expect((await sharp(await large({ ...TEXT, tiled: true }, null, tiny)).metadata()).width).toBe(6);
  });
});

describe('letters', () => {
  it('are drawn as outlines that differ, those with marks among them', () => {
    const paths = ['Vessmouth', 'Ines Okafor ©', 'Łódź', 'Příliš žluťoučký', 'Straße'].map((words) => outlineOf(words)?.path ?? '');
    expect(new Set(paths).size).toBe(5);
    for (const each of paths) expect(each.length).toBeGreaterThan(500);
    expect(missingLetters('Harrow Lane Studio © 2026 – Łódź, Köln, Ærø')).toEqual([]);
  });

  it('that the font has not are named, and left out', () => {
    expect(missingLetters('Studio 日本 日')).toEqual(['日', '本']);
    expect(outlineOf('日本')).toBeNull();
    expect(outlineOf('  ')).toBeNull();
    expect(outlineOf('Studio 日本')?.width).toBeLessThan(outlineOf('Studio Lane')?.width ?? 0);
  });

  it('cannot smuggle markup into the drawing', async () => {
    const found = await marked(await large({ ...TEXT, text: '"/><script>alert(1)</script><image href="file:///etc/passwd"/>' }));
    expect(found.share).toBeGreaterThan(0.001);
    expect(outlineOf('<script>')?.path).toMatch(/^[MLQCZ\d.\s-]+$/);
  });

  it('of no words leave the picture unmarked', async () => {
    expect((await marked(await large({ ...TEXT, text: '日本' }))).share).toBe(0);
    expect((await marked(await large({ ...TEXT, kind: 'none' }))).share).toBe(0);
  });
});

describe('an uploaded PNG', () => {
  const IMAGE: WatermarkSettings = { ...TEXT, kind: 'image', text: '', imageKey: 'key', opacity: 1, size: 0.5 };

  it('takes its share of the width, in its own colours', async () => {
    const found = await marked(await large(IMAGE, logo));
    expect(found.width).toBeGreaterThan(WIDTH * 0.48);
    expect(found.width).toBeLessThan(WIDTH * 0.58);
    const { data } = await sharp(await large(IMAGE, logo))
      .extract({ left: WIDTH / 2, top: HEIGHT / 2, width: 1, height: 1 })
      .raw()
      .toBuffer({ resolveWithObject: true });
    expect(data[0]).toBeGreaterThan(185);
    expect(data[1]).toBeLessThan(20);
  });

  it('of a tall shape stays inside the picture', async () => {
    const tall = await sharp({ create: { width: 50, height: 900, channels: 4, background: '#c00000' } })
      .png()
      .toBuffer();
    const found = await marked(await large({ ...IMAGE, size: 1 }, tall));
    expect(found.top).toBeGreaterThan(0);
    expect(found.bottom).toBeLessThan(HEIGHT - 1);
  });

  it('is decoded and written anew: what was hidden in it is gone', async () => {
    const smuggler = await sharp(logo)
      .withExif({ IFD0: { Copyright: 'hidden' } })
      .png()
      .toBuffer();
    const { data, width, height } = await cleanWatermarkImage(Buffer.concat([smuggler, Buffer.from('PK\x03\x04 behind the end')]));
    expect([width, height]).toEqual([400, 100]);
    expect(data.includes('hidden') || data.includes('behind')).toBe(false);
    expect((await cleanWatermarkImage(await sharp(logo).resize(5000).png().toBuffer())).width).toBe(2000);
  });

  it.each([
    ['a JPEG', () => grey],
    ['an SVG', () => Buffer.from('<svg xmlns="http://www.w3.org/2000/svg" width="9" height="9"/>')],
    ['a cut PNG', () => logo.subarray(0, logo.length / 2)],
    ['nothing', () => Buffer.alloc(0)],
  ])('is refused where it is %s', async (_what, make) => {
    await expect(cleanWatermarkImage(make())).rejects.toMatchObject({ name: 'Refusal' });
  });
});

describe('its name', () => {
  it('is that of its look: the same for the same, another for every change that shows', () => {
    const others: WatermarkSettings[] = [
      { ...TEXT, text: 'Harrow Lane' },
      { ...TEXT, opacity: 0.51 },
      { ...TEXT, size: 0.41 },
      { ...TEXT, tiled: true },
      { ...TEXT, kind: 'none' },
      { ...TEXT, kind: 'image', imageKey: 'a' },
      { ...TEXT, kind: 'image', imageKey: 'b' },
    ];
    const names = [TEXT, ...others].map(watermarkHash);
    expect(new Set(names).size).toBe(8);
    for (const name of names) expect(name).toMatch(/^[0-9a-f]{16}$/);
    expect(watermarkHash({ ...TEXT, imageKey: 'unused' })).toBe(watermarkHash(TEXT));
    expect(watermarkHash({ ...TEXT, kind: 'none', text: 'x', size: 1 })).toBe(watermarkHash({ ...TEXT, kind: 'none' }));
  });
});
