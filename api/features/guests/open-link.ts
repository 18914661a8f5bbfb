import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import { problem } from '../../middleware/problem.ts';
import { Account } from '../../models/Account.ts';
import { DeliveryRecipient } from '../../models/DeliveryRecipient.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { findLink, type Link } from './find-link.ts';

/** Who may come in by the link, and where it leads. */
export interface OpenedDoor {
  accountId: string;
  goTo: string;
}

/**
 * Takes the token of a link. Safe to repeat: the link works until its sheet or delivery ends or it is withdrawn.
 * @throws Problem 404 where there is no such link; 410 with the code "withdrawn", "ended" or "replaced"
 */
export async function openLink(ctx: Context, token: string): Promise<OpenedDoor> {
  const link = await findLink(ctx.knex, token);
  if (!link) throw problem(404, 'There is no such link. It may have been cut short: open it from your e-mail, or copy all of it.');
  refuseClosed(link);
  await ctx.knex.transaction(async (trx) => {
    await confirmAddress(trx, link.accountId);
    if (await isFirstOpening(trx, link)) await noteFirstOpening(trx, link);
  });
  return { accountId: link.accountId, goTo: link.goTo };
}

function refuseClosed(link: Link): void {
  const what = link.kind === 'sheet' ? 'proof sheet' : 'delivery';
  const ask = `Write to ${link.studioName} at ${link.replyTo}`;
  if (link.withdrawn) {
    throw problem(410, `${link.studioName} has withdrawn this ${what}. ${ask} if you still need it.`, { code: 'withdrawn' });
  }
  if (link.ended) throw problem(410, `The time of this ${what} is over. ${ask} if you still need it.`, { code: 'ended' });
  if (link.replaced) {
    throw problem(410, `A newer link to this ${what} was sent to you since. Open the newest mail, or ask for a new link.`, {
      code: 'replaced',
    });
  }
}

/**
 * Whoever holds the link got the mail, so the address is theirs. Not so for an account with a password that is not confirmed yet:
 * somebody else may have chosen that password, and it must not start to count by this.
 */
export async function confirmAddress(trx: Transaction, accountId: string): Promise<void> {
  await Account.query(trx)
    .findById(accountId)
    .whereNull('emailConfirmedAt')
    .whereNull('passwordHash')
    .patch({ emailConfirmedAt: new Date() });
}

/** The guard is in the UPDATE, so of two openings at once one is the first. */
async function isFirstOpening(trx: Transaction, link: Link): Promise<boolean> {
  const rows = () => (link.kind === 'sheet' ? SheetGuest.query(trx) : DeliveryRecipient.query(trx));
  const now = new Date();
  const first = await rows().findById(link.id).whereNull('firstOpenedAt').patch({ firstOpenedAt: now, lastSeenAt: now });
  if (first === 0) await rows().findById(link.id).patch({ lastSeenAt: now });
  return first > 0;
}

async function noteFirstOpening(trx: Transaction, link: Link): Promise<void> {
  await addToRecord(trx, {
    studioId: link.studioId,
    commissionId: link.commissionId,
    actor: { kind: 'guest', accountId: link.accountId, name: link.name },
    did: 'guest.opened',
    says: link.kind === 'sheet' ? `Opened proof sheet ${link.number}` : `Opened delivery ${link.number}`,
    about: { [link.kind]: link.goTo.split('/').at(-1) },
  });
  await announce(trx, `commission:${link.commissionId}`, { what: 'guests' });
}
