import path from 'node:path';
import type { BracketCandidate } from '../../api/domain/brackets.ts';
import type { FrameMeasures } from '../../api/domain/frame-measures.ts';
import { judgeHeader, type JudgedFile } from '../../api/imaging/judge-file.ts';
import { decodeInside } from '../../api/imaging/make-derivatives.ts';
import { measurePicture } from '../../api/imaging/measure/measure-picture.ts';
import { readSettings, type ShootingSettings } from '../../api/imaging/read-settings.ts';
import { uprightSize, type RawPicture } from '../../api/imaging/upright.ts';

/** What an installation takes in unless it is told otherwise. */
const LIMITS = { bytes: 500_000_000, pixels: 300_000_000 };
/** The size that is measured, shown in the viewer and merged. */
const VIEWER = 2560;

/** A file that was read to its end. */
export interface Examined {
  /** As it was named. */
  file: string;
  judged: JudgedFile;
  settings: ShootingSettings;
  /** Pixels, upright. */
  width: number;
  height: number;
  measures: FrameMeasures;
}

/** A picture at viewer size, in sRGB, upright. @throws Refusal where the file cannot be read to its end */
export function developFile({ file, judged }: Pick<Examined, 'file' | 'judged'>): Promise<RawPicture> {
  return decodeInside(file, judged, VIEWER, LIMITS);
}

/** Reads, decodes and measures a file. @throws Refusal with one sentence where it is no picture that is taken in */
export async function examineFile(file: string): Promise<Examined> {
  const judged = await judgeHeader(file, LIMITS);
  const [settings, picture] = await Promise.all([readSettings(file, judged), developFile({ file, judged })]);
  return { file, judged, settings, ...uprightSize(judged), measures: measurePicture(picture) };
}

/** The same as the search for brackets sees it; files are known by the names they were given. */
export function candidateOf({ file, settings, width, height, measures }: Examined): BracketCandidate {
  const { takenLocal, exposureTime, fNumber, iso, exposureBias, exposureMode, make, model, serial, lens, focalLength } = settings;
  return {
    id: file,
    name: path.basename(file),
    takenAt: settings.takenAt === null ? null : Date.parse(settings.takenAt),
    ...{ takenLocal, exposureTime, fNumber, iso, exposureBias, exposureMode },
    ...{ make, model, serial, lens, focalLength, width, height, thumb: measures.thumb },
  };
}
