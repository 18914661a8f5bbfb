import { randomUUID } from 'node:crypto';
import type { Delivery } from '../../../api/models/Delivery.ts';
import { Account } from '../../../api/models/Account.ts';
import { DeliveryRecipient } from '../../../api/models/DeliveryRecipient.ts';
import { makeDelivery } from '../../../api/features/deliveries/make-delivery.ts';
import type { House } from '../house.ts';
import { makeCommission } from './commission.ts';
import { makeFinal } from './final.ts';
import { makeGuestAgent, type GuestPerson, type MadeStudio } from './studio.ts';

let counter = 0;

/** A day from now on, as a last date. */
export function dayFromNow(days: number): string {
  return new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10);
}

/** A sent delivery of some finals to one recipient, who is signed in. */
export async function makeSentDelivery(
  house: House,
  made: MadeStudio,
  values: { names?: string[]; words?: string; title?: string } = {},
): Promise<{
  commission: Awaited<ReturnType<typeof makeCommission>>;
  delivery: Delivery;
  recipient: DeliveryRecipient;
  guest: GuestPerson;
}> {
  counter += 1;
  const commission = await makeCommission(made.studio, values.title ? { title: values.title } : {});
  const versions = [];
  for (const name of values.names ?? ['East front.jpg', 'Brücke.jpg']) versions.push(await makeFinal(house, commission, { name }));
  const delivery = await makeDelivery(house.ctx, made.owner.actor, commission.id, {
    finalVersionIds: versions.map((version) => version.id),
    recipients: [{ name: 'Oskar Lind', email: `recipient-${counter}@tarn-brandreth.test` }],
    fetchBy: dayFromNow(60),
    words: values.words ?? '',
    key: randomUUID(),
  });
  await house.runJobs();
  const recipient = await DeliveryRecipient.query().findOne({ deliveryId: delivery.id }).throwIfNotFound();
  const guest = await makeGuestAgent(house, await Account.query().findById(recipient.accountId).throwIfNotFound());
  return { commission, delivery, recipient, guest };
}
