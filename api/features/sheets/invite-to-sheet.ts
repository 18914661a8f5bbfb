import type { Knex } from 'knex';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { Actor, StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import type { Sheet } from '../../models/Sheet.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { inviteAccount } from '../guests/invite-account.ts';
import { linkAddress, newToken } from '../guests/tokens.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { findSheet, holdSheet } from './find-sheet.ts';
import { sheetCan } from './policy.ts';
import { sheetForMail } from './sheet-for-mail.ts';
import { sheetInvitationMail } from './sheet-invitation.mail.ts';

export interface Invitation {
  name: string;
  email: string;
  role: 'lead' | 'reviewer';
}

/** Invites further people to an issued sheet. */
export async function inviteGuests(ctx: Context, actor: StaffActor, sheetId: string, guests: Invitation[], words: string): Promise<Sheet> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(actor, sheetId, trx);
    if (!sheetCan(sheet, 1, new Date()).invite) throw problem(409, 'Open the sheet first: a draft has no guests.', { code: 'draft' });
    await inviteToSheet(ctx, trx, actor, sheet, guests, words);
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: sheet.commissionId,
      actor,
      did: 'guest.invited',
      says: `Invited ${guests.map((guest) => `${guest.name} as ${guest.role}`).join(', ')} to proof sheet ${sheet.number}`,
      about: { sheetId },
    });
  });
  return findSheet(actor, sheetId);
}

/** Gives each person a place on the sheet and a link by mail. Somebody already there keeps their marks and gets a new link and role. */
export async function inviteToSheet(
  ctx: Context,
  trx: Knex.Transaction,
  actor: Actor,
  sheet: Sheet,
  guests: Invitation[],
  words: string,
): Promise<void> {
  const about = await sheetForMail(trx, sheet);
  for (const guest of guests) {
    const account = await inviteAccount(trx, guest);
    const { token, hash } = newToken();
    await SheetGuest.query(trx)
      .insert({
        studioId: sheet.studioId,
        sheetId: sheet.id,
        accountId: account.id,
        role: guest.role,
        name: guest.name,
        words,
        tokenHash: hash,
        invitedBy: actor.accountId,
      })
      .onConflict(['sheetId', 'accountId'])
      .merge({ role: guest.role, name: guest.name, words, tokenHash: hash, withdrawnAt: null });
    const mail = sheetInvitationMail({
      ...about,
      guest: guest.name,
      role: guest.role,
      words,
      link: linkAddress(ctx.config, token),
      from: actor.name,
    });
    await queueMail(trx, {
      studioId: sheet.studioId,
      commissionId: sheet.commissionId,
      accountId: account.id,
      kind: 'sheet-invitation',
      to: { address: account.email, name: guest.name },
      fromName: about.studio.name,
      replyTo: about.studio.replyTo,
      ...mail,
    });
  }
  await announce(trx, `sheet:${sheet.id}`, { what: 'sheet' });
}
