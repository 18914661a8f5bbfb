import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Proof } from '../../models/Proof.ts';
import { Sheet } from '../../models/Sheet.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { findSheet, holdSheet } from './find-sheet.ts';
import { type Invitation, inviteToSheet } from './invite-to-sheet.ts';

/** Opens a draft to its guests and sends each a link. A second request finds it open and changes nothing. */
export async function issueSheet(ctx: Context, actor: StaffActor, sheetId: string, guests: Invitation[], words: string): Promise<Sheet> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(actor, sheetId, trx);
    if (sheet.issuedAt) throw problem(409, 'This sheet is open already. Invite further people instead.', { code: 'issued' });
    if (!sheet.endsAt) throw invalid([{ path: 'chooseBy', message: 'Set the last date to choose first.' }]);
    if (sheet.endsAt <= new Date()) throw invalid([{ path: 'chooseBy', message: 'The last date has passed already.' }]);
    if (!guests.some((guest) => guest.role === 'lead')) {
      throw invalid([{ path: 'guests', message: 'Name one lead: somebody has to send the picks.' }]);
    }
    const proofs = await Proof.within(actor, trx).where({ sheetId }).resultSize();
    if (proofs === 0) throw problem(409, 'There is no proof on this sheet yet.', { code: 'empty' });
    await Sheet.within(actor, trx).findById(sheetId).patch({ issuedAt: new Date() });
    await inviteToSheet(ctx, trx, actor, sheet, guests, words);
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: sheet.commissionId,
      actor,
      did: 'sheet.issued',
      says: `Opened proof sheet ${sheet.number} with ${proofs} ${proofs === 1 ? 'proof' : 'proofs'} to ${guests.length} ${guests.length === 1 ? 'person' : 'people'}`,
      about: { sheetId, proofs, guests: guests.length },
    });
    await announce(trx, `commission:${sheet.commissionId}`, { what: 'sheet', sheetId });
  });
  return findSheet(actor, sheetId);
}
