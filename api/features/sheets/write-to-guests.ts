import type { Knex } from 'knex';
import type { Context } from '../../context.ts';
import { sheetState } from '../../domain/sheet-state.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import type { Sheet } from '../../models/Sheet.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { linkAddress, newToken } from '../guests/tokens.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { findSheet, holdSheet } from './find-sheet.ts';
import { sheetForMail } from './sheet-for-mail.ts';
import { sheetInvitationMail } from './sheet-invitation.mail.ts';
import { sheetReminderMail } from './sheet-reminder.mail.ts';

/** Gives one guest a new link; the one before stops working. */
export async function sendLinkAgain(ctx: Context, actor: StaffActor, sheetId: string, guestId: string, words: string): Promise<Sheet> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(actor, sheetId, trx);
    const guest = await findGuest(trx, actor, sheetId, guestId);
    if (guest.withdrawnAt) throw problem(409, `The link of ${guest.name} was taken back. Let them in again first.`, { code: 'withdrawn' });
    await mailLink(ctx, trx, actor, sheet, guest, 'sheet-invitation', words);
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: sheet.commissionId,
      actor,
      did: 'guest.link-sent-again',
      says: `Sent ${guest.name} a new link to proof sheet ${sheet.number}`,
      about: { sheetId, guestId },
    });
  });
  return findSheet(actor, sheetId);
}

/** Reminds everybody with a place on an open sheet of its last date. */
export async function remindGuests(ctx: Context, actor: StaffActor, sheetId: string, words: string): Promise<Sheet> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(actor, sheetId, trx);
    if (sheetState(sheet, new Date()) !== 'Open')
      throw problem(409, 'Only an open sheet has something to remind of.', { code: 'not-open' });
    const guests = await SheetGuest.within(actor, trx).where({ sheetId }).whereNull('withdrawnAt').withGraphFetched('account');
    for (const guest of guests) await mailLink(ctx, trx, actor, sheet, guest, 'sheet-reminder', words);
    await SheetGuest.within(actor, trx).where({ sheetId }).whereNull('withdrawnAt').patch({ remindedAt: new Date() });
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: sheet.commissionId,
      actor,
      did: 'sheet.reminded',
      says: `Reminded ${guests.length} ${guests.length === 1 ? 'person' : 'people'} of proof sheet ${sheet.number}`,
      about: { sheetId },
    });
  });
  return findSheet(actor, sheetId);
}

/** Takes one guest's link back at once, or lets them in again with the marks they had. */
export async function withdrawGuest(ctx: Context, actor: StaffActor, sheetId: string, guestId: string, withdrawn: boolean): Promise<Sheet> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(actor, sheetId, trx);
    const guest = await findGuest(trx, actor, sheetId, guestId);
    if (Boolean(guest.withdrawnAt) === withdrawn) return;
    await SheetGuest.within(actor, trx)
      .findById(guestId)
      .patch({ withdrawnAt: withdrawn ? new Date() : null });
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: sheet.commissionId,
      actor,
      did: withdrawn ? 'guest.withdrawn' : 'guest.restored',
      says: withdrawn
        ? `Took back the link of ${guest.name} to proof sheet ${sheet.number}`
        : `Let ${guest.name} in to proof sheet ${sheet.number} again`,
      about: { sheetId, guestId },
    });
  });
  return findSheet(actor, sheetId);
}

async function findGuest(trx: Knex.Transaction, actor: StaffActor, sheetId: string, guestId: string): Promise<SheetGuest> {
  const guest = await SheetGuest.within(actor, trx).findOne({ id: guestId, sheetId }).withGraphFetched('account');
  if (!guest) throw problem(404);
  return guest;
}

/** Links are never kept in the clear, so every mail with a link carries a new one. */
async function mailLink(
  ctx: Context,
  trx: Knex.Transaction,
  actor: StaffActor,
  sheet: Sheet,
  guest: SheetGuest,
  kind: 'sheet-invitation' | 'sheet-reminder',
  words: string,
): Promise<void> {
  const { token, hash } = newToken();
  await SheetGuest.within(actor, trx).findById(guest.id).patch({ tokenHash: hash });
  const about = await sheetForMail(trx, sheet);
  const write = kind === 'sheet-invitation' ? sheetInvitationMail : sheetReminderMail;
  const mail = write({ ...about, guest: guest.name, role: guest.role, words, link: linkAddress(ctx.config, token), from: actor.name });
  await queueMail(trx, {
    studioId: sheet.studioId,
    commissionId: sheet.commissionId,
    accountId: guest.accountId,
    kind,
    to: { address: guest.account?.email ?? '', name: guest.name },
    fromName: about.studio.name,
    replyTo: about.studio.replyTo,
    ...mail,
  });
}
