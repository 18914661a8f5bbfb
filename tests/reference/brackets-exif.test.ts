import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { groupBrackets, type BracketCandidate } from '../../api/domain/brackets.ts';
import { judgeHeader } from '../../api/imaging/judge-file.ts';
import { decodeInside } from '../../api/imaging/make-derivatives.ts';
import { measurePicture } from '../../api/imaging/measure/measure-picture.ts';
import { readSettings } from '../../api/imaging/read-settings.ts';
import { exposeFile, type ExposedFile } from '../support/exposed.ts';

/** Brackets in files whose settings Debian's exiftool (libimage-exiftool-perl 12.57) wrote, read back as uploads are. */
const LIMITS = { bytes: 1e9, pixels: 3e8 };
const folder = mkdtempSync(path.join(tmpdir(), 'oriel-brackets-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

async function candidate(exposed: ExposedFile): Promise<BracketCandidate> {
  const file = await exposeFile(folder, exposed);
  const judged = await judgeHeader(file, LIMITS);
  const settings = await readSettings(file, judged);
  const { thumb } = measurePicture(await decodeInside(file, judged, 2560, LIMITS));
  const takenAt = settings.takenAt === null ? null : Date.parse(settings.takenAt);
  return { ...settings, takenAt, id: exposed.name, name: exposed.name, width: judged.width, height: judged.height, thumb };
}

const candidates = async (files: ExposedFile[]) => {
  const read = [];
  for (const file of files) read.push(await candidate(file));
  return read;
};
const name = (number: number) => `HL_${String(number).padStart(4, '0')}.jpg`;

describe('Files from a card', () => {
  it('hold two brackets of three, taken 0 − + in seconds without fractions, and a single frame', async () => {
    const settings: [number, number, string, number][] = [
      [1 / 60, 0, '17:06:12', 0],
      [1 / 250, -2, '17:06:12', -2],
      [1 / 15, 2, '17:06:13', 2],
      [1 / 60, 0, '17:06:14', 0],
      [1 / 250, -2, '17:06:15', -2],
      [1 / 15, 2, '17:06:15', 2],
      [1 / 60, 0, '17:06:40', 0],
    ];
    const files = settings.map(([seconds, stops, clock, bias], index) => ({
      ...{ name: name(412 + index), seconds, stops: stops / 2, taken: `2026:10:28 ${clock}` },
      tags: [`-ExifIFD:ExposureCompensation=${bias}`, `-ExifIFD:ExposureMode=${index === 6 ? 0 : 2}`],
    }));
    const found = groupBrackets((await candidates(files)).reverse());
    expect(found).toEqual([
      { frameIds: [413, 412, 414].map(name), leadId: name(412), steps: [-2, 0, 2], says: '3 frames, 2 stops apart, f/11, ISO 100' },
      { frameIds: [416, 415, 417].map(name), leadId: name(415), steps: [-2, 0, 2], says: '3 frames, 2 stops apart, f/11, ISO 100' },
    ]);
  });

  it('hold a bracket of long exposures over midnight, during which the camera changed its zone', async () => {
    const clocks = ['2026:10:28 23:59:56|00|+01:00', '2026:10:28 23:59:58|50|+01:00', '2026:10:29 01:00:07|00|+02:00'];
    const files = clocks.map((clock, index) => {
      const [taken = '', subSeconds = '', offset = ''] = clock.split('|');
      const stops = index - 1;
      const seconds = [2, 8, 30][index] as number;
      return { name: name(500 + index), seconds, stops, taken, subSeconds, tags: [`-ExifIFD:OffsetTimeOriginal=${offset}`] };
    });
    const found = groupBrackets(await candidates(files));
    expect(found.map(({ frameIds, leadId, says }) => ({ frameIds, leadId, says }))).toEqual([
      { frameIds: [500, 501, 502].map(name), leadId: name(501), says: '3 frames, 2 stops apart, f/11, ISO 100' },
    ]);
  });

  it('hold none where the camera turned between the exposures', async () => {
    const files = [1 / 250, 1 / 60, 1 / 15].map((seconds, index) => ({
      ...{
        name: name(600 + index),
        seconds,
        stops: index - 1,
        turned: 0.17 * index,
        taken: `2026:10:28 18:00:0${index}`,
        subSeconds: '20',
      },
    }));
    expect(groupBrackets(await candidates(files))).toEqual([]);
  });
});
