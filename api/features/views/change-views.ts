import type { Transaction } from 'objection';
import type { View as ViewAnswer } from '../../contract/commissions.ts';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { lockOpenCommission } from '../commissions/find-commission.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { listViews } from './list-views.ts';

/**
 * Every change of a commission's views goes through here: the commission is held, so that two changes of the order come
 * one after the other, the change is made and recorded, and the sheets count their revision up, since guests see the views
 * as storeys. `change` gives the sentence for the record, or nothing where nothing was changed.
 */
export async function changeViews(
  ctx: Context,
  actor: StaffActor,
  commissionId: string,
  change: (trx: Transaction) => Promise<string | undefined>,
): Promise<ViewAnswer[]> {
  return ctx.knex.transaction(async (trx) => {
    await lockOpenCommission(actor, commissionId, trx);
    const says = await change(trx);
    if (says) {
      await addToRecord(trx, { studioId: actor.studioId, commissionId, actor, did: 'commission.views-changed', says });
      await tellSheets(trx, commissionId);
      await announce(trx, `commission:${commissionId}`, { what: 'views' });
    }
    return listViews(trx, actor, commissionId);
  });
}

async function tellSheets(trx: Transaction, commissionId: string): Promise<void> {
  const { rows } = await trx.raw<{ rows: { id: string }[] }>(
    'update sheets set revision = revision + 1 where commission_id = ? returning id',
    [commissionId],
  );
  for (const { id } of rows) await announce(trx, `sheet:${id}`, { what: 'proofs' });
}

/** One view out of a commission's. @throws Problem 404 */
export function viewOf(views: ViewAnswer[], viewId: string): ViewAnswer {
  const view = views.find((each) => each.id === viewId);
  if (!view) throw problem(404);
  return view;
}
