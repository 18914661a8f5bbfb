import type { AskToMark } from '../../contract/open-links.ts';
import type { Context } from '../../context.ts';
import { sheetState } from '../../domain/sheet-state.ts';
import type { Looker } from '../../middleware/lookers.ts';
import { problem } from '../../middleware/problem.ts';
import { Sheet } from '../../models/Sheet.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { issueToken } from '../sign-in/account-tokens.ts';
import { beginMarkingMail } from './begin-marking.mail.ts';
import { openLinkById } from './find-open-link.ts';

/**
 * Sends somebody who looks a link to confirm their address by. Whether the address is known makes no difference here, neither to the answer nor
 * to what is done: an account is found or made when the link is opened.
 * @throws Problem 409 once nothing can be marked any more
 */
export async function askToMark(ctx: Context, looker: Looker, { name, email }: AskToMark): Promise<void> {
  const link = await openLinkById(ctx.knex, looker.openLinkId);
  const sheet = await Sheet.query(ctx.knex).findById(looker.sheetId).throwIfNotFound();
  if (sheetState(sheet, new Date()) !== 'Open')
    throw problem(409, 'The picks were sent already; you can look, but nothing can be marked any more.', { code: 'not-open' });
  await ctx.knex.transaction(async (trx) => {
    const issued = await issueToken(trx, { purpose: 'begin-marking', email, name, openLinkId: link.id });
    await queueMail(trx, {
      studioId: link.studioId,
      commissionId: link.commissionId,
      kind: 'begin-marking',
      to: { address: email, name },
      fromName: link.studioName,
      replyTo: link.replyTo,
      ...beginMarkingMail(link, name, `${ctx.config.address}/begin/${issued.token}`),
    });
  });
}
