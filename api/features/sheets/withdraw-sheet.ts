import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Sheet } from '../../models/Sheet.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { announceSheet } from './announce-sheet.ts';
import { findSheet, holdSheet } from './find-sheet.ts';

/** Takes a sheet back from all its guests at once, or puts it back before them; marks and lists stay as they are. */
export async function withdrawSheet(ctx: Context, actor: StaffActor, sheetId: string, withdrawn: boolean): Promise<Sheet> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(actor, sheetId, trx);
    if (!sheet.issuedAt) throw problem(409, 'A draft is with nobody; it can be removed.', { code: 'draft' });
    if (Boolean(sheet.withdrawnAt) === withdrawn) return;
    await Sheet.within(actor, trx)
      .findById(sheetId)
      .patch({ withdrawnAt: withdrawn ? new Date() : null, version: sheet.version + 1 });
    await announceSheet(trx, sheet, 'sheet');
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: sheet.commissionId,
      actor,
      did: withdrawn ? 'sheet.withdrawn' : 'sheet.restored',
      says: withdrawn ? `Took proof sheet ${sheet.number} back` : `Put proof sheet ${sheet.number} back before its guests`,
      about: { sheetId },
    });
  });
  return findSheet(actor, sheetId);
}

/** Removes a draft with its proofs; the frames stay. */
export async function removeSheet(ctx: Context, actor: StaffActor, sheetId: string): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(actor, sheetId, trx);
    if (sheet.issuedAt) throw problem(409, 'This sheet was with guests and stays on record. It can be taken back.', { code: 'issued' });
    await Sheet.within(actor, trx).deleteById(sheetId);
    await announce(trx, `commission:${sheet.commissionId}`, { what: 'sheet', sheetId });
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: sheet.commissionId,
      actor,
      did: 'sheet.removed',
      says: `Removed the draft of proof sheet ${sheet.number}`,
      about: { sheetId },
    });
  });
}
