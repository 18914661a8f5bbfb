import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import { invitationTo } from '../../middleware/invitations.ts';
import { problem } from '../../middleware/problem.ts';
import { AccountToken } from '../../models/AccountToken.ts';
import type { Account } from '../../models/Account.ts';
import type { Sheet } from '../../models/Sheet.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { inviteAccount } from '../guests/invite-account.ts';
import { confirmAddress, type OpenedDoor } from '../guests/open-link.ts';
import { hashToken } from '../guests/tokens.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { announceSheet } from '../sheets/announce-sheet.ts';
import { holdSheet } from '../sheets/find-sheet.ts';
import { findToken, useToken } from '../sign-in/account-tokens.ts';
import { type FoundOpenLink, openLinkById, refuseClosedLink } from './find-open-link.ts';

/** People who may come to one sheet by its open link: enough for an institution, too few to bury the sheet under. */
const MOST_BY_OPEN_LINK = 300;

const goTo = (sheetId: string) => `/sheets/${sheetId}`;

/**
 * Takes the token of a mail to somebody who looked: finds or makes their account and gives it a reviewer's place on the sheet. Somebody who has
 * a place keeps it with its role. Works once; whoever used it before and is signed in at this browser is only shown the way.
 * @param me the guest at this browser
 * @throws Problem 404 and 410 for the token; 410 where the link was withdrawn or is over meanwhile; 403 where the studio took this person's place back
 */
export async function beginMarking(ctx: Context, token: string, me?: { accountId: string; email: string }): Promise<OpenedDoor> {
  const there = me && (await placeAlready(ctx, token, me));
  if (there) return there;
  const row = await findToken(ctx.knex, 'begin-marking', token);
  const link = await openLinkById(ctx.knex, row.openLinkId ?? '');
  refuseClosedLink(link);
  return ctx.knex.transaction(async (trx) => {
    // A link is withdrawn under the same lock: what was read before it may be old.
    const sheet = await holdSheet(link, link.sheetId, trx);
    refuseClosedLink(await openLinkById(trx, link.id));
    await useToken(trx, row);
    const account = await inviteAccount(trx, { email: row.email, name: row.name ?? row.email });
    await confirmAddress(trx, account.id);
    await takePlace(trx, sheet, link, account, row.name ?? account.name);
    return { accountId: account.id, goTo: goTo(sheet.id) };
  });
}

/** Opened again, or in two tabs at once: the one who used it is signed in as the guest they became. */
async function placeAlready(ctx: Context, token: string, me: { accountId: string; email: string }): Promise<OpenedDoor | undefined> {
  const row = await AccountToken.query(ctx.knex)
    .findOne({ purpose: 'begin-marking', tokenHash: hashToken(token), email: me.email })
    .whereNotNull('usedAt');
  if (!row?.openLinkId) return undefined;
  const { sheetId } = await openLinkById(ctx.knex, row.openLinkId);
  return (await invitationTo(sheetId, me.accountId)) && { accountId: me.accountId, goTo: goTo(sheetId) };
}

async function takePlace(trx: Transaction, sheet: Sheet, link: FoundOpenLink, account: Account, name: string): Promise<void> {
  const now = new Date();
  const known = await SheetGuest.query(trx).findOne({ sheetId: sheet.id, accountId: account.id });
  if (known?.withdrawnAt) {
    const ask = `Write to ${link.studioName} at ${link.replyTo} if you still need it.`;
    throw problem(403, `${link.studioName} has taken your place on this proof sheet back. ${ask}`, { code: 'place-withdrawn' });
  }
  if (known) {
    await SheetGuest.query(trx)
      .findById(known.id)
      .patch({ lastSeenAt: now, firstOpenedAt: known.firstOpenedAt ?? now });
    return;
  }
  const came = await SheetGuest.query(trx).where({ sheetId: sheet.id, byOpenLink: true }).resultSize();
  if (came >= MOST_BY_OPEN_LINK)
    throw problem(409, `More than ${MOST_BY_OPEN_LINK} people mark this sheet by its link already. Please ask the studio.`, {
      code: 'too-many',
    });
  await SheetGuest.query(trx).insert({
    studioId: sheet.studioId,
    sheetId: sheet.id,
    accountId: account.id,
    role: 'reviewer',
    name,
    byOpenLink: true,
    firstOpenedAt: now,
    lastSeenAt: now,
  });
  await addToRecord(trx, {
    studioId: sheet.studioId,
    commissionId: sheet.commissionId,
    actor: { kind: 'guest', accountId: account.id, name },
    did: 'guest.came-by-open-link',
    says: `Came to proof sheet ${sheet.number} by its open link and confirmed an address`,
    about: { sheetId: sheet.id },
  });
  await announceSheet(trx, sheet, 'sheet');
}
