import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import type { Recipient } from '../../contract/deliveries.ts';
import { announce } from '../../db/live.ts';
import { deliveryState } from '../../domain/delivery-state.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import type { Delivery } from '../../models/Delivery.ts';
import { DeliveryRecipient } from '../../models/DeliveryRecipient.ts';
import { inviteAccount } from '../guests/invite-account.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { holdDelivery } from './find-delivery.ts';
import { mailDelivery } from './mail-delivery.ts';

/** Names people as recipients, each address once. Somebody named before keeps their place and is let in again. */
export async function addRecipientRows(trx: Transaction, delivery: Delivery, people: readonly Recipient[]): Promise<DeliveryRecipient[]> {
  const byAddress = new Map(people.map((person) => [person.email, person]));
  const rows: DeliveryRecipient[] = [];
  for (const person of byAddress.values()) {
    const account = await inviteAccount(trx, person);
    const row = await DeliveryRecipient.query(trx)
      .insert({ studioId: delivery.studioId, deliveryId: delivery.id, accountId: account.id, name: person.name })
      .onConflict(['deliveryId', 'accountId'])
      .merge({ name: person.name, withdrawnAt: null })
      .returning('*');
    rows.push(row);
  }
  return rows;
}

/** Refuses where nothing could be fetched by a link that is sent now. */
function requireOpen(delivery: Delivery): void {
  const state = deliveryState({ ...delivery, archives: [] }, new Date());
  if (state === 'Withdrawn') throw problem(409, 'This delivery was withdrawn. Give it back first.', { code: 'withdrawn' });
  if (state === 'Ended') throw problem(409, 'The last date of this delivery has passed. Set a later one first.', { code: 'ended' });
}

/** Adds people to a delivery. Those of a sent one get their mail at once, the others with the rest. */
export async function addRecipients(
  ctx: Context,
  actor: StaffActor,
  commissionId: string,
  deliveryId: string,
  people: Recipient[],
): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const delivery = await holdDelivery(actor, commissionId, deliveryId, trx);
    requireOpen(delivery);
    const rows = await addRecipientRows(trx, delivery, people);
    if (delivery.sentAt) for (const row of rows) await mailDelivery(ctx, trx, delivery, row);
    await tell(trx, actor, delivery, `Added ${people.map((person) => person.name).join(', ')} to delivery ${delivery.number}`);
  });
}

type OnOne = (trx: Transaction, delivery: Delivery, recipient: DeliveryRecipient) => Promise<string | null>;

async function onRecipient(ctx: Context, actor: StaffActor, place: RecipientPlace, work: OnOne): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const delivery = await holdDelivery(actor, place.commissionId, place.deliveryId, trx);
    const recipient = await DeliveryRecipient.within(actor, trx).findOne({ id: place.recipientId, deliveryId: delivery.id }).forUpdate();
    if (!recipient) throw problem(404);
    const says = await work(trx, delivery, recipient);
    if (says) await tell(trx, actor, delivery, says);
  });
}

/** Which recipient of which delivery of which commission. */
export interface RecipientPlace {
  commissionId: string;
  deliveryId: string;
  recipientId: string;
}

/** Sends somebody a new link; the one before stops working. @throws Problem 409 where it would open nothing */
export function sendAgain(ctx: Context, actor: StaffActor, place: RecipientPlace): Promise<void> {
  return onRecipient(ctx, actor, place, async (trx, delivery, recipient) => {
    requireOpen(delivery);
    if (!delivery.sentAt)
      throw problem(409, 'The delivery is still being prepared; its mails go out by themselves.', { code: 'preparing' });
    if (recipient.withdrawnAt)
      throw problem(409, 'This person was taken off the delivery. Give it back to them first.', { code: 'withdrawn' });
    await mailDelivery(ctx, trx, delivery, recipient);
    return `Sent ${recipient.name} a new link to delivery ${delivery.number}`;
  });
}

/** Takes a delivery back from one person, at once, or gives it back. */
export function withdrawRecipient(ctx: Context, actor: StaffActor, place: RecipientPlace, withdrawn: boolean): Promise<void> {
  return onRecipient(ctx, actor, place, async (trx, delivery, recipient) => {
    if (Boolean(recipient.withdrawnAt) === withdrawn) return null;
    await DeliveryRecipient.query(trx)
      .findById(recipient.id)
      .patch({ withdrawnAt: withdrawn ? new Date() : null });
    // Somebody who was taken off before the mails went out has no link yet.
    if (!withdrawn && delivery.sentAt && !recipient.invitedAt) await mailDelivery(ctx, trx, delivery, recipient);
    return withdrawn
      ? `Took delivery ${delivery.number} back from ${recipient.name}`
      : `Gave delivery ${delivery.number} back to ${recipient.name}`;
  });
}

async function tell(trx: Transaction, actor: StaffActor, delivery: Delivery, says: string): Promise<void> {
  const { studioId, commissionId } = delivery;
  await addToRecord(trx, { studioId, commissionId, actor, did: 'delivery.recipients', says, about: { deliveryId: delivery.id } });
  await announce(trx, `commission:${commissionId}`, { what: 'delivery-changed', deliveryId: delivery.id });
}
