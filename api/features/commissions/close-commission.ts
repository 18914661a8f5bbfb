import { raw } from 'objection';
import type { CommissionDetail } from '../../contract/commissions.ts';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Commission } from '../../models/Commission.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { findCommission } from './find-commission.ts';
import { readCommission } from './read-commission.ts';

/** Closes a commission none of whose sheets is still open. Closing twice changes nothing. @throws Problem 404, 409 */
export async function closeCommission(ctx: Context, actor: StaffActor, commissionId: string): Promise<CommissionDetail> {
  return ctx.knex.transaction(async (trx) => {
    await Commission.within(actor, trx).findById(commissionId).whereNull('deletedAt').forUpdate();
    const { can, closedAt } = await readCommission(trx, actor, commissionId);
    if (!closedAt && !can.close) {
      throw problem(409, 'A proof sheet is still open. Withdraw it, or wait until it was sent or has ended.', { code: 'sheet-open' });
    }
    const closed = await Commission.within(actor, trx)
      .findById(commissionId)
      .whereNull('closedAt')
      .patch({ closedAt: new Date(), updatedAt: new Date(), version: raw('version + 1') });
    if (closed) {
      await addToRecord(trx, { studioId: actor.studioId, commissionId, actor, did: 'commission.closed', says: 'Closed the commission' });
      await announce(trx, `commission:${commissionId}`, { what: 'commission-changed' });
    }
    return readCommission(trx, actor, commissionId);
  });
}

/** Opens a closed commission again. Doing it twice changes nothing. @throws Problem 404 */
export async function reopenCommission(ctx: Context, actor: StaffActor, commissionId: string): Promise<CommissionDetail> {
  return ctx.knex.transaction(async (trx) => {
    await findCommission(actor, commissionId, trx);
    const reopened = await Commission.within(actor, trx)
      .findById(commissionId)
      .whereNull('deletedAt')
      .whereNotNull('closedAt')
      .patch({ closedAt: null, updatedAt: new Date(), version: raw('version + 1') });
    if (reopened) {
      await addToRecord(trx, {
        studioId: actor.studioId,
        commissionId,
        actor,
        did: 'commission.reopened',
        says: 'Reopened the commission',
      });
      await announce(trx, `commission:${commissionId}`, { what: 'commission-changed' });
    }
    return readCommission(trx, actor, commissionId);
  });
}
