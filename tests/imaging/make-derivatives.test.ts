import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import sharp, { type Sharp } from 'sharp';
import { thumbHashToApproximateAspectRatio, thumbHashToAverageRGBA } from 'thumbhash';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { judgeHeader } from '../../api/imaging/judge-file.ts';
import { makeDerivatives, type Derivative, type Derivatives } from '../../api/imaging/make-derivatives.ts';
import { makeWebSize } from '../../api/imaging/make-web-size.ts';
import { exiftool, readTags, writeTags } from '../support/exiftool.ts';
import { meanDifference, photograph } from '../support/photograph.ts';
import { buildDng } from '../support/tiff-builder.ts';

const LIMITS = { bytes: 1e9, pixels: 300_000_000 };
const folder = mkdtempSync(path.join(tmpdir(), 'oriel-derive-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

let counter = 0;
function file(bytes: Buffer): string {
  const written = path.join(folder, `${++counter}.bin`);
  writeFileSync(written, bytes);
  return written;
}
async function derive(source: string): Promise<Derivatives> {
  return makeDerivatives(source, await judgeHeader(source, LIMITS), LIMITS);
}
const sizes = ({ pictures }: Derivatives) => pictures.map(({ size, width, height }) => [size, width, height]);
const of = ({ pictures }: Derivatives, size: number) => (pictures.find((one) => one.size === size) as Derivative).data;

/** Four coloured quarters: red and green above, blue and white below. */
function quarters(width: number, height: number): Buffer {
  const pixels = Buffer.alloc(width * height * 3);
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const [left, above] = [x < width / 2, y < height / 2];
      const colour = above ? (left ? [200, 20, 20] : [20, 200, 20]) : left ? [20, 20, 200] : [230, 230, 230];
      pixels.set(colour, (y * width + x) * 3);
    }
  }
  return pixels;
}

/** The colours in the middle of the quarters, by letter, row by row. */
async function corners(picture: Buffer): Promise<string> {
  const { data, info } = await sharp(picture).raw().toBuffer({ resolveWithObject: true });
  const at = (x: number, y: number) => {
    const from = (Math.floor(info.height * y) * info.width + Math.floor(info.width * x)) * 3;
    const [red = 0, green = 0, blue = 0] = data.subarray(from, from + 3);
    if (Math.min(red, green, blue) > 150) return 'W';
    return red > 120 ? 'R' : green > 120 ? 'G' : blue > 120 ? 'B' : '?';
  };
  return at(0.25, 0.25) + at(0.75, 0.25) + at(0.25, 0.75) + at(0.75, 0.75);
}

describe('orientation', () => {
  /**
   * What must be stored so that turning by each orientation (CIPA DC-008, tag 0x0112) gives RG above BW; read off the
   * definition "row 0 is the visual ..., column 0 is the visual ...".
   */
  const STORED: Record<number, string> = { 1: 'RGBW', 2: 'GRWB', 3: 'WBGR', 4: 'BWRG', 5: 'RBGW', 6: 'GWRB', 7: 'WGBR', 8: 'BRWG' };
  const COLOURS: Record<string, number[]> = { R: [200, 20, 20], G: [20, 200, 20], B: [20, 20, 200], W: [230, 230, 230] };

  function stored(letters: string, width: number, height: number): Buffer {
    const pixels = Buffer.alloc(width * height * 3);
    for (let y = 0; y < height; y++) {
      for (let x = 0; x < width; x++) {
        const letter = letters[(y < height / 2 ? 0 : 2) + (x < width / 2 ? 0 : 1)] ?? 'R';
        pixels.set(COLOURS[letter] ?? [], (y * width + x) * 3);
      }
    }
    return pixels;
  }

  it.each([1, 2, 3, 4, 5, 6, 7, 8])('%i comes out upright at every size', async (orientation) => {
    const [width, height] = orientation >= 5 ? [800, 1200] : [1200, 800];
    const pixels = stored(STORED[orientation] ?? '', width, height);
    const source = file(
      await sharp(pixels, { raw: { width, height, channels: 3 } })
        .jpeg({ chromaSubsampling: '4:4:4' })
        .toBuffer(),
    );
    await writeTags(source, '-n', `-IFD0:Orientation=${orientation}`);
    const made = await derive(source);
    expect(sizes(made)).toEqual([
      [480, 480, 320],
      [960, 960, 640],
      [2560, 1200, 800],
    ]);
    for (const { data } of made.pictures) expect(await corners(data)).toBe('RGBW');
  });

  it.each(['tiff', 'png', 'webp'] as const)('is followed in a %s too', async (format) => {
    const pixels = stored(STORED[6] ?? '', 800, 1200);
    const picture = sharp(pixels, { raw: { width: 800, height: 1200, channels: 3 } });
    const source = file(await picture.toFormat(format).toBuffer());
    await writeTags(source, '-n', '-IFD0:Orientation=6');
    const made = await derive(source);
    expect(sizes(made)[0]).toEqual([480, 480, 320]);
    expect(await corners(of(made, 480))).toBe('RGBW');
  });

  it('of a raw file turns its preview', async () => {
    const preview = await sharp(stored(STORED[8] ?? '', 800, 1200), { raw: { width: 800, height: 1200, channels: 3 } })
      .jpeg()
      .toBuffer();
    const made = await derive(file(buildDng(preview, { orientation: 8, sensor: { width: 900, height: 1400 } })));
    expect(sizes(made)[2]).toEqual([2560, 1200, 800]);
    expect(await corners(of(made, 960))).toBe('RGBW');
  });
});

describe('sizes', () => {
  it.each([
    ['a wide picture', 5000, 2500, [480, 240], [960, 480], [2560, 1280]],
    ['a tall picture', 1500, 3000, [240, 480], [480, 960], [1280, 2560]],
    ['a small picture, never enlarged', 300, 200, [300, 200], [300, 200], [300, 200]],
    ['a picture between the sizes', 700, 500, [480, 343], [700, 500], [700, 500]],
    ['a panorama', 4000, 40, [480, 5], [960, 10], [2560, 26]],
    ['one pixel', 1, 1, [1, 1], [1, 1], [1, 1]],
  ])('%s', async (_what, width, height, small, medium, large) => {
    const source = file(
      await sharp({ create: { width, height, channels: 3, background: '#8090a0' } })
        .jpeg()
        .toBuffer(),
    );
    const made = await derive(source);
    expect(sizes(made)).toEqual([
      [480, ...small],
      [960, ...medium],
      [2560, ...large],
    ]);
    for (const { data, width: w, height: h } of made.pictures)
      expect(await sharp(data).metadata()).toMatchObject({ width: w, height: h, format: 'jpeg' });
  });
});

describe('what a derivative shows', () => {
  it('is the picture: close to what libvips itself makes of the file', async () => {
    const source = file(await photograph(3000, 2000).jpeg({ quality: 95 }).toBuffer());
    const made = await derive(source);
    for (const { size, data } of made.pictures) {
      const reference = await sharp(source)
        .resize(size, size, { fit: 'inside', withoutEnlargement: true, fastShrinkOnLoad: false })
        .png()
        .toBuffer();
      expect(await meanDifference(reference, data)).toBeLessThan(6);
    }
  });

  it.each([
    ['16-bit TIFF', (picture: Sharp) => picture.toColourspace('rgb16').tiff({ compression: 'deflate' })],
    ['CMYK JPEG', (picture: Sharp) => picture.toColourspace('cmyk').jpeg({ quality: 95 })],
    ['WebP', (picture: Sharp) => picture.webp({ quality: 95 })],
    ['AVIF', (picture: Sharp) => picture.avif({ quality: 90, effort: 0 })],
    ['PNG', (picture: Sharp) => picture.png()],
  ])('is the same from a %s, in 8 bits of sRGB', async (what, write) => {
    const source = file(await write(photograph(600, 400)).toBuffer());
    const made = await derive(source);
    const reference = await photograph(600, 400).png().toBuffer();
    // Without a profile of its own a CMYK file goes through a built-in one, so only roughly the same can be asked for.
    expect(await meanDifference(reference, of(made, 960))).toBeLessThan(what === 'CMYK JPEG' ? 14 : 6);
    for (const { data } of made.pictures) {
      expect(await sharp(data).metadata()).toMatchObject({ space: 'srgb', channels: 3, depth: 'uchar', hasAlpha: false });
    }
  });

  it('is grey where the picture is grey', async () => {
    const made = await derive(file(await photograph(600, 400).toColourspace('b-w').jpeg().toBuffer()));
    const { channels } = await sharp(of(made, 960)).stats();
    const means = channels.map(({ mean }) => mean);
    expect(Math.max(...means) - Math.min(...means)).toBeLessThan(1);
  });

  it('stands on white where the picture is transparent', async () => {
    const clear = sharp({ create: { width: 900, height: 600, channels: 4, background: { r: 10, g: 20, b: 30, alpha: 0 } } });
    const made = await derive(file(await clear.png().toBuffer()));
    for (const { data } of made.pictures) {
      const { channels } = await sharp(data).stats();
      expect(channels.map(({ min }) => min)).toEqual([255, 255, 255]);
    }
  });

  it('keeps full chroma in the viewer alone', async () => {
    const made = await derive(file(await photograph(600, 400).jpeg().toBuffer()));
    const chroma = await Promise.all(made.pictures.map(async ({ data }) => (await sharp(data).metadata()).chromaSubsampling));
    expect(chroma).toEqual(['4:2:0', '4:2:0', '4:4:4']);
  });

  it('has a placeholder of some twenty bytes with its colour and proportions', async () => {
    const blue = sharp({ create: { width: 900, height: 600, channels: 3, background: { r: 40, g: 80, b: 200 } } });
    const { placeholder } = await derive(file(await blue.jpeg().toBuffer()));
    const hash = Buffer.from(placeholder, 'base64');
    expect(hash.length).toBeLessThan(30);
    const { r, g, b, a } = thumbHashToAverageRGBA(hash);
    expect(a).toBe(1);
    for (const [found, wanted] of [
      [r, 40],
      [g, 80],
      [b, 200],
    ] as const)
      expect(Math.abs(found * 255 - wanted)).toBeLessThan(12);
    // ThumbHash keeps the proportions only roughly, in sevenths.
    expect(Math.abs(thumbHashToApproximateAspectRatio(hash) - 1.5)).toBeLessThan(0.3);
  });
});

describe('metadata', () => {
  let source: string;
  beforeAll(async () => {
    source = file(await photograph(1300, 900).withIccProfile('p3').jpeg().toBuffer());
    await writeTags(
      source,
      ...['-GPSLatitude=50.0875', '-GPSLatitudeRef=N', '-GPSLongitude=14.4213', '-GPSLongitudeRef=E', '-Artist=<script>alert(1)</script>'],
      ...[
        '-UserComment="><img onerror=x>',
        '-SerialNumber=0420',
        '-XMP-dc:Title=Ropewalk Library',
        '-IPTC:By-line=Ines Okafor',
        '-Comment=a comment',
      ],
      '-IFD1:Compression=6',
    );
  });
  const OURS = ['ExifTool', 'System', 'File', 'Composite', 'JFIF'];

  it('leaves every derivative, place and profile included', async () => {
    expect(Object.keys(await readTags(source, '-a')).some((name) => name.startsWith('GPS:'))).toBe(true);
    for (const { data } of (await derive(source)).pictures) {
      const written = file(data);
      const tags = Object.keys(await readTags(written, '-a', '-u')).filter(
        (name) => !OURS.includes(name.split(':')[0] ?? '') && name !== 'SourceFile',
      );
      expect(tags).toEqual([]);
      expect(await exiftool('-v0', '-GPS:all', '-ICC_Profile:all', '-XMP:all', '-IPTC:all', written)).not.toMatch(/GPS|Profile|Okafor/);
    }
  });

  it('leaves the web size as well, which names its colour space and nothing else', async () => {
    const judged = await judgeHeader(source, LIMITS);
    const { data, width, height } = await makeWebSize(source, judged, LIMITS);
    expect([width, height]).toEqual([1300, 900]);
    const tags = await readTags(file(data), '-a');
    const groups = new Set(Object.keys(tags).map((name) => name.split(':')[0]));
    expect(
      [...groups].filter((group) => group && ![...OURS, 'SourceFile'].includes(group)).every((group) => group?.startsWith('ICC')),
    ).toBe(true);
    expect(String(tags['ICC_Profile:ProfileDescription'])).toMatch(/sRGB/);
  });
});

describe('web size', () => {
  it('has 2048 pixels at most, upright', async () => {
    const source = file(
      await sharp(quarters(2400, 3000), { raw: { width: 2400, height: 3000, channels: 3 } })
        .jpeg()
        .toBuffer(),
    );
    await writeTags(source, '-n', '-IFD0:Orientation=6');
    const { width, height, data } = await makeWebSize(source, await judgeHeader(source, LIMITS), LIMITS);
    expect([width, height]).toEqual([2048, 1638]);
    // 6: a quarter turn clockwise brings the left column to the top.
    expect(await corners(data)).toBe('BRWG');
  });
});
