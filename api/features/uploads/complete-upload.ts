import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import { enqueue } from '../../jobs/queue.ts';
import { type Problem, problem } from '../../middleware/problem.ts';
import { Upload } from '../../models/Upload.ts';
import { isUnknownUpload, isWhole, missingParts, readParts } from './upload-parts.ts';

/** "3", "3 and 7", "1, 2 and 9", and no more than so many. */
function inWords(numbers: number[], most = 12): string {
  const shown = numbers.slice(0, most).map(String);
  if (numbers.length > most) return `${shown.join(', ')} and ${numbers.length - most} more`;
  return shown.length < 2 ? shown.join('') : `${shown.slice(0, -1).join(', ')} and ${shown.at(-1)}`;
}

function partsMissing(missing: number[]): Problem {
  const sentence = missing.length === 1 ? `Part ${inWords(missing)} is missing.` : `The parts ${inWords(missing)} are missing.`;
  return problem(409, sentence, {
    code: 'parts-missing',
    errors: missing.slice(0, 100).map((number) => ({ path: `parts.${number}`, message: 'This part is missing.' })),
  });
}

async function joinParts(ctx: Context, upload: Upload): Promise<void> {
  const { upload: current, parts, joined } = await readParts(ctx, upload);
  if (joined) return;
  const missing = missingParts(current, parts);
  if (missing.length > 0 || current.multipartId === null) throw partsMissing(missing);
  try {
    await ctx.store.completeMultipart(current.storageKey, current.multipartId, parts);
  } catch (error) {
    // Another call joined them between the two looks.
    if (!isUnknownUpload(error) || !(await isWhole(ctx, current))) throw error;
  }
}

/**
 * Ends the sending: the store joins the parts and the file waits to be taken in. Calling it again changes nothing.
 * @throws Problem 409 naming the parts that are missing, or where the upload was refused or given up
 */
export async function completeUpload(ctx: Context, upload: Upload): Promise<Upload> {
  if (upload.state === 'checking' || upload.state === 'done') return upload;
  if (upload.state !== 'receiving') throw problem(409, upload.problem ?? 'This upload was given up.', { code: `upload-${upload.state}` });
  await joinParts(ctx, upload);
  return Upload.transaction(async (trx) => {
    const checking = await Upload.within(upload, trx)
      .patch({ state: 'checking', updatedAt: new Date() })
      .where({ id: upload.id, state: 'receiving' })
      .returning('*')
      .first();
    if (!checking) return Upload.within(upload, trx).findById(upload.id).throwIfNotFound();
    await enqueue(trx, 'take-in-upload', { uploadId: upload.id }, { key: `take-in-upload:${upload.id}` });
    await announce(trx, `commission:${upload.commissionId}`, { what: 'upload-checking', uploadId: upload.id });
    return checking;
  });
}
