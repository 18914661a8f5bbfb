import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { Job } from '../../jobs/job.ts';
import { Archive } from '../../models/Archive.ts';
import { Commission } from '../../models/Commission.ts';
import { Delivery } from '../../models/Delivery.ts';
import { DeliveryRecipient } from '../../models/DeliveryRecipient.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { mailDelivery } from './mail-delivery.ts';

/**
 * Sends a delivery once both archives are ready, unless its commission was deleted meanwhile; bringing that back queues it again. One transaction holds the moment, the links and the mails, so that no
 * mail goes out twice or is lost, however often this runs.
 */
export const sendDelivery: Job<{ deliveryId: string }> = {
  name: 'send-delivery',
  async run(ctx, { deliveryId }) {
    await ctx.knex.transaction(async (trx) => {
      const delivery = await Delivery.query(trx).findById(deliveryId).forUpdate();
      if (!delivery || delivery.sentAt || delivery.withdrawnAt) return;
      if (!(await Commission.within(delivery, trx).findById(delivery.commissionId).whereNull('deletedAt'))) return;
      const archives = await Archive.within(delivery, trx).where({ deliveryId });
      if (archives.length === 0 || archives.some((archive) => archive.state !== 'ready')) return;
      await send(ctx, trx, delivery);
    });
  },
};

async function send(ctx: Context, trx: Transaction, delivery: Delivery): Promise<void> {
  await Delivery.query(trx).findById(delivery.id).patch({ sentAt: new Date() });
  const recipients = await DeliveryRecipient.within(delivery, trx)
    .where({ deliveryId: delivery.id })
    .whereNull('withdrawnAt')
    .orderBy('id');
  for (const recipient of recipients) await mailDelivery(ctx, trx, delivery, recipient);
  const { studioId, commissionId, number } = delivery;
  await addToRecord(trx, {
    studioId,
    commissionId,
    did: 'delivery.sent',
    says: `Sent delivery ${number} to ${recipients.map((one) => one.name).join(', ') || 'nobody: all recipients were taken off'}`,
    about: { deliveryId: delivery.id },
  });
  await announce(trx, `commission:${commissionId}`, { what: 'delivery-changed', deliveryId: delivery.id });
}
