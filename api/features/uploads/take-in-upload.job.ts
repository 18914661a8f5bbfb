import type { Context } from '../../context.ts';
import { Refusal } from '../../imaging/refusal.ts';
import { failedTooOften } from '../../jobs/in-vain.ts';
import type { Job, JobTools } from '../../jobs/job.ts';
import { Upload } from '../../models/Upload.ts';
import { takeInFinal } from '../finals/take-in-final.ts';
import { endUpload } from './cancel-upload.ts';
import { withUploadedFile } from './fetch-upload.ts';
import { storePictures, takeInFrame } from './take-in-frame.ts';

async function takeIn(ctx: Context, upload: Upload, signal: AbortSignal): Promise<void> {
  if (upload.purpose === 'frame') {
    const prepared = await withUploadedFile(ctx, upload, signal, (path) => ctx.pixels.prepare(path));
    await storePictures(ctx, upload, prepared);
    await Upload.transaction((trx) => takeInFrame(trx, upload, prepared));
    return;
  }
  const { judged, settings, width, height } = await withUploadedFile(ctx, upload, signal, (path) => ctx.pixels.judge(path));
  if (judged.kind === 'raw')
    throw new Refusal('unsupported', 'The file is a raw file. A final is a finished picture: a JPEG, TIFF or PNG.');
  await Upload.transaction(async (trx) => {
    await takeInFinal(trx, upload, { mediaType: judged.mediaType, width, height, takenLocal: settings.takenLocal });
    await Upload.within(upload, trx)
      .patch({ state: 'done', multipartId: null, updatedAt: new Date() })
      .where({ id: upload.id, state: 'checking' });
  });
}

/** What the person is told where trying again would be in vain; undefined where it may help. */
function sentenceFor(error: unknown, tools: JobTools): string | undefined {
  if (error instanceof Refusal) return error.message;
  if (failedTooOften(error, tools)) {
    return 'The picture could not be read in the time it may take. Export it again, smaller if it is very large.';
  }
  if ((error as { name?: string }).name === 'NoSuchKey') return 'The file is no longer in the store. Upload it again.';
  return tools.lastAttempt ? 'The file could not be taken in, although it was tried several times. Upload it again.' : undefined;
}

/**
 * Takes an uploaded file in: reads it once from the store, checks its SHA-256, judges it by content, makes the frame with its
 * pictures, or the final. Each step may be cut off and done again: pictures are written under the same keys, and the row and
 * the end of the upload come in one transaction.
 */
export const takeInUpload: Job<{ uploadId: string }> = {
  name: 'take-in-upload',
  timeoutSeconds: 600,
  async run(ctx, { uploadId }, tools) {
    const upload = await Upload.query().findById(uploadId);
    if (upload?.state !== 'checking') return;
    try {
      await takeIn(ctx, upload, tools.signal);
    } catch (error) {
      const sentence = tools.signal.aborted ? undefined : sentenceFor(error, tools);
      if (sentence === undefined) throw error;
      await Upload.transaction((trx) => endUpload(trx, upload, 'checking', { state: 'failed', problem: sentence }));
    }
  },
};
