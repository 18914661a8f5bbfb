import type { Context } from '../../context.ts';
import type { SheetMarks } from '../../contract/guest-sheets.ts';

/** The marks of everybody who is still invited to a sheet, in the order they were set. */
export async function listMarks(ctx: Context, sheetId: string): Promise<SheetMarks> {
  const marks = await ctx
    .knex('marks')
    .join('sheetGuests', (on) => on.on('sheetGuests.sheetId', 'marks.sheetId').andOn('sheetGuests.accountId', 'marks.accountId'))
    .where({ 'marks.sheetId': sheetId })
    .whereNull('sheetGuests.withdrawnAt')
    .orderBy(['marks.markedAt', 'marks.proofId'])
    .select<SheetMarks['marks']>('marks.proofId', 'marks.accountId');
  return { marks };
}
