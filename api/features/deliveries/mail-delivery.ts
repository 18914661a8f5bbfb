import { raw, type Transaction } from 'objection';
import type { Context } from '../../context.ts';
import { Account } from '../../models/Account.ts';
import { Commission } from '../../models/Commission.ts';
import type { Delivery } from '../../models/Delivery.ts';
import { DeliveryFile } from '../../models/DeliveryFile.ts';
import { DeliveryRecipient } from '../../models/DeliveryRecipient.ts';
import { Studio } from '../../models/Studio.ts';
import { linkAddress, newToken } from '../guests/tokens.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { deliveryMail } from './delivery.mail.ts';

/** Gives a recipient a new link and puts the mail with it into the outbox. The link they had before stops working. */
export async function mailDelivery(ctx: Context, trx: Transaction, delivery: Delivery, recipient: DeliveryRecipient): Promise<void> {
  const [studio, commission, account, files] = [
    await Studio.query(trx).findById(delivery.studioId).throwIfNotFound(),
    await Commission.within(delivery, trx).findById(delivery.commissionId).throwIfNotFound(),
    await Account.query(trx).findById(recipient.accountId).throwIfNotFound(),
    await sizesOf(trx, delivery),
  ];
  const { token, hash } = newToken();
  // The database's clock, as in the mail's row: the two are compared to find the mail of the present link.
  await DeliveryRecipient.query(trx)
    .findById(recipient.id)
    .patch({ tokenHash: hash, invitedAt: raw('now()') });
  const link = linkAddress(ctx.config, token);
  await queueMail(trx, {
    studioId: delivery.studioId,
    commissionId: delivery.commissionId,
    accountId: account.id,
    kind: 'delivery',
    to: { address: account.email, name: recipient.name },
    fromName: studio.name,
    replyTo: studio.replyTo,
    ...deliveryMail({ studio, commission, delivery, recipient: recipient.name, files, link }),
  });
}

async function sizesOf(trx: Transaction, delivery: Delivery): Promise<{ count: number; bytes: number }> {
  const row = (await DeliveryFile.within(delivery, trx)
    .join('finalVersions', 'finalVersions.id', 'deliveryFiles.finalVersionId')
    .where({ deliveryId: delivery.id })
    .count('* as count')
    .sum('finalVersions.sizeBytes as bytes')
    .first()) as unknown as { count: number; bytes: string | number };
  return { count: Number(row.count), bytes: Number(row.bytes) };
}
