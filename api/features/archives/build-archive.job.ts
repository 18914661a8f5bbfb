import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { Job, JobTools } from '../../jobs/job.ts';
import { enqueue } from '../../jobs/queue.ts';
import { Archive } from '../../models/Archive.ts';
import { Delivery } from '../../models/Delivery.ts';
import { PickList } from '../../models/PickList.ts';
import { archiveFiles } from './archive-files.ts';
import { planArchive } from './plan-archive.ts';
import { storeArchive } from './store-archive.ts';
import { DamagedFile } from './write-archive.ts';

/** How often the page hears of progress. */
const TELL_EVERY_MS = 1000;

/**
 * Builds an archive into the store. The same rows give the same bytes, so it may be killed, run again, or run twice at
 * once. Where a delivery's last archive is ready, its sending is queued in the same transaction.
 */
export const buildArchive: Job<{ archiveId: string }> = {
  name: 'build-archive',
  maxAttempts: 5,
  // Some hundred gigabytes through a slow store.
  timeoutSeconds: 6 * 60 * 60,
  async run(ctx, { archiveId }, tools) {
    const archive = await Archive.query(ctx.knex).findById(archiveId);
    if (!archive || archive.state !== 'building') return;
    try {
      await build(ctx, archive, tools.signal);
    } catch (error) {
      await giveUp(ctx, archive, error, tools);
      throw error;
    }
  },
};

/** The commission an archive belongs to; undefined where it was deleted meanwhile. */
export async function commissionOf(ctx: Context, archive: Archive): Promise<string | undefined> {
  const parent = archive.deliveryId
    ? await Delivery.within(archive, ctx.knex).findById(archive.deliveryId)
    : await PickList.within(archive, ctx.knex).findById(archive.pickListId ?? '');
  return parent?.commissionId;
}

async function build(ctx: Context, archive: Archive, signal: AbortSignal): Promise<void> {
  const commissionId = await commissionOf(ctx, archive);
  if (!commissionId) return;
  const plan = planArchive(archive.name, await archiveFiles(ctx, archive, commissionId, signal), archive.createdAt);
  await Archive.query(ctx.knex).findById(archive.id).patch({ fileCount: plan.entries.length, sizeBytes: plan.length, writtenBytes: 0 });
  const onBytes = tellProgress(ctx, archive, commissionId);
  const { size, sha256 } = await storeArchive(ctx.store, archive.storageKey, plan, { signal, onBytes });
  await ctx.knex.transaction(async (trx) => {
    const done = { state: 'ready' as const, problem: null, sizeBytes: size, writtenBytes: size, sha256, readyAt: new Date() };
    await Archive.query(trx).findById(archive.id).where({ state: 'building' }).patch(done);
    if (archive.deliveryId)
      await enqueue(trx, 'send-delivery', { deliveryId: archive.deliveryId }, { key: `send-delivery:${archive.deliveryId}` });
    await announce(trx, `commission:${commissionId}`, { what: 'archive-ready', ...names(archive) });
  });
}

const names = ({ id, deliveryId, pickListId, kind }: Archive) => ({ archiveId: id, deliveryId, pickListId, kind });

function tellProgress(ctx: Context, archive: Archive, commissionId: string): (written: number) => void {
  let told = Date.now();
  return (written) => {
    if (Date.now() - told < TELL_EVERY_MS) return;
    told = Date.now();
    const row = Archive.query(ctx.knex).findById(archive.id).where({ state: 'building' }).patch({ writtenBytes: written });
    row
      .then(() => announce(ctx.knex, `commission:${commissionId}`, { what: 'archive-progress', ...names(archive), written }))
      .catch((error: unknown) => ctx.log.warn({ err: error }, 'progress of an archive could not be told'));
  };
}

/** After the last try the archive says in a sentence what is wrong; a person may try again. */
async function giveUp(ctx: Context, archive: Archive, error: unknown, { lastAttempt }: JobTools): Promise<void> {
  if (!lastAttempt) return;
  const problem = error instanceof DamagedFile ? error.message : 'The archive could not be written into the file store.';
  const commissionId = await commissionOf(ctx, archive);
  await Archive.query(ctx.knex).findById(archive.id).where({ state: 'building' }).patch({ state: 'failed', problem });
  if (commissionId) await announce(ctx.knex, `commission:${commissionId}`, { what: 'archive-failed', ...names(archive) });
}
