import type { Transaction } from 'objection';
import type { CommissionDetail } from '../../contract/commissions.ts';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import { enqueue } from '../../jobs/queue.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Commission } from '../../models/Commission.ts';
import { Delivery } from '../../models/Delivery.ts';
import { Mail } from '../../models/Mail.ts';
import { enqueueSending } from '../mail/queue-mail.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { countContents } from './count-contents.ts';
import { readCommission } from './read-commission.ts';

/** Deletes a commission with all it holds: links stop at once, rows and files go after 30 days. @throws Problem 404 */
export async function deleteCommission(ctx: Context, actor: StaffActor, commissionId: string): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const commission = await Commission.within(actor, trx).findById(commissionId).whereNull('deletedAt').forUpdate();
    if (!commission) throw problem(404);
    const { frames, sheets, deliveries } = await countContents(trx, actor, commissionId);
    await Commission.within(actor, trx).findById(commissionId).patch({ deletedAt: new Date() });
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId,
      actor,
      did: 'commission.deleted',
      says: `Deleted the commission ${commission.title}`,
      about: { frames, sheets, deliveries },
    });
    await announce(trx, `commission:${commissionId}`, { what: 'commission-changed' });
  });
}

/** Brings a deleted commission back as it was. Doing it twice changes nothing. @throws Problem 404 */
export async function restoreCommission(ctx: Context, actor: StaffActor, commissionId: string): Promise<CommissionDetail> {
  return ctx.knex.transaction(async (trx) => {
    const restored = await Commission.within(actor, trx).findById(commissionId).whereNotNull('deletedAt').patch({ deletedAt: null });
    const answer = await readCommission(trx, actor, commissionId);
    if (!restored) return answer;
    await sendWhatWaits(trx, actor, commissionId);
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId,
      actor,
      did: 'commission.restored',
      says: `Brought the commission ${answer.title} back`,
    });
    await announce(trx, `commission:${commissionId}`, { what: 'commission-changed' });
    return readCommission(trx, actor, commissionId);
  });
}

/** Mails were held while the commission was deleted, and deliveries whose archives became ready were not sent; the job finds out which. */
async function sendWhatWaits(trx: Transaction, actor: StaffActor, commissionId: string): Promise<void> {
  const waiting = await Delivery.within(actor, trx).where({ commissionId }).whereNull('sentAt').whereNull('withdrawnAt').select('id');
  for (const { id } of waiting) await enqueue(trx, 'send-delivery', { deliveryId: id }, { key: `send-delivery:${id}` });
  const mails = await Mail.query(trx).where({ commissionId, state: 'waiting' }).select('id');
  for (const { id } of mails) await enqueueSending(trx, id);
}
