import type { Context } from '../../context.ts';
import type { KnownFile, NewUpload } from '../../contract/uploads.ts';
import { cleanFileName } from '../../domain/file-names.ts';
import { Refusal } from '../../imaging/refusal.ts';
import { refuseSize } from '../../imaging/refuse-size.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import type { Commission } from '../../models/Commission.ts';
import { Upload } from '../../models/Upload.ts';
import { originalKey } from '../../services/storage-keys.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { knownFile } from './known-file.ts';
import { refuseFullStorage } from './storage-room.ts';
import { openMultipart, partSizeFor } from './upload-parts.ts';

/** What beginning came to: a file that is there already, an upload that goes on, or a new one. */
export type Begun = { known: KnownFile } | { upload: Upload; isNew: boolean };

function refuseTooLarge(ctx: Context, size: number): void {
  try {
    refuseSize(size, { bytes: ctx.config.limits.fileBytes });
  } catch (error) {
    throw error instanceof Refusal ? problem(413, error.message, { code: error.code }) : error;
  }
}

function underWay(commission: Commission, input: NewUpload) {
  return Upload.within(commission)
    .findOne({ commissionId: commission.id, purpose: input.purpose, sha256: input.sha256 })
    .whereIn('state', ['receiving', 'checking']);
}

/** Two browsers may begin the same file at once: the index lets one row in, the other request finds nothing inserted. */
async function insertUpload(ctx: Context, actor: StaffActor, commission: Commission, input: NewUpload): Promise<Upload | undefined> {
  const upload = await Upload.query()
    .insert({
      studioId: commission.studioId,
      commissionId: commission.id,
      purpose: input.purpose,
      // A text column holds everything but NUL.
      originalName: input.name.replaceAll('\0', ''),
      name: cleanFileName(input.name, input.purpose),
      sizeBytes: input.size,
      partSize: partSizeFor(input.size),
      sha256: input.sha256,
      lastModified: input.lastModified ? new Date(input.lastModified) : null,
      storageKey: originalKey(commission.studioId, commission.id),
      createdBy: actor.accountId,
    })
    .onConflict(ctx.knex.raw(`(commission_id, purpose, sha256) where state in ('receiving', 'checking')`))
    .ignore()
    .returning('*');
  // Where the index refused the row, nothing came back, and the model is what went in.
  return (upload.id as string | undefined) === undefined ? undefined : upload;
}

/**
 * Begins an upload. A file whose bytes the commission holds is recognised before one is sent; an unfinished upload of the
 * same file goes on, whoever began it and wherever.
 * @throws Problem 404, 409 where the commission is closed, 413
 */
export async function beginUpload(ctx: Context, actor: StaffActor, commissionId: string, input: NewUpload): Promise<Begun> {
  const commission = await findCommission(actor, commissionId);
  if (commission.closedAt) throw problem(409, 'This commission is closed. Reopen it first.', { code: 'commission-closed' });
  refuseTooLarge(ctx, input.size);
  const known = await knownFile(commission, input);
  if (known) return { known };
  const going = await underWay(commission, input);
  if (going) return goOn(going, input);
  await refuseFullStorage(ctx, actor, input.size);
  const inserted = await insertUpload(ctx, actor, commission, input);
  if (inserted) return { upload: await openMultipart(ctx, inserted), isNew: true };
  const other = await underWay(commission, input);
  if (!other) throw problem(409, 'This file is being uploaded by somebody else just now. Try again in a moment.');
  return goOn(other, input);
}

function goOn(upload: Upload, input: NewUpload): Begun {
  if (upload.sizeBytes !== input.size) {
    throw problem(409, 'An upload with this SHA-256 and another size is under way. One of the two is wrong.', { code: 'size-differs' });
  }
  return { upload, isNew: false };
}
