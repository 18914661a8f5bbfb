import type { Transaction } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Sheet } from '../../models/Sheet.ts';

/** Goes with its commission: while that is deleted, nothing can be done to its sheets. */
function sheetOf(scope: StudioScope, sheetId: string, trx?: Transaction) {
  return Sheet.within(scope, trx).findById(sheetId).whereExists(Sheet.relatedQuery('commission', trx).whereNull('deletedAt'));
}

/** A sheet of the studio. @throws Problem 404. */
export async function findSheet(scope: StudioScope, sheetId: string, trx?: Transaction): Promise<Sheet> {
  const sheet = await sheetOf(scope, sheetId, trx);
  if (!sheet) throw problem(404);
  return sheet;
}

/** The same, held against other changes until the transaction ends. */
export async function holdSheet(scope: StudioScope, sheetId: string, trx: Transaction): Promise<Sheet> {
  const sheet = await sheetOf(scope, sheetId, trx).forUpdate();
  if (!sheet) throw problem(404);
  return sheet;
}
