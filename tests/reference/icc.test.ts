import { execFileSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import { afterAll, describe, expect, it } from 'vitest';
import { judgeHeader } from '../../api/imaging/judge-file.ts';
import { decodeInside } from '../../api/imaging/make-derivatives.ts';
import { isSrgbProfile } from '../../api/imaging/srgb-profile.ts';

/**
 * The colours of derivatives against Little CMS' own transicc (Debian liblcms2-utils). Profiles: Debian colord-data (CC0) and
 * icc-profiles-free (zlib); Display P3 as sharp writes it.
 */
const COLORD = '/usr/share/color/icc/colord';
const SRGB = '/usr/share/color/icc/sRGB.icc';
const folder = mkdtempSync(path.join(tmpdir(), 'oriel-icc-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const LIMITS = { bytes: 1e9, pixels: 1e8 };
const COLOURS = [
  [128, 128, 128],
  [64, 64, 64],
  [200, 100, 50],
  [50, 100, 200],
  [100, 150, 100],
  [180, 170, 160],
  [255, 0, 0],
  [0, 255, 0],
  [0, 0, 255],
  [255, 255, 255],
  [12, 6, 3],
];

/** `transicc -n -t1 -c0 -q`: relative colorimetric, exact, numbers only. Its banner goes to stderr. */
function transicc(profile: string, colours: number[][]): number[][] {
  const input = `${colours.map((colour) => colour.join('\n')).join('\n')}\nq\n`;
  const output = execFileSync('transicc', ['-n', '-t1', '-c0', '-q', `-i${profile}`, `-o${SRGB}`], {
    input,
    stdio: ['pipe', 'pipe', 'ignore'],
  });
  return output
    .toString()
    .split('\n')
    .map((line) => line.match(/-?\d+(\.\d+)?/g)?.map(Number) ?? [])
    .filter((numbers) => numbers.length === 3)
    .map((numbers) => numbers.map((value) => Math.max(0, Math.min(255, Math.round(value)))));
}

/** A strip of squares, one of each colour, with a profile inside. */
async function strip(profile: string | null): Promise<string> {
  const pixels = Buffer.from(COLOURS.flatMap((colour) => Array.from({ length: 8 }, () => colour).flat()));
  const rows = Buffer.concat(Array.from({ length: 8 }, () => pixels));
  const picture = sharp(rows, { raw: { width: COLOURS.length * 8, height: 8, channels: 3 } });
  const written = path.join(folder, `${path.basename(profile ?? 'untagged')}.tif`);
  const plain = await picture.tiff({ compression: 'none' }).toBuffer();
  writeFileSync(written, plain);
  if (profile) execFileSync('exiftool', ['-q', '-overwrite_original', `-ICC_Profile<=${profile}`, written]);
  return written;
}

async function ours(file: string): Promise<number[][]> {
  const { data, width } = await decodeInside(file, await judgeHeader(file, LIMITS), 2560, LIMITS);
  return COLOURS.map((_, index) => [...data.subarray((4 * width + index * 8 + 4) * 3, (4 * width + index * 8 + 4) * 3 + 3)]);
}

function expectClose(found: number[][], wanted: number[][], tolerance: number): void {
  expect(wanted).toHaveLength(COLOURS.length);
  found.forEach((colour, index) =>
    colour.forEach((value, channel) => {
      const target = wanted[index]?.[channel] ?? Number.NaN;
      expect(Math.abs(value - target), `${COLOURS[index]}: ${colour} instead of ${wanted[index]}`).toBeLessThanOrEqual(tolerance);
    }),
  );
}

describe('the profile of a file is honoured', () => {
  it.each(['AdobeRGB1998', 'ProPhotoRGB', 'ECI-RGBv2', 'WideGamutRGB', 'SwappedRedAndGreen'])('%s', async (name) => {
    const profile = `${COLORD}/${name}.icc`;
    expect(existsSync(profile)).toBe(true);
    expectClose(await ours(await strip(profile)), transicc(profile, COLOURS), 2);
  });

  it('Display P3', async () => {
    const tagged = await sharp({ create: { width: 8, height: 8, channels: 3, background: '#000' } })
      .withIccProfile('p3')
      .jpeg()
      .toBuffer();
    const profile = path.join(folder, 'p3.icc');
    writeFileSync(profile, (await sharp(tagged).metadata()).icc ?? Buffer.alloc(0));
    expect(readFileSync(profile).length).toBeGreaterThan(400);
    expectClose(await ours(await strip(profile)), transicc(profile, COLOURS), 2);
  });

  it('so that swapped red and green are swapped back: 200 100 50 does not stay as it is', async () => {
    const [, , colour = []] = await ours(await strip(`${COLORD}/SwappedRedAndGreen.icc`));
    const [red = 0, green = 0] = colour;
    expect(green).toBeGreaterThan(red);
  });

  it('and a file without one is taken as sRGB', async () => {
    expect(await ours(await strip(null))).toEqual(COLOURS);
  });
});

describe('a profile that says no more than sRGB is passed over', () => {
  it('those of three makers are', async () => {
    const written = await sharp({ create: { width: 8, height: 8, channels: 3, background: '#456' } })
      .withIccProfile('srgb')
      .jpeg()
      .toBuffer();
    const { icc = Buffer.alloc(0) } = await sharp(written).metadata();
    for (const profile of [icc, readFileSync(SRGB), readFileSync(`${COLORD}/sRGB.icc`)]) expect(await isSrgbProfile(profile)).toBe(true);
  });

  it.each(['AdobeRGB1998', 'ProPhotoRGB', 'ECI-RGBv2', 'WideGamutRGB', 'SwappedRedAndGreen', 'AppleRGB', 'Rec709', 'SMPTE-C-RGB'])(
    '%s is not',
    async (name) => {
      expect(await isSrgbProfile(readFileSync(`${COLORD}/${name}.icc`))).toBe(false);
    },
  );

  it('nor is what is no profile, or none of red, green and blue', async () => {
    const cmyk = Buffer.from(readFileSync(SRGB));
    cmyk.write('CMYK', 16, 'latin1');
    for (const profile of [Buffer.alloc(0), cmyk]) expect(await isSrgbProfile(profile)).toBe(false);
  });
});
