import type { Transaction } from 'objection';
import type { FramesChangedExcept } from '../../contract/frames.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { Frame } from '../../models/Frame.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { queueGrouping } from '../brackets/queue-grouping.ts';
import { lockOpenCommission } from '../commissions/find-commission.ts';
import { announceFrames } from './change-frames.ts';

/** A deleted frame can be restored for so many days; then its files are removed. */
export const RESTORABLE_DAYS = 30;

/** Of frames with the same bytes only one can be there: the one deleted last comes back, unless one was uploaded meanwhile. */
async function restorable(trx: Transaction, actor: StaffActor, commissionId: string, frameIds: string[]): Promise<string[]> {
  const rows = await Frame.within(actor, trx)
    .where({ commissionId })
    .whereIn('id', frameIds)
    .whereRaw('deleted_at > now() - make_interval(days => ?)', RESTORABLE_DAYS)
    .whereNotExists(
      Frame.query(trx)
        .alias('present')
        .whereNull('present.deletedAt')
        .whereColumn('present.commissionId', 'frames.commissionId')
        .whereColumn('present.sha256', 'frames.sha256'),
    )
    .distinctOn('sha256')
    .orderBy([{ column: 'sha256' }, { column: 'deletedAt', order: 'desc' }])
    .select('id');
  return rows.map(({ id }) => id);
}

async function stillDeleted(trx: Transaction, actor: StaffActor, commissionId: string, frameIds: string[]) {
  const left = await Frame.within(actor, trx)
    .where({ commissionId })
    .whereIn('id', frameIds)
    .whereNotNull('deletedAt')
    .select('id', 'name', 'deletedAt');
  const soon = Date.now() - RESTORABLE_DAYS * 24 * 60 * 60 * 1000;
  return left.map(({ id, name, deletedAt }) => {
    const late = (deletedAt?.getTime() ?? 0) <= soon;
    return { frameId: id, name, why: late ? 'It was deleted too long ago.' : 'The same file has been brought in again.' };
  });
}

/** Brings deleted frames back, with their pictures and their place under a view. */
export async function restoreFrames(actor: StaffActor, commissionId: string, frameIds: string[]): Promise<FramesChangedExcept> {
  return Frame.transaction(async (trx) => {
    const commission = await lockOpenCommission(actor, commissionId, trx);
    const back = await restorable(trx, actor, commissionId, frameIds);
    if (back.length > 0) {
      await Frame.within(actor, trx).patch({ deletedAt: null }).whereIn('id', back);
      await queueGrouping(trx, commissionId);
      await addToRecord(trx, {
        studioId: actor.studioId,
        commissionId,
        actor,
        did: 'frame.restored',
        says: `Restored ${back.length === 1 ? 'a frame' : `${back.length} frames`}`,
        about: { frameIds: back },
      });
      await announceFrames(trx, commission);
    }
    return { frameIds: back, refused: await stillDeleted(trx, actor, commissionId, frameIds) };
  });
}
