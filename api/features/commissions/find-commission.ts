import type { Transaction, TransactionOrKnex } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Commission } from '../../models/Commission.ts';

/** A commission of the studio that was not deleted. @throws Problem 404 */
export async function findCommission(scope: StudioScope, commissionId: string, trx?: TransactionOrKnex): Promise<Commission> {
  const commission = await Commission.within(scope, trx).findById(commissionId).whereNull('deletedAt');
  if (!commission) throw problem(404);
  return commission;
}

/** The same, locked until the transaction ends and refused when it is closed. @throws Problem 404, 409 */
export async function lockOpenCommission(scope: StudioScope, commissionId: string, trx: Transaction): Promise<Commission> {
  const commission = await Commission.within(scope, trx).findById(commissionId).whereNull('deletedAt').forUpdate();
  if (!commission) throw problem(404);
  if (commission.closedAt) throw problem(409, 'This commission is closed. Reopen it first.', { code: 'commission-closed' });
  return commission;
}
