import type { PartialModelObject, QueryBuilder, Transaction } from 'objection';
import { announce } from '../../db/live.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid } from '../../middleware/problem.ts';
import type { Commission } from '../../models/Commission.ts';
import { Frame } from '../../models/Frame.ts';
import { View } from '../../models/View.ts';
import { queueGrouping } from '../brackets/queue-grouping.ts';
import { lockOpenCommission } from '../commissions/find-commission.ts';

type Narrow = (frames: QueryBuilder<Frame, number>) => unknown;

/** Tells every open page that frames have changed. */
export function announceFrames(trx: Transaction, commission: Commission): Promise<void> {
  return announce(trx, `commission:${commission.id}`, { what: 'frames-changed' });
}

/** Changes those of the frames that are there and not so already; returns their ids. */
async function changeFrames(
  actor: StaffActor,
  commissionId: string,
  frameIds: string[],
  values: PartialModelObject<Frame>,
  narrow: Narrow,
  around: { before?: (trx: Transaction) => Promise<void>; after?: (trx: Transaction) => Promise<void>; wholeBrackets?: boolean } = {},
): Promise<string[]> {
  return Frame.transaction(async (trx) => {
    const commission = await lockOpenCommission(actor, commissionId, trx);
    await around.before?.(trx);
    const ids = around.wholeBrackets ? await withBrackets(trx, actor, frameIds) : frameIds;
    const frames = Frame.within(actor, trx).patch(values).where({ commissionId }).whereIn('id', ids).whereNull('deletedAt');
    narrow(frames);
    const changed = (await frames.returning('id')) as unknown as { id: string }[];
    if (changed.length === 0) return [];
    await around.after?.(trx);
    await announceFrames(trx, commission);
    return changed.map(({ id }) => id);
  });
}

/** The frames, and the others of their brackets. */
async function withBrackets(trx: Transaction, actor: StaffActor, frameIds: string[]): Promise<string[]> {
  const brackets = Frame.within(actor, trx).whereIn('id', frameIds).whereNotNull('bracketId').select('bracketId');
  const rows = await Frame.within(actor, trx).whereIn('bracketId', brackets).select('id');
  return [...new Set([...frameIds, ...rows.map(({ id }) => id)])];
}

/** Hides frames: they stay in the commission, and off the page until they are shown again. */
export function hideFrames(actor: StaffActor, commissionId: string, frameIds: string[]): Promise<string[]> {
  return changeFrames(actor, commissionId, frameIds, { hiddenAt: new Date() }, (frames) => frames.whereNull('hiddenAt'), {
    after: (trx) => queueGrouping(trx, commissionId),
  });
}

/** Shows hidden frames again. */
export function showFrames(actor: StaffActor, commissionId: string, frameIds: string[]): Promise<string[]> {
  return changeFrames(actor, commissionId, frameIds, { hiddenAt: null }, (frames) => frames.whereNotNull('hiddenAt'), {
    after: (trx) => queueGrouping(trx, commissionId),
  });
}

/**
 * Hangs frames under a view of the same commission, or takes them down with null. A bracket hangs as a whole.
 * @throws Problem 422 where the view is not of this commission
 */
export function hangFrames(actor: StaffActor, commissionId: string, frameIds: string[], viewId: string | null): Promise<string[]> {
  const narrow: Narrow = (frames) => frames.whereRaw('view_id is distinct from ?::uuid', [viewId]);
  const before = async (trx: Transaction) => {
    if (viewId === null || (await View.within(actor, trx).findById(viewId).where({ commissionId }))) return;
    throw invalid([{ path: 'viewId', message: 'This view is no longer in the brief.' }]);
  };
  return changeFrames(actor, commissionId, frameIds, { viewId }, narrow, { before, wholeBrackets: true });
}
