import type { Context } from '../../context.ts';
import type { InviteReviewer } from '../../contract/guest-sheets.ts';
import { sheetState } from '../../domain/sheet-state.ts';
import type { GuestActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import type { SheetGuest } from '../../models/SheetGuest.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { holdSheet } from '../sheets/find-sheet.ts';
import { inviteToSheet } from '../sheets/invite-to-sheet.ts';

/** People a lead may bring to one sheet: enough for a jury, too few for a mailing. */
const MOST_GUESTS = 60;

/** Lets a lead bring a colleague as reviewer. Somebody who is there already keeps their role. */
export async function inviteReviewer(ctx: Context, actor: GuestActor, invitation: SheetGuest, input: InviteReviewer): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(invitation, invitation.sheetId, trx);
    if (sheetState(sheet, new Date()) !== 'Open') throw problem(409, 'This sheet is no longer open.', { code: 'not-open' });
    const guests = await trx('sheetGuests')
      .join('accounts', 'accounts.id', 'sheetGuests.accountId')
      .where({ sheetId: sheet.id })
      .select<{ email: string }[]>('accounts.email');
    if (guests.some((guest) => guest.email === input.email)) {
      throw invalid([{ path: 'email', message: 'This person is on the list already. The studio can send them a new link.' }]);
    }
    if (guests.length >= MOST_GUESTS)
      throw problem(409, `At most ${MOST_GUESTS} people can look at one sheet. Please ask the studio.`, { code: 'too-many' });
    await inviteToSheet(
      ctx,
      trx,
      { ...actor, name: invitation.name },
      sheet,
      [{ name: input.name, email: input.email, role: 'reviewer' }],
      input.words,
    );
    await addToRecord(trx, {
      studioId: sheet.studioId,
      commissionId: sheet.commissionId,
      actor: { ...actor, name: invitation.name },
      did: 'guest.invited',
      says: `Invited ${input.name} as reviewer to proof sheet ${sheet.number}`,
      about: { sheetId: sheet.id },
    });
  });
}
