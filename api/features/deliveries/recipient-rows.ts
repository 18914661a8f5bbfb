import type { Context } from '../../context.ts';
import { DeliveryRecipient } from '../../models/DeliveryRecipient.ts';

/** A recipient with the address and the state of the last mail with a link. */
export type RecipientRow = DeliveryRecipient & { email: string; mail: string | null };

/** The recipients of deliveries in the order they were named. */
export async function recipientRows(ctx: Context, deliveryIds: string[]): Promise<RecipientRow[]> {
  const rows = await DeliveryRecipient.query(ctx.knex)
    .whereIn('deliveryRecipients.deliveryId', deliveryIds)
    .joinRelated('account')
    .join('deliveries', 'deliveries.id', 'deliveryRecipients.deliveryId')
    .orderBy(['deliveryRecipients.name', 'deliveryRecipients.id'])
    .select(
      'deliveryRecipients.*',
      'account.email',
      ctx.knex
        .raw(`(select state from mails where mails.account_id = delivery_recipients.account_id and mails.commission_id = deliveries.commission_id
        and mails.kind in ('delivery', 'new-link') and mails.created_at >= delivery_recipients.invited_at order by created_at desc limit 1) as mail`),
    );
  return rows as RecipientRow[];
}
