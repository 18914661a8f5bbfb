import type { Context } from '../../context.ts';
import type { Job } from '../../jobs/job.ts';
import { Commission } from '../../models/Commission.ts';
import { RecordEntry } from '../../models/RecordEntry.ts';
import { Upload } from '../../models/Upload.ts';
import { commissionPrefix } from '../../services/storage-keys.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { UNDO_DAYS } from './count-contents.ts';

/** Removes for good what was deleted more than 30 days ago: first the files, then the rows, so that a broken run is only begun again. */
export const purgeCommissions: Job = {
  name: 'purge-commissions',
  every: '40 3 * * *',
  timeoutSeconds: 3600,
  async run(ctx, _payload, { signal }) {
    const before = new Date(Date.now() - UNDO_DAYS * 24 * 60 * 60 * 1000);
    const commissions = await Commission.query(ctx.knex).where('deletedAt', '<', before).orderBy('deletedAt').limit(100);
    for (const commission of commissions) {
      signal.throwIfAborted();
      await removeFiles(ctx, commission, signal);
      await removeRows(ctx, commission, before);
    }
  },
};

async function removeFiles(ctx: Context, { studioId, id }: Commission, signal: AbortSignal): Promise<void> {
  const unfinished = await Upload.within({ studioId }, ctx.knex).where({ commissionId: id }).whereNotNull('multipartId');
  for (const { storageKey, multipartId, state } of unfinished) {
    if (multipartId && state !== 'done') await ctx.store.abortMultipart(storageKey, multipartId);
  }
  const keys: string[] = [];
  for await (const { key } of ctx.store.list(commissionPrefix(studioId, id))) {
    signal.throwIfAborted();
    if (keys.push(key) >= 1000) await ctx.store.remove(...keys.splice(0));
  }
  if (keys.length > 0) await ctx.store.remove(...keys);
}

/** The record of a commission names its people, so it goes too; the studio's own record keeps one line. */
async function removeRows(ctx: Context, { studioId, id, title }: Commission, before: Date): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const gone = await Commission.within({ studioId }, trx).findById(id).where('deletedAt', '<', before).forUpdate();
    if (!gone) return;
    // Picks hold on to proofs, proofs to frames, deliveries to finals: what holds goes before what is held.
    for (const table of ['deliveries', 'pickLists', 'finals', 'sheets', 'frames'])
      await trx(table).where({ studioId, commissionId: id }).delete();
    await Commission.within({ studioId }, trx).deleteById(id);
    await RecordEntry.query(trx).where({ commissionId: id }).delete();
    await addToRecord(trx, { studioId, did: 'commission.purged', says: `Removed the deleted commission ${title} for good` });
  });
}
