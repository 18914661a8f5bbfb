import { readdirSync } from 'node:fs';
import path from 'node:path';
import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import { groupBrackets, type BracketCandidate } from '../../api/domain/brackets.ts';
import { measurePicture } from '../../api/imaging/measure/measure-picture.ts';
import type { RawPicture } from '../../api/imaging/upright.ts';

/**
 * Real photographs (Debian's lomiri-wallpapers-16.04, free licences in its copyright file), exposed and framed anew: here nothing but the pictures
 * can tell a bracket from a pan, as the settings and times of both are the same.
 */
const FOLDER = '/usr/share/backgrounds';
const [WIDTH, HEIGHT] = [360, 320];

const decode = (value: number) => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4);
const encode = (light: number) => (light <= 0.0031308 ? light * 12.92 : 1.055 * light ** (1 / 2.4) - 0.055);

let photographs: RawPicture[] = [];
beforeAll(async () => {
  const names = readdirSync(FOLDER).filter((name) => name.endsWith('.jpg'));
  photographs = await Promise.all(
    names.map(async (name) => {
      const photograph = sharp(path.join(FOLDER, name)).removeAlpha().toColourspace('srgb').resize(800, 400, { fit: 'cover' });
      const { data, info } = await photograph.raw().toBuffer({ resolveWithObject: true });
      return { data, width: info.width, height: info.height, channels: 3 as const };
    }),
  );
});

let state = 1;
const noise = () => (state = (Math.imul(state, 1664525) + 1013904223) >>> 0) / 2 ** 32 - 0.5;

/** A part of the photograph `stops` brighter, with noise, as the thumb of a frame. */
function seen(photograph: RawPicture, left: number, stops: number): string {
  const table = Array.from({ length: 256 }, (_, value) => 255 * encode(Math.min(1, decode(value / 255) * 2 ** stops)));
  const data = Buffer.alloc(WIDTH * HEIGHT * 3);
  for (let y = 0; y < HEIGHT; y++) {
    for (let x = 0; x < WIDTH * 3; x++) {
      const value = table[photograph.data[(y + 30) * photograph.width * 3 + left * 3 + x] as number] as number;
      data[y * WIDTH * 3 + x] = Math.max(0, Math.min(255, Math.round(value + 12 * noise())));
    }
  }
  return measurePicture({ data, width: WIDTH, height: HEIGHT, channels: 3 }).thumb;
}

/** Three exposures 0 − + within two seconds, without any mark of the camera, moved by so many pixels of 360 each time. */
function three(photograph: RawPicture, moved: number, number: number): BracketCandidate[] {
  const exposures: [number, number][] = [
    [1 / 60, 0],
    [1 / 125, -1],
    [1 / 30, 1],
  ];
  return exposures.map(([exposureTime, stops], index) => ({
    id: `${number}-${index}`,
    name: `HL_${1000 + 10 * number + index}.jpg`,
    takenLocal: `2026-10-28T17:${String(number).padStart(2, '0')}:0${index}.5`,
    ...{ takenAt: null, exposureTime, fNumber: 8, iso: 100, exposureBias: null, exposureMode: null },
    ...{ make: 'Halden', model: 'Quay 5', serial: '004711', lens: null, focalLength: 24, width: 6000, height: 4000 },
    thumb: seen(photograph, 20 + moved * index, stops),
  }));
}

const grouped = (moved: number) =>
  photographs.filter((photograph, number) => groupBrackets(three(photograph, moved, number)).some(({ frameIds }) => frameIds.length === 3))
    .length;

describe('Fifteen photographs', () => {
  it('are all there', () => {
    expect(photographs).toHaveLength(15);
  });

  it('are brackets from a tripod', () => {
    expect(grouped(0)).toBe(15);
  });

  it('are brackets in an unsteady hand, which moves by a hundredth of the width', () => {
    expect(grouped(4)).toBeGreaterThanOrEqual(14);
  });

  // What is out of focus all over looks the same wherever one turns.
  it('are no brackets where the camera turned by half a picture each time, but for one without anything in it', () => {
    expect(grouped(180)).toBeLessThanOrEqual(1);
  });
});
