import type { Knex } from 'knex';
import type { Context } from '../../context.ts';
import type { StudioScope } from '../../db/scope.ts';
import { enqueue } from '../../jobs/queue.ts';
import { problem } from '../../middleware/problem.ts';
import type { Sheet } from '../../models/Sheet.ts';
import { announceSheet } from './announce-sheet.ts';
import { findSheet, holdSheet } from './find-sheet.ts';
import { sheetCan } from './policy.ts';

/**
 * Every change to what lies on a sheet goes through here: the row is held, the state is checked, the change is made, the revision counts up,
 * missing watermarks are made and everybody who looks is told.
 */
export async function changeProofs(
  ctx: Context,
  scope: StudioScope,
  sheetId: string,
  change: (trx: Knex.Transaction, sheet: Sheet) => Promise<void>,
): Promise<Sheet> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(scope, sheetId, trx);
    if (!sheetCan(sheet, 1, new Date()).edit) {
      throw problem(409, 'This sheet was sent or has ended. Reopen it to change it.', { code: 'sheet-closed' });
    }
    await change(trx, sheet);
    if (!sheet.issuedAt) await renumber(trx, sheet.id);
    await touchSheet(trx, sheet.id, sheet.commissionId);
  });
  return findSheet(scope, sheetId);
}

/** Counts the revision up, has missing watermarks made and tells everybody who looks. */
export async function touchSheet(trx: Knex.Transaction, sheetId: string, commissionId: string): Promise<void> {
  await trx('sheets').where({ id: sheetId }).increment('revision', 1);
  await enqueue(trx, 'watermark-proofs', { sheetId }, { key: `watermark-proofs:${sheetId}`, priority: -2 });
  await announceSheet(trx, { id: sheetId, commissionId }, 'proofs');
}

/** In a draft the numbers follow the order; once guests know them they stay. */
export async function renumber(trx: Knex.Transaction, sheetId: string): Promise<void> {
  // Two steps, since a number may not stand twice even for a moment.
  await trx('proofs').where({ sheetId }).increment('number', 1_000_000);
  await trx.raw(
    `update proofs set number = ordered.place
       from (select p.id, row_number() over (order by v.position nulls last, p.position, p.id) as place
               from proofs p left join views v on v.id = p.view_id where p.sheet_id = ?) as ordered
      where proofs.id = ordered.id`,
    [sheetId],
  );
}
