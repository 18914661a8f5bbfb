import { readdirSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { judgeHeader } from '../../api/imaging/judge-file.ts';
import { makeDerivatives } from '../../api/imaging/make-derivatives.ts';
import { readSettings } from '../../api/imaging/read-settings.ts';
import { readTags } from '../support/exiftool.ts';

/**
 * Photographs with the EXIF of real cameras, from Debian's mate-backgrounds (GPL-2+): our reading against exiftool's. None of
 * them is in this repository. Among them is one whose FNumber is 0.
 */
const FOLDER = '/usr/share/backgrounds/mate/nature';
const LIMITS = { bytes: 1e9, pixels: 3e8 };
const files = readdirSync(FOLDER)
  .filter((name) => name.endsWith('.jpg'))
  .map((name) => path.join(FOLDER, name));

/** Zero stands for "unknown" in these tags. */
const known = (value: unknown) => (typeof value === 'number' && value > 0 ? value : null);

describe('real cameras', () => {
  it('are there, a dozen with four or more that wrote an exposure', async () => {
    expect(files.length).toBeGreaterThanOrEqual(10);
    const exposed = await Promise.all(files.map(async (file) => known((await readTags(file))['ExifIFD:ExposureTime'])));
    expect(exposed.filter((seconds) => seconds !== null).length).toBeGreaterThanOrEqual(4);
  });

  it.each(files)('%s', async (file) => {
    const tags = await readTags(file);
    const ours = await readSettings(file, await judgeHeader(file, LIMITS));
    const text = (name: string) => (tags[name] === undefined ? null : String(tags[name]).trim() || null);
    expect({ make: ours.make, model: ours.model }).toEqual({ make: text('IFD0:Make'), model: text('IFD0:Model') });
    const clock = text('ExifIFD:DateTimeOriginal') ?? text('ExifIFD:CreateDate');
    expect(ours.takenLocal?.slice(0, 19) ?? null).toBe(clock && clock.replace(/^(\d+):(\d+):(\d+) /, '$1-$2-$3T').slice(0, 19));
    const pairs = [
      [ours.exposureTime, known(tags['ExifIFD:ExposureTime'])],
      [ours.iso, known(tags['ExifIFD:ISO'])],
      [ours.focalLength, known(tags['ExifIFD:FocalLength'])],
      [ours.exposureBias, tags['ExifIFD:ExposureCompensation'] ?? null],
    ] as const;
    for (const [found, wanted] of pairs) {
      if (wanted === null) expect(found).toBeNull();
      else expect(found).toBeCloseTo(wanted as number, 6);
    }
    // Where FNumber says nothing, the aperture's APEX companion may still tell it.
    const fNumber = known(tags['ExifIFD:FNumber']) ?? known(tags['ExifIFD:ApertureValue']);
    if (fNumber === null) expect(ours.fNumber).toBeNull();
    else expect(ours.fNumber).toBeCloseTo(fNumber, 4);
  });

  it('give pictures of every size', async () => {
    const file = files.find((name) => name.endsWith('Storm.jpg')) ?? '';
    const { pictures } = await makeDerivatives(file, await judgeHeader(file, LIMITS), LIMITS);
    expect(pictures.map(({ width }) => width)).toEqual([480, 960, 1920]);
  });
});
