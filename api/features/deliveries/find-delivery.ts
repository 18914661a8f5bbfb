import type { Transaction } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Delivery } from '../../models/Delivery.ts';
import { findCommission } from '../commissions/find-commission.ts';

/** A delivery of a commission of the studio that is there. @throws Problem 404 */
export async function findDelivery(scope: StudioScope, commissionId: string, deliveryId: string, trx?: Transaction): Promise<Delivery> {
  await findCommission(scope, commissionId, trx);
  const delivery = await Delivery.within(scope, trx).findOne({ id: deliveryId, commissionId });
  if (!delivery) throw problem(404);
  return delivery;
}

/** The same, held against other changes until the transaction ends. */
export async function holdDelivery(scope: StudioScope, commissionId: string, deliveryId: string, trx: Transaction): Promise<Delivery> {
  await findCommission(scope, commissionId, trx);
  const delivery = await Delivery.within(scope, trx).findOne({ id: deliveryId, commissionId }).forUpdate();
  if (!delivery) throw problem(404);
  return delivery;
}
