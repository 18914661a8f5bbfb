import type { Knex } from 'knex';
import type { Context } from '../../context.ts';
import type { SendPickList } from '../../contract/guest-sheets.ts';
import { announce } from '../../db/live.ts';
import { allowanceState, placePicks } from '../../domain/allowance.ts';
import { initials } from '../../domain/initials.ts';
import { sheetState } from '../../domain/sheet-state.ts';
import type { GuestActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Pick } from '../../models/Pick.ts';
import { PickList } from '../../models/PickList.ts';
import { Sheet } from '../../models/Sheet.ts';
import type { SheetGuest } from '../../models/SheetGuest.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { sheetForMail } from '../sheets/sheet-for-mail.ts';
import { pickListMail, pickListReceiptMail } from './pick-list.mail.ts';
import { type MarkedProof, picksInOrder } from './picks-in-order.ts';

/**
 * Makes the pick list: an immutable numbered copy of the lead's picks at this moment. The sheet is closed by the UPDATE itself, so of two
 * clicks one finds it open. @throws Problem 409 where it was sent or has ended, or where the picks are not those that the lead saw.
 */
export async function sendPickList(ctx: Context, actor: GuestActor, invitation: SheetGuest, input: SendPickList): Promise<PickList> {
  return ctx.knex.transaction(async (trx) => {
    const sheet = await closeSheet(trx, invitation.sheetId);
    const picks = await picksInOrder(trx, sheet.id);
    const seen = new Set(input.proofIds);
    if (picks.length !== seen.size || !picks.every((pick) => seen.has(pick.proofId))) {
      throw problem(409, 'The picks changed while you looked. Please look at them again before you send.', { code: 'picks-changed' });
    }
    const list = await copyPicks(trx, actor, invitation, sheet, picks, input.words);
    await tellStudio(ctx, trx, actor, invitation, sheet, list, picks);
    return list;
  });
}

async function closeSheet(trx: Knex.Transaction, sheetId: string): Promise<Sheet> {
  const [closed] = await Sheet.query(trx)
    .where({ id: sheetId })
    .whereNotNull('issuedAt')
    .whereNull('withdrawnAt')
    .whereNull('sentAt')
    .where((open) => open.whereNull('endsAt').orWhere('endsAt', '>', trx.fn.now()))
    .patch({ sentAt: new Date() })
    .returning('*')
    .castTo<Sheet[]>();
  if (closed) return closed;
  const sheet = await Sheet.query(trx).findById(sheetId);
  if (!sheet) throw problem(404);
  if (sheetState(sheet, new Date()) === 'Sent') throw problem(409, 'These picks were sent already.', { code: 'sent' });
  throw problem(409, 'The last date has passed; nothing can be sent any more. Please write to the studio.', { code: 'ended' });
}

async function copyPicks(
  trx: Knex.Transaction,
  actor: GuestActor,
  invitation: SheetGuest,
  sheet: Sheet,
  picks: MarkedProof[],
  words: string,
): Promise<PickList> {
  const { extras } = allowanceState(picks.length, { included: sheet.allowance, extraPrice: sheet.extraPrice });
  const before = await PickList.within(sheet, trx).where({ sheetId: sheet.id }).resultSize();
  const list = await PickList.query(trx).insertAndFetch({
    studioId: sheet.studioId,
    sheetId: sheet.id,
    commissionId: sheet.commissionId,
    number: before + 1,
    sentBy: actor.accountId,
    sentByName: invitation.name,
    words,
    pickCount: picks.length,
    allowance: sheet.allowance,
    extraCount: extras,
    extraPrice: sheet.extraPrice,
    currency: sheet.currency,
  });
  await Pick.query(trx).insert(
    placePicks(picks, sheet.allowance).map(({ pick, number, extra }) => ({
      studioId: sheet.studioId,
      pickListId: list.id,
      number,
      extra,
      proofId: pick.proofId,
      proofNumber: pick.proofNumber,
      frameId: pick.frameId,
      frameName: pick.frameName,
      frameIds: pick.frameIds,
      viewId: pick.viewId,
      viewTitle: pick.viewTitle,
      markedBy: pick.markedBy.map((guest) => ({ ...guest, initials: initials(guest.name) })),
    })),
  );
  return list;
}

async function tellStudio(
  ctx: Context,
  trx: Knex.Transaction,
  actor: GuestActor,
  invitation: SheetGuest,
  sheet: Sheet,
  list: PickList,
  picks: MarkedProof[],
): Promise<void> {
  const about = await sheetForMail(trx, sheet);
  const link = `${ctx.config.address}/commissions/${sheet.commissionId}/picks`;
  await queueMail(trx, {
    studioId: sheet.studioId,
    commissionId: sheet.commissionId,
    kind: 'pick-list',
    to: { address: about.studio.replyTo, name: about.studio.name },
    fromName: 'Oriel',
    replyTo: actor.email,
    ...pickListMail({ ...about, list, picks, link }),
  });
  await queueMail(trx, {
    studioId: sheet.studioId,
    commissionId: sheet.commissionId,
    accountId: actor.accountId,
    kind: 'pick-list-receipt',
    to: { address: actor.email, name: invitation.name },
    fromName: about.studio.name,
    replyTo: about.studio.replyTo,
    ...pickListReceiptMail({ ...about, list, picks, guest: invitation.name, link: `${ctx.config.address}/sheets/${sheet.id}/review` }),
  });
  await addToRecord(trx, {
    studioId: sheet.studioId,
    commissionId: sheet.commissionId,
    actor: { ...actor, name: invitation.name },
    did: 'pick-list.sent',
    says: `Sent pick list ${list.number}: ${list.pickCount} ${list.pickCount === 1 ? 'pick' : 'picks'}, ${list.extraCount} extra`,
    about: { sheetId: sheet.id, pickListId: list.id, picks: list.pickCount, extras: list.extraCount },
  });
  await announce(trx, `sheet:${sheet.id}`, { what: 'sent' });
  await announce(trx, `commission:${sheet.commissionId}`, { what: 'picks' });
}
