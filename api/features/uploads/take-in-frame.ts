import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import { enqueue } from '../../jobs/queue.ts';
import type { Prepared } from '../../imaging/pixels/tasks.ts';
import { Frame } from '../../models/Frame.ts';
import { Upload } from '../../models/Upload.ts';
import { frameKey, RECIPE } from '../../services/storage-keys.ts';
import { queueMeasuring } from '../frames/queue-measuring.ts';

/** Instants and settings in the columns of a frame. */
function columnsOf(upload: Upload, { judged, settings, width, height, placeholder }: Prepared) {
  const { takenAt, ...rest } = settings;
  return {
    // One id for both: taking the same upload in again meets the same row and the same keys.
    id: upload.id,
    studioId: upload.studioId,
    commissionId: upload.commissionId,
    uploadId: upload.id,
    state: 'ready' as const,
    originalName: upload.originalName,
    name: upload.name,
    mediaType: judged.mediaType,
    sizeBytes: upload.sizeBytes,
    sha256: upload.sha256,
    storageKey: upload.storageKey,
    createdBy: upload.createdBy,
    recipe: RECIPE,
    ...rest,
    // PostgreSQL keeps the microseconds that a JavaScript date would lose.
    takenAt: takenAt as unknown as Date | null,
    width,
    height,
    placeholder,
  };
}

/** Writes the pictures before the row that names them, so that no page ever asks for one that is not there. */
export async function storePictures(ctx: Context, upload: Upload, { pictures }: Pick<Prepared, 'pictures'>): Promise<void> {
  const frame = { studioId: upload.studioId, commissionId: upload.commissionId, id: upload.id, recipe: RECIPE };
  await Promise.all(pictures.map(({ size, data }) => ctx.store.put(frameKey(frame, size), data, 'image/jpeg')));
}

/** The same bytes came by another upload meanwhile: that frame stands, this file goes. */
async function yieldToTwin(trx: Transaction, upload: Upload): Promise<string> {
  const twin = await Frame.within(upload, trx)
    .findOne({ commissionId: upload.commissionId, sha256: upload.sha256 })
    .whereNull('deletedAt')
    .throwIfNotFound();
  if (twin.id !== upload.id) await enqueue(trx, 'drop-twin', { uploadId: upload.id });
  return twin.id;
}

/** Makes the frame of an upload and ends the upload; run again it changes nothing. */
export async function takeInFrame(trx: Transaction, upload: Upload, prepared: Prepared): Promise<void> {
  const frame = await Frame.query(trx).insert(columnsOf(upload, prepared)).onConflict().ignore().returning('createdAt');
  // The time comes from the database: without it no row was made.
  const isNew = (frame.createdAt as Date | undefined) !== undefined;
  if (isNew) await queueMeasuring(trx, upload);
  const frameId = isNew ? upload.id : await yieldToTwin(trx, upload);
  const done = await Upload.within(upload, trx)
    .patch({ state: 'done', frameId, multipartId: null, updatedAt: new Date() })
    .where({ id: upload.id, state: 'checking' });
  if (done === 0) return;
  const topic = `commission:${upload.commissionId}`;
  await announce(trx, topic, { what: 'frame-ready', frameId, uploadId: upload.id });
  await announce(trx, topic, { what: 'upload-done', uploadId: upload.id, frameId });
  if (!upload.createdBy) return;
  // A set of hundreds is one line of the record: the job waits until no more frames come.
  const note = { commissionId: upload.commissionId, accountId: upload.createdBy };
  const key = `note-frames:${note.commissionId}:${note.accountId}`;
  await enqueue(trx, 'note-frames', note, { key, runAt: new Date(Date.now() + 120_000) });
}
