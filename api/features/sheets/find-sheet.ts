import type { Transaction } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Sheet } from '../../models/Sheet.ts';

/** A sheet of the studio. @throws Problem 404. */
export async function findSheet(scope: StudioScope, sheetId: string, trx?: Transaction): Promise<Sheet> {
  const sheet = await Sheet.within(scope, trx).findById(sheetId);
  if (!sheet) throw problem(404);
  return sheet;
}

/** The same, held against other changes until the transaction ends. */
export async function holdSheet(scope: StudioScope, sheetId: string, trx: Transaction): Promise<Sheet> {
  const sheet = await Sheet.within(scope, trx).findById(sheetId).forUpdate();
  if (!sheet) throw problem(404);
  return sheet;
}
