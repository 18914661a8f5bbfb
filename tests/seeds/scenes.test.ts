import { mkdtempSync, rmSync, statSync } from 'node:fs';
import fs from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { exiftool } from 'exiftool-vendored';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { lightOf } from '../../seeds/scenes/develop.ts';
import { type DrawnFrame, drawDemoFrames } from '../../seeds/scenes/draw.ts';
import { planFrames } from '../../seeds/scenes/frames.ts';

const today = new Date('2026-12-01T09:00:00Z');
/** A bracket of five by lamplight, one of three in grey daylight, an upright frame, a TIFF, and the one with a place. */
const scenes = ['library-blue', 'needle-walk', 'library-gable', 'exchange-up', 'swing-day', 'needle-dusk'];
const longSide = 240;

const dir = mkdtempSync(path.join(tmpdir(), 'oriel-scenes-'));
let frames: DrawnFrame[] = [];

beforeAll(async () => {
  frames = await drawDemoFrames({ dir, today, longSide, scenes });
}, 240_000);

afterAll(async () => {
  await exiftool.end();
  rmSync(dir, { recursive: true, force: true });
});

const named = (name: string): DrawnFrame => {
  const frame = frames.find((each) => each.name === name);
  if (!frame) throw new Error(`${name} was not drawn`);
  return frame;
};

/** Linear light of every pixel's green, by the inverse of the curve it was developed with. */
async function greens(file: string): Promise<number[]> {
  const { data, info } = await sharp(file).raw().toBuffer({ resolveWithObject: true });
  return Array.from({ length: info.width * info.height }, (_, i) => lightOf(data[i * info.channels + 1]! / 255));
}

/** Median ratio of two exposures over the pixels that neither of them lost. */
async function medianRatio(a: string, b: string): Promise<number> {
  const [light, other] = [await greens(a), await greens(b)];
  const ratios = light.flatMap((v, i) => (v > 0.03 && v < 1.5 && other[i]! > 0.03 && other[i]! < 1.5 ? [other[i]! / v] : []));
  expect(ratios.length).toBeGreaterThan(300);
  return ratios.sort((p, q) => p - q)[Math.floor(ratios.length / 2)]!;
}

describe('The plan', () => {
  const plan = planFrames(today).flatMap((take) => take.frames);
  const shoots = plan.filter(({ finish }) => finish === null);

  it('has some sixty frames of at least six megapixels, of more than twenty scenes', () => {
    expect(shoots.length).toBeGreaterThanOrEqual(58);
    expect(new Set(shoots.map(({ scene }) => scene)).size).toBeGreaterThanOrEqual(20);
    for (const { width, height } of shoots) expect(width * height).toBeGreaterThanOrEqual(6_000_000);
  });

  it('has brackets of three and of five, each frame within two seconds of the end of the one before', () => {
    const brackets = new Map<string, typeof shoots>();
    for (const frame of shoots) if (frame.bracket) brackets.set(frame.bracket, [...(brackets.get(frame.bracket) ?? []), frame]);
    expect(new Set([...brackets.values()].map((each) => each.length))).toEqual(new Set([3, 5]));
    for (const bracket of brackets.values()) {
      bracket.slice(1).forEach((frame, i) => {
        const gap = Date.parse(frame.shot.takenAt) - Date.parse(bracket[i]!.shot.takenAt) - bracket[i]!.shot.seconds * 1000;
        expect(gap).toBeGreaterThan(0);
        expect(gap).toBeLessThan(2000);
      });
    }
  });

  it('numbers frames without a gap within a day, in the order they were taken', () => {
    for (const assignment of new Set(shoots.map((frame) => frame.assignment))) {
      const day = shoots.filter((frame) => frame.assignment === assignment);
      const numbers = day.map(({ name }) => Number(name.slice(3, 7)));
      expect(numbers).toEqual(numbers.map((_, i) => numbers[0]! + i));
      const times = day.map(({ shot }) => Date.parse(shot.takenAt));
      expect(times).toEqual([...times].sort((a, b) => a - b));
    }
  });

  it('counts the shoots back from the day it is given', () => {
    for (const { shot } of shoots) expect(Date.parse(shot.takenAt)).toBeLessThan(today.getTime());
    const later = planFrames(new Date(today.getTime() + 86_400_000))[0]!.frames[0]!;
    expect(Date.parse(later.shot.takenAt) - Date.parse(shoots[0]!.shot.takenAt)).toBe(86_400_000);
  });
});

describe('A bracket', () => {
  it('is one light at true steps: twice the exposure is twice the linear light', async () => {
    const steps = ['HL_0426.jpg', 'HL_0427.jpg', 'HL_0428.jpg', 'HL_0429.jpg', 'HL_0430.jpg'].map(named);
    expect(steps.map(({ step }) => step)).toEqual([-2, -1, 0, 1, 2]);
    for (let i = 1; i < steps.length; i++) {
      const ratio = await medianRatio(steps[i - 1]!.file, steps[i]!.file);
      expect(Math.abs(Math.log2(ratio) - 1)).toBeLessThan(0.06);
    }
  });

  it('of three spans two steps each way', async () => {
    const ratio = await medianRatio(named('HL_0335.jpg').file, named('HL_0334.jpg').file);
    expect(Math.log2(ratio)).toBeGreaterThan(1.85);
    expect(Math.log2(ratio)).toBeLessThan(2.15);
  });

  it('loses lights when exposed long and shadows when exposed short', async () => {
    const shares = async (name: string): Promise<[number, number]> => {
      const light = await greens(named(name).file);
      return [light.filter((v) => v > 4).length / light.length, light.filter((v) => v < 0.01).length / light.length];
    };
    const [short, long] = [await shares('HL_0426.jpg'), await shares('HL_0430.jpg')];
    expect(long[0]).toBeGreaterThan(short[0]);
    expect(short[1]).toBeGreaterThan(long[1] + 0.1);
  });
});

describe('What a file says of itself, read by ExifTool', () => {
  it('agrees with the plan', async () => {
    for (const planned of planFrames(today, longSide).flatMap((take) => take.frames.filter(() => scenes.includes(take.scene.name)))) {
      const tags = await exiftool.read(path.join(dir, planned.name), { readArgs: ['-fast', '-n'] });
      const { shot } = planned;
      expect(tags).toMatchObject({ Make: shot.make, Model: shot.model, LensModel: shot.lens, SerialNumber: shot.serial });
      expect(tags).toMatchObject({
        FNumber: shot.aperture,
        ISO: shot.sensitivity,
        ExposureMode: shot.bracketed ? 2 : 0,
        Orientation: shot.orientation,
      });
      expect(tags.ExposureTime).toBeCloseTo(shot.seconds, 4);
      expect(tags.ExposureCompensation).toBeCloseTo(shot.bias, 1);
      expect(tags.FocalLength).toBeCloseTo(shot.focal, 1);
      expect(tags.FocalLengthIn35mmFormat).toBe(shot.focalAs35);
      const taken = tags.DateTimeOriginal as { toISOString(): string };
      // ExifTool puts date, sub-seconds and offset together.
      expect(Date.parse(taken.toISOString()), planned.name).toBe(Date.parse(shot.takenAt));
      expect(String(tags.SubSecTimeOriginal).padStart(2, '0')).toBe(shot.takenAt.slice(20, 22));
      expect(tags.OffsetTimeOriginal).toBe('+01:00');
    }
  });

  it('has no fault that ExifTool finds', async () => {
    for (const name of ['HL_0426.jpg', 'HL_0267.tif', 'HL_0341.jpg', 'HL_0339.jpg', 'HL_0424.jpg']) {
      const tags = (await exiftool.read(named(name).file, { readArgs: ['-validate', '-warning', '-a'] })) as unknown as Record<
        string,
        unknown
      >;
      expect([tags.Validate, tags.Warning], name).toEqual(['OK', undefined]);
    }
  });

  it('names a place in one frame alone', async () => {
    for (const frame of frames) {
      const tags = await exiftool.read(frame.file, { readArgs: ['-n'] });
      expect(tags.GPSLatitude !== undefined, frame.name).toBe(frame.name === 'HL_0339.jpg');
    }
  });

  it('exposure times of a bracket follow its steps as closely as cameras name them', () => {
    const bracket = planFrames(today).find((take) => take.scene.name === 'library-blue' && take.frames.length === 5)!;
    for (const { step, shot } of bracket.frames) {
      const middle = bracket.frames.find((frame) => frame.step === 0)!;
      expect(Math.abs(Math.log2(shot.seconds / middle.shot.seconds) - step)).toBeLessThan(0.12);
    }
  });
});

describe('Files', () => {
  it('hold the pixels they say, sRGB but for one in a wider space, one kind with 16 bits', async () => {
    const tiff = await sharp(named('HL_0267.tif').file).metadata();
    expect(tiff).toMatchObject({ format: 'tiff', depth: 'ushort', space: 'rgb16', width: 160, height: 240 });
    const upright = await sharp(named('HL_0424.jpg').file).metadata();
    expect(upright).toMatchObject({ width: 240, height: 160, orientation: 6 });
    expect(named('HL_0424.jpg')).toMatchObject({ width: 160, height: 240 });
    const profiles = await Promise.all(['HL_0341.jpg', 'HL_0339.jpg'].map(async (name) => exiftool.read(named(name).file)));
    const [wide, usual] = profiles.map((tags) => String(tags.ProfileDescription));
    expect(usual).toMatch(/sRGB/i);
    expect(wide).toMatch(/P3/i);
  });

  it('are not drawn again by a second call', async () => {
    const before = frames.map(({ file }) => statSync(file).mtimeMs);
    const told: [number, number][] = [];
    const again = await drawDemoFrames({ dir, longSide, scenes, onProgress: (drawn, total) => told.push([drawn, total]) });
    expect(told).toEqual([[frames.length, frames.length]]);
    expect(again).toEqual(frames);
    expect(again.map(({ file }) => statSync(file).mtimeMs)).toEqual(before);
  });

  it('are the same wherever and whenever they are drawn, and a missing one is drawn again with the dates of the first run', async () => {
    const { file } = named('HL_0339.jpg');
    const first = await fs.readFile(file);
    await fs.rm(file);
    await fs.writeFile(`${file}.part`, 'what a killed run leaves');
    await drawDemoFrames({ dir, today: new Date('2027-03-01T00:00:00Z'), longSide, scenes });
    expect((await fs.readFile(file)).equals(first)).toBe(true);
  }, 60_000);
});
