import type { Context } from '../../context.ts';
import { Account } from '../../models/Account.ts';
import { DeliveryRecipient } from '../../models/DeliveryRecipient.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { findLink } from './find-link.ts';
import { newLinkMail } from './new-link.mail.ts';
import { linkAddress, newToken } from './tokens.ts';

/**
 * Sends a new link to the person an older one was made for, at the account's address and nowhere else. Does nothing where the token
 * is unknown, withdrawn or over; the caller answers the same in every case.
 */
export async function askNewLink(ctx: Context, token: string): Promise<void> {
  const link = await findLink(ctx.knex, token);
  if (!link || link.withdrawn || link.ended) return;
  await ctx.knex.transaction(async (trx) => {
    const { token: fresh, hash } = newToken();
    const rows = link.kind === 'sheet' ? SheetGuest.query(trx) : DeliveryRecipient.query(trx);
    const changed = await rows.findById(link.id).whereNull('withdrawnAt').patch({ tokenHash: hash });
    if (changed === 0) return;
    const account = await Account.query(trx).findById(link.accountId).throwIfNotFound();
    await queueMail(trx, {
      studioId: link.studioId,
      commissionId: link.commissionId,
      accountId: account.id,
      kind: 'new-link',
      to: { address: account.email, name: link.name },
      fromName: link.studioName,
      replyTo: link.replyTo,
      ...newLinkMail(link, linkAddress(ctx.config, fresh)),
    });
  });
}
