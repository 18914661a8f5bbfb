import type { Transaction } from 'objection';
import { announce } from '../../db/live.ts';
import { enqueue } from '../../jobs/queue.ts';
import { problem } from '../../middleware/problem.ts';
import { Upload } from '../../models/Upload.ts';

/** Ends an upload without a frame; what the store holds of it is dropped by a job, so that nothing stays behind. */
export async function endUpload(
  trx: Transaction,
  upload: Upload,
  from: 'receiving' | 'checking',
  end: { state: 'failed' | 'cancelled'; problem: string | null },
): Promise<boolean> {
  const ended = await Upload.within(upload, trx)
    .patch({ ...end, updatedAt: new Date() })
    .where({ id: upload.id, state: from });
  if (ended === 0) return false;
  await enqueue(trx, 'drop-upload', { uploadId: upload.id }, { key: `drop-upload:${upload.id}` });
  const told = end.state === 'failed' ? { what: 'upload-failed', problem: end.problem } : { what: 'upload-cancelled' };
  await announce(trx, `commission:${upload.commissionId}`, { ...told, uploadId: upload.id });
  return true;
}

/** Gives an unfinished upload up. One that has ended already stays as it is. @throws Problem 409 once it is being taken in */
export async function cancelUpload(upload: Upload): Promise<void> {
  const cancelled = await Upload.transaction((trx) => endUpload(trx, upload, 'receiving', { state: 'cancelled', problem: null }));
  if (cancelled) return;
  const { state } = await Upload.within(upload).findById(upload.id).throwIfNotFound();
  if (state === 'checking' || state === 'done') {
    throw problem(409, 'The file is complete and being taken in. Delete the frame instead.', { code: `upload-${state}` });
  }
}
