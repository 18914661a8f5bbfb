import sharp from 'sharp';
import type { FrameMeasures } from '../../domain/frame-measures.ts';
import { asRefusal, judgeFile, judgeHeader, type JudgedFile, type PictureLimits } from '../judge-file.ts';
import type { mergePictures } from '../merge/merge-pictures.ts';
import { makeDerivatives, type Derivatives } from '../make-derivatives.ts';
import { makeWebSize, type WebPicture } from '../make-web-size.ts';
import { readSettings, type ShootingSettings } from '../read-settings.ts';
import { toRaw, uprightSize } from '../upright.ts';
import type { watermarkPicture } from '../watermark.ts';
import type { cleanWatermarkImage } from '../watermark-mark.ts';

/** A file known for what it is and how it was shot. */
export interface Examined {
  judged: JudgedFile;
  settings: ShootingSettings;
  /** Pixels, upright. */
  width: number;
  height: number;
}
export type Prepared = Examined & Derivatives;

async function examine(path: string, judged: JudgedFile): Promise<Examined> {
  return { judged, settings: await readSettings(path, judged), ...uprightSize(judged) };
}

/** What the children can do. Each takes and gives plain data and Buffers only. */
export const tasks = {
  judge: async (path: string, limits: PictureLimits): Promise<Examined> => examine(path, await judgeFile(path, limits)),
  async prepare(path: string, limits: PictureLimits): Promise<Prepared> {
    const judged = await judgeHeader(path, limits);
    const derivatives = await makeDerivatives(path, judged, limits);
    return { ...(await examine(path, judged)), ...derivatives };
  },
  async webSize(path: string, limits: PictureLimits): Promise<WebPicture> {
    return makeWebSize(path, await judgeHeader(path, limits), limits);
  },
  async measure(picture: Buffer): Promise<FrameMeasures> {
    const { measurePicture } = await import('../measure/measure-picture.ts');
    try {
      return measurePicture(await toRaw(sharp(picture).removeAlpha().toColourspace('srgb')));
    } catch (error) {
      throw asRefusal(error);
    }
  },
  async merge(...args: Parameters<typeof mergePictures>) {
    return (await import('../merge/merge-pictures.ts')).mergePictures(...args);
  },
  // The letters' program takes a while to open, and children that take frames in never need it.
  async watermark(...args: Parameters<typeof watermarkPicture>) {
    return (await import('../watermark.ts')).watermarkPicture(...args);
  },
  async cleanWatermark(...args: Parameters<typeof cleanWatermarkImage>) {
    return (await import('../watermark-mark.ts')).cleanWatermarkImage(...args);
  },
};
