import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import { enqueue } from '../../jobs/queue.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Archive } from '../../models/Archive.ts';
import { Delivery } from '../../models/Delivery.ts';
import { buildAgain } from '../archives/request-archive.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { endOfDay } from '../sheets/change-sheet.ts';
import { findDelivery, holdDelivery } from './find-delivery.ts';

const LONGEST_YEARS = 10;

/** The end of the last day in the studio's time zone. @throws Problem 422 where it has passed or is very far */
export async function lastMoment(trx: Transaction, scope: { studioId: string }, fetchBy: string): Promise<Date> {
  const { rows } = await trx.raw<{ rows: { at: Date }[] }>('select ? as at', [endOfDay(trx, fetchBy, scope.studioId)]);
  const at = rows[0]?.at;
  if (!at || at <= new Date()) throw invalid([{ path: 'fetchBy', message: 'The last date has passed already.' }]);
  if (at.getTime() > Date.now() + LONGEST_YEARS * 366 * 86_400_000) {
    throw invalid([{ path: 'fetchBy', message: `At most ${LONGEST_YEARS} years from now.` }]);
  }
  return at;
}

/** Changes the last date; an ended delivery opens again by a later one. @throws Problem 409, 412, 422 */
export async function extendDelivery(
  ctx: Context,
  actor: StaffActor,
  commissionId: string,
  deliveryId: string,
  version: number,
  fetchBy: string,
): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const delivery = await findDelivery(actor, commissionId, deliveryId, trx);
    if (delivery.withdrawnAt) throw problem(409, 'This delivery was withdrawn. Give it back first.', { code: 'withdrawn' });
    const endsAt = await lastMoment(trx, actor, fetchBy);
    const changed = await Delivery.within(actor, trx)
      .findById(deliveryId)
      .where({ version })
      .patch({ fetchBy, endsAt, version: version + 1 });
    if (changed === 0) throw problem(412);
    await tell(trx, actor, delivery, 'delivery.changed', `Set the last date of delivery ${delivery.number} to ${fetchBy}`);
  });
}

/** Takes a delivery back from everybody at once, or gives it back; what was fetched stays on record. */
export async function withdrawDelivery(
  ctx: Context,
  actor: StaffActor,
  commissionId: string,
  deliveryId: string,
  withdrawn: boolean,
): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const delivery = await holdDelivery(actor, commissionId, deliveryId, trx);
    if (Boolean(delivery.withdrawnAt) === withdrawn) return;
    await Delivery.query(trx)
      .findById(deliveryId)
      .patch({ withdrawnAt: withdrawn ? new Date() : null, version: delivery.version + 1 });
    // Its archives may have become ready meanwhile; the job finds out.
    if (!withdrawn && !delivery.sentAt) await enqueue(trx, 'send-delivery', { deliveryId }, { key: `send-delivery:${deliveryId}` });
    const says = withdrawn ? `Withdrew delivery ${delivery.number}` : `Gave delivery ${delivery.number} back to its recipients`;
    await tell(trx, actor, delivery, withdrawn ? 'delivery.withdrawn' : 'delivery.restored', says);
  });
}

/** Has the archives that failed built again. */
export async function retryDelivery(ctx: Context, actor: StaffActor, commissionId: string, deliveryId: string): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const delivery = await holdDelivery(actor, commissionId, deliveryId, trx);
    const failed = await Archive.within(actor, trx).where({ deliveryId, state: 'failed' }).forUpdate();
    if (failed.length === 0) return;
    for (const archive of failed) await buildAgain(trx, archive);
    await tell(trx, actor, delivery, 'delivery.retried', `Had the archives of delivery ${delivery.number} built again`);
  });
}

async function tell(trx: Transaction, actor: StaffActor, delivery: Delivery, did: `delivery.${string}`, says: string): Promise<void> {
  const { studioId, commissionId } = delivery;
  await addToRecord(trx, { studioId, commissionId, actor, did, says, about: { deliveryId: delivery.id } });
  await announce(trx, `commission:${commissionId}`, { what: 'delivery-changed', deliveryId: delivery.id });
}
