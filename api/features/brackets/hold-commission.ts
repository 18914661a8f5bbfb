import type { Transaction } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import type { Commission } from '../../models/Commission.ts';
import { Sheet } from '../../models/Sheet.ts';
import { lockOpenCommission } from '../commissions/find-commission.ts';

/**
 * Holds a commission and its sheets while frames are grouped. Always in this order, and before any frame: whoever lays frames on a sheet
 * holds the sheet first as well. @throws Problem 404, 409 where the commission is closed
 */
export async function holdForGrouping(scope: StudioScope, commissionId: string, trx: Transaction): Promise<Commission> {
  const commission = await lockOpenCommission(scope, commissionId, trx);
  await holdSheets(scope, commissionId, trx);
  return commission;
}

/** Holds the sheets of a commission, in one order. */
export async function holdSheets(scope: StudioScope, commissionId: string, trx: Transaction): Promise<void> {
  await Sheet.within(scope, trx).where({ commissionId }).orderBy('id').forUpdate().select('id');
}
