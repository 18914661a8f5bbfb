import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { exposureValue100 } from '../../api/domain/exposure.ts';
import { judgeHeader } from '../../api/imaging/judge-file.ts';
import { readSettings, type ShootingSettings } from '../../api/imaging/read-settings.ts';
import { exiftool, readTags, writeTags } from '../support/exiftool.ts';
import { photograph } from '../support/photograph.ts';
import { buildDng } from '../support/tiff-builder.ts';

/**
 * Shooting settings against Debian's exiftool (libimage-exiftool-perl 12.57), which writes the files and reads them back.
 * The traps are those met in real files, named where they come from.
 */
const LIMITS = { bytes: 1e9, pixels: 3e8 };
const folder = mkdtempSync(path.join(tmpdir(), 'oriel-exif-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

let jpeg: Buffer;
beforeAll(async () => {
  jpeg = await photograph(120, 80).jpeg().toBuffer();
});

let counter = 0;
async function shot(tags: string[], bytes: Buffer = jpeg, extension = 'jpg'): Promise<string> {
  const file = path.join(folder, `${++counter}.${extension}`);
  writeFileSync(file, bytes);
  if (tags.length > 0) await writeTags(file, '-n', ...tags);
  return file;
}
async function settings(file: string): Promise<ShootingSettings> {
  return readSettings(file, await judgeHeader(file, LIMITS));
}
const read = async (...tags: string[]) => settings(await shot(tags));

const FULL = [
  ...['-IFD0:Make=Vessmouth Optical', '-IFD0:Model=VO 7', '-ExifIFD:LensModel=24-70 mm f/4', '-ExifIFD:SerialNumber=0042017'],
  ...['-ExifIFD:DateTimeOriginal=2026:10:28 17:06:12', '-ExifIFD:SubSecTimeOriginal=34', '-ExifIFD:OffsetTimeOriginal=+01:00'],
  ...[
    '-ExifIFD:ExposureTime=1/125',
    '-ExifIFD:FNumber=5.6',
    '-ExifIFD:ISO=100',
    '-ExifIFD:FocalLength=35',
    '-ExifIFD:FocalLengthIn35mmFormat=53',
  ],
  ...['-ExifIFD:ExposureCompensation=-0.6666666', '-ExifIFD:ExposureMode=2', '-IFD0:Orientation=6'],
  ...['-GPS:GPSLatitude=50.0875', '-GPS:GPSLatitudeRef=N', '-GPS:GPSLongitude=14.4213', '-GPS:GPSLongitudeRef=W'],
];

/** What exiftool says, in our words. */
async function oracle(file: string): Promise<Partial<ShootingSettings>> {
  const tags = await readTags(file);
  const of = <T>(name: string) => (tags[name] ?? null) as T | null;
  const clock = of<string>('ExifIFD:DateTimeOriginal');
  const parts = of<string | number>('ExifIFD:SubSecTimeOriginal');
  return {
    takenLocal: clock && clock.replace(/^(\d+):(\d+):(\d+) /, '$1-$2-$3T') + (parts === null ? '' : `.${parts}`),
    make: of('IFD0:Make'),
    model: of('IFD0:Model'),
    lens: of('ExifIFD:LensModel'),
    fNumber: of('ExifIFD:FNumber'),
    exposureTime: of('ExifIFD:ExposureTime'),
    iso: of('ExifIFD:ISO'),
    focalLength: of('ExifIFD:FocalLength'),
    focalLength35: of('ExifIFD:FocalLengthIn35mmFormat'),
    exposureBias: of('ExifIFD:ExposureCompensation'),
    exposureMode: of('ExifIFD:ExposureMode'),
    orientation: of<number>('IFD0:Orientation') ?? 1,
  };
}

function expectLike(ours: ShootingSettings, theirs: Partial<ShootingSettings>): void {
  for (const [name, value] of Object.entries(theirs)) {
    const found = ours[name as keyof ShootingSettings];
    if (typeof value === 'number') expect(found, name).toBeCloseTo(value, 6);
    else expect(found, name).toBe(value);
  }
}

describe('what exiftool writes is read as exiftool reads it', () => {
  it.each([
    ['JPEG', 'jpg', async () => jpeg],
    ['TIFF', 'tif', () => photograph(120, 80).tiff({ compression: 'lzw' }).toBuffer()],
    ['16-bit TIFF of some size', 'tif', () => photograph(900, 600).toColourspace('rgb16').tiff({ compression: 'none' }).toBuffer()],
    ['PNG', 'png', () => photograph(120, 80).png().toBuffer()],
    ['WebP', 'webp', () => photograph(120, 80).webp().toBuffer()],
    ['AVIF', 'avif', () => photograph(120, 80).avif({ effort: 0 }).toBuffer()],
    ['DNG', 'dng', async () => buildDng(await photograph(1200, 800).jpeg().toBuffer())],
  ] as const)('in a %s', async (_format, extension, write) => {
    const file = await shot(FULL, await write(), extension);
    const ours = await settings(file);
    const theirs = await oracle(file);
    expect(theirs.exposureTime).toBeCloseTo(1 / 125, 9);
    // In AVIF the turn belongs to the container, and the EXIF tag says nothing about it.
    if (extension === 'avif') theirs.orientation = 1;
    expectLike(ours, theirs);
    expect(ours).toMatchObject({ takenOffsetMinutes: 60, takenAt: '2026-10-28T16:06:12.34Z', serial: '0042017' });
    expect(ours.latitude).toBeCloseTo(50.0875, 6);
    expect(ours.longitude).toBeCloseTo(-14.4213, 6);
  });

  it("in every row of settings, whose EV100 is exiftool's LightValue", async () => {
    const rows = [
      [16, 1 / 125, 100],
      [5.6, 1 / 60, 100],
      [2.8, 1 / 30, 400],
      [8, 30, 100],
      [1.4, 1 / 15, 1600],
      [4, 1 / 4000, 100],
      [16, 30, 50],
      [14, 4, 100],
      [9.4, 10 / 2134, 100],
      [2, 0.00051, 50],
    ] as const;
    for (const [fNumber, seconds, iso] of rows) {
      const file = await shot([`-FNumber=${fNumber}`, `-ExposureTime=${seconds}`, `-ISO=${iso}`]);
      const ours = await settings(file);
      const theirs = await readTags(file, '-LightValue');
      expect(exposureValue100({ fNumber: ours.fNumber, seconds: ours.exposureTime, iso: ours.iso })).toBeCloseTo(
        theirs['Composite:LightValue'] as number,
        9,
      );
    }
  });
});

describe('traps of real files', () => {
  it('prefers ExposureTime and FNumber to their APEX companions (an action camera wrote 1/1205 s beside 1/1024 s)', async () => {
    const ours = await read('-ExposureTime=1/1205', `-ShutterSpeedValue=${1 / 1024}`, '-FNumber=5.6', '-ApertureValue=5.657');
    expect(ours.exposureTime).toBeCloseTo(1 / 1205, 9);
    expect(ours.fNumber).toBeCloseTo(5.6, 9);
  });

  it('takes the APEX companions where they stand alone', async () => {
    const ours = await read('-ShutterSpeedValue=0.015625', '-ApertureValue=8');
    expect(ours.exposureTime).toBeCloseTo(1 / 64, 5);
    expect(ours.fNumber).toBeCloseTo(8, 5);
  });

  it('ignores a ShutterSpeedValue of −2147483648 (an early reflex camera wrote it)', async () => {
    const file = await shot(['-ShutterSpeedValue=0.015625', '-FNumber=8']);
    patchRational(file, 0x9201, [-2147483648, 1]);
    expect(await settings(file)).toMatchObject({ exposureTime: null, fNumber: 8 });
  });

  it('ignores an exposure bias no camera can have, and keeps odd ones', async () => {
    const file = await shot(['-ExposureCompensation=1']);
    patchRational(file, 0x9204, [-1651910498, 10]);
    expect((await settings(file)).exposureBias).toBeNull();
    for (const bias of [0.7, 0.65, 0.3, 1.3264, -2, 0])
      expect((await read(`-ExposureCompensation=${bias}`)).exposureBias).toBeCloseTo(bias, 4);
  });

  it('takes f/0, 0 s, ISO 0 and a focal length of 0 as unknown', async () => {
    const ours = await read('-FNumber=0', '-ExposureTime=0', '-ISO=0', '-FocalLength=0', '-FocalLengthIn35mmFormat=0');
    expect(ours).toMatchObject({ fNumber: null, exposureTime: null, iso: null, focalLength: null, focalLength35: null });
  });

  it('takes fractions over nothing as unknown', async () => {
    const file = await shot(['-ExposureTime=1/125', '-FNumber=8']);
    patchRational(file, 0x829a, [1, 0]);
    patchRational(file, 0x829d, [0, 0]);
    expect(await settings(file)).toMatchObject({ exposureTime: null, fNumber: null });
  });

  it('looks at the 32-bit tags where ISO is 65535 (CIPA DC-008-2012, PhotographicSensitivity)', async () => {
    expect((await read('-ISO=65535', '-SensitivityType=2', '-RecommendedExposureIndex=102400')).iso).toBe(102400);
    expect((await read('-ISO=65535', '-SensitivityType=1', '-StandardOutputSensitivity=204800')).iso).toBe(204800);
    expect((await read('-ISO=65535', '-SensitivityType=3', '-ISOSpeed=409600')).iso).toBe(409600);
    expect((await read('-ISO=65535')).iso).toBeNull();
  });

  it('takes an orientation that does not exist as upright', async () => {
    expect((await read('-IFD0:Orientation=99')).orientation).toBe(1);
    expect((await read('-IFD0:Orientation=0')).orientation).toBe(1);
  });

  it.each([
    ['zeros', '0000:00:00 00:00:00', null],
    ['blanks', '    :  :     :  :  ', null],
    ['a day that is in no calendar', '2026:02:30 10:00:00', null],
    ['a month beyond twelve', '2026:13:01 10:00:00', null],
    ['the last second of a leap day', '2024:02:29 23:59:59', '2024-02-29T23:59:59'],
    ['dashes', '2026-10-28 17:06:12', '2026-10-28T17:06:12'],
  ])('reads a time of %s', async (_what, written, expected) => {
    const file = await shot(['-DateTimeOriginal=2026:01:01 00:00:00']);
    const bytes = readFileSync(file);
    bytes.write(written, bytes.indexOf('2026:01:01 00:00:00'), 'latin1');
    writeFileSync(file, bytes);
    expect((await settings(file)).takenLocal).toBe(expected);
  });

  it.each([
    ['+02:00', 120, '2026-10-28T15:06:12Z'],
    ['-09:30', -570, '2026-10-29T02:36:12Z'],
    ['+13:45', 825, '2026-10-28T03:21:12Z'],
    ['   :  ', null, null],
    ['', null, null],
  ])('reads the offset "%s"', async (offset, minutes, instant) => {
    const ours = await read('-DateTimeOriginal=2026:10:28 17:06:12', ...(offset ? [`-OffsetTimeOriginal=${offset}`] : []));
    expect(ours).toMatchObject({ takenLocal: '2026-10-28T17:06:12', takenOffsetMinutes: minutes, takenAt: instant });
  });

  it("takes the offset of the file's time for an exposure of the same second, and for no other", async () => {
    const tags = ['-DateTimeOriginal=2026:10:28 17:06:12', '-OffsetTime=+01:00'];
    expect((await read(...tags, '-ModifyDate=2026:10:28 17:06:12')).takenOffsetMinutes).toBe(60);
    expect((await read(...tags, '-ModifyDate=2026:11:02 09:00:00')).takenOffsetMinutes).toBeNull();
  });

  it.each([
    ['5', '.5'],
    ['034', '.034'],
    ['00', ''],
    ['1234567', '.123456'],
  ])('reads sub-seconds "%s" as a fraction', async (written, expected) => {
    const ours = await read('-DateTimeOriginal=2026:10:28 17:06:12', `-SubSecTimeOriginal=${written}`);
    expect(ours.takenLocal).toBe(`2026-10-28T17:06:12${expected}`);
  });

  it('falls back to the time of digitising, never to that of the last change', async () => {
    expect((await read('-CreateDate=2026:10:28 17:06:12')).takenLocal).toBe('2026-10-28T17:06:12');
    expect((await read('-ModifyDate=2026:10:28 17:06:12')).takenLocal).toBeNull();
  });

  it('needs both halves of a place, with their letters', async () => {
    expect(await read('-GPS:GPSLatitude=50', '-GPS:GPSLatitudeRef=S', '-GPS:GPSLongitude=14', '-GPS:GPSLongitudeRef=E')).toMatchObject({
      latitude: -50,
      longitude: 14,
    });
    expect(await read('-GPS:GPSLatitude=50', '-GPS:GPSLatitudeRef=N')).toMatchObject({ latitude: null, longitude: null });
  });

  it('keeps text as text: markup, formulas and letters of all kinds', async () => {
    const ours = await read('-Make=<script>alert(1)</script>', '-Model==cmd|calc', '-LensModel=Weitwinkel Łódź 日本');
    expect(ours).toMatchObject({ make: '<script>alert(1)</script>', model: '=cmd|calc', lens: 'Weitwinkel Łódź 日本' });
  });

  it('answers whatever a file holds', async () => {
    const file = await shot(FULL);
    const whole = readFileSync(file);
    const start = whole.indexOf('Exif\0\0');
    const judged = await judgeHeader(file, LIMITS);
    // Every byte of the header and of the first directories broken in turn; none may throw, and none may name a time that is none.
    for (let at = start + 6; at < start + 406; at += 5) {
      const broken = Buffer.from(whole);
      broken[at] = (broken[at] ?? 0) ^ 0xff;
      writeFileSync(file, broken);
      const ours = await readSettings(file, judged);
      expect(ours.takenLocal ?? '2000-01-01T00:00:00').toMatch(/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d(\.\d+)?$/);
      for (const value of Object.values(ours)) if (typeof value === 'number') expect(Number.isFinite(value)).toBe(true);
    }
  });

  it('says nothing of a file without EXIF', async () => {
    expect(Object.values(await read()).filter((value) => value !== null && value !== 1)).toEqual([]);
    expect(await exiftool('-v0', '-EXIF:all', await shot([]))).not.toContain('Exposure');
  });
});

/** Overwrites the two numbers of a rational in place: exiftool writes no value that it holds to be wrong. */
function patchRational(file: string, tag: number, [above, below]: [number, number]): void {
  const bytes = readFileSync(file);
  const start = bytes.indexOf('Exif\0\0') + 6;
  const big = bytes.toString('latin1', start, start + 2) === 'MM';
  const u16 = (at: number) => (big ? bytes.readUInt16BE(at) : bytes.readUInt16LE(at));
  const u32 = (at: number) => (big ? bytes.readUInt32BE(at) : bytes.readUInt32LE(at));
  const write = (value: number, at: number) => (big ? bytes.writeInt32BE(value, at) : bytes.writeInt32LE(value, at));
  const entryOf = (directory: number, wanted: number): number => {
    const count = u16(start + directory);
    const at = Array.from({ length: count }, (_, index) => start + directory + 2 + index * 12).find((each) => u16(each) === wanted);
    if (at === undefined) throw new Error(`no tag ${wanted.toString(16)}`);
    return at;
  };
  const exif = u32(entryOf(u32(start + 4), 0x8769) + 8);
  const value = start + u32(entryOf(exif, tag) + 8);
  write(above, value);
  write(below, value + 4);
  writeFileSync(file, bytes);
}
