import type { Context } from '../../context.ts';
import type { DeliveryList, KnownPerson, StudioDelivery } from '../../contract/deliveries.ts';
import type { StudioScope } from '../../db/scope.ts';
import { Contact } from '../../models/Contact.ts';
import { Delivery } from '../../models/Delivery.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { findDelivery } from './find-delivery.ts';
import { presentDeliveries } from './presenter.ts';
import { recipientRows } from './recipient-rows.ts';

/** Three months: long enough for a client's holidays, common practice. */
const PROPOSED_DAYS = 90;

/** The deliveries of a commission, newest first, and the people who may be meant as recipients. */
export async function listDeliveries(ctx: Context, scope: StudioScope, commissionId: string): Promise<DeliveryList> {
  const commission = await findCommission(scope, commissionId);
  const deliveries = await Delivery.within(scope).where({ commissionId }).orderBy('number', 'desc');
  const proposed = new Date(Date.now() + PROPOSED_DAYS * 86_400_000);
  return {
    items: await presentDeliveries(ctx, deliveries),
    people: await knownPeople(ctx, scope, commission, deliveries),
    proposedFetchBy: proposed.toISOString().slice(0, 10),
    can: { deliver: commission.closedAt === null },
  };
}

/** One delivery of a commission. @throws Problem 404 */
export async function readDelivery(ctx: Context, scope: StudioScope, commissionId: string, deliveryId: string): Promise<StudioDelivery> {
  const [delivery] = await presentDeliveries(ctx, [await findDelivery(scope, commissionId, deliveryId)]);
  return delivery as StudioDelivery;
}

/** Contacts of the client, guests of the sheets, recipients of deliveries before; each address once. */
async function knownPeople(
  ctx: Context,
  scope: StudioScope,
  commission: { id: string; clientId: string },
  deliveries: Delivery[],
): Promise<KnownPerson[]> {
  const [contacts, guests, recipients] = await Promise.all([
    Contact.within(scope).where({ clientId: commission.clientId }).orderBy(['createdAt', 'id']),
    SheetGuest.within(scope)
      .joinRelated('account')
      .join('sheets', 'sheets.id', 'sheetGuests.sheetId')
      .where('sheets.commissionId', commission.id)
      .whereNull('sheetGuests.withdrawnAt')
      .orderBy(['sheetGuests.role', 'sheetGuests.invitedAt'])
      .select('sheetGuests.name', 'account.email') as unknown as Promise<{ name: string; email: string }[]>,
    recipientRows(
      ctx,
      deliveries.map((delivery) => delivery.id),
    ),
  ]);
  const people = new Map<string, KnownPerson>();
  const add = (from: KnownPerson['from']) => (person: { name: string; email: string }) => {
    if (!people.has(person.email)) people.set(person.email, { name: person.name, email: person.email, from });
  };
  contacts.forEach(add('contact'));
  guests.forEach(add('guest'));
  recipients.forEach(add('delivery'));
  return [...people.values()];
}
