import type { Context } from '../../context.ts';
import type { MailContent, MailRow } from '../../contract/mail.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Mail } from '../../models/Mail.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { blotLinks } from './blot-links.ts';
import { mailsOf } from './list-mails.ts';
import { maySendAgain, mayWithdraw } from './policy.ts';
import { type MailWithCommission, presentMail, presentMailContent } from './presenter.ts';
import { enqueueSending } from './queue-mail.ts';

async function find(ctx: Context, actor: StaffActor, mailId: string): Promise<MailWithCommission> {
  const mail = await mailsOf(ctx, actor).findOne('mails.id', mailId);
  if (!mail) throw problem(404);
  return mail as MailWithCommission;
}

/** One mail with its words. @throws Problem 404 */
export async function readMail(ctx: Context, actor: StaffActor, mailId: string): Promise<MailContent> {
  return presentMailContent(await find(ctx, actor, mailId));
}

/** Puts a mail that failed, or may have gone out, back into the outbox. @throws Problem 404, or 409 where it is in another state. */
export async function sendMailAgain(ctx: Context, actor: StaffActor, mailId: string): Promise<MailRow> {
  const mail = await find(ctx, actor, mailId);
  await ctx.knex.transaction(async (trx) => {
    const changed = await Mail.query(trx)
      .where({ id: mail.id, studioId: actor.studioId })
      .whereIn('state', ['failed', 'unsure'])
      .patch({ state: 'waiting', problem: null });
    if (changed === 0 || !maySendAgain(mail)) throw wrongState();
    await enqueueSending(trx, mail.id);
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: mail.commissionId,
      actor,
      did: 'mail.sent-again',
      says: `Sent the mail "${mail.subject}" to ${mail.toName || mail.toAddress} again`,
      about: { mailId: mail.id },
    });
  });
  return presentMail(await find(ctx, actor, mailId));
}

/** Keeps a mail from going out. @throws Problem 404, or 409 where it has gone, or is going, out. */
export async function withdrawMail(ctx: Context, actor: StaffActor, mailId: string): Promise<MailRow> {
  const mail = await find(ctx, actor, mailId);
  await ctx.knex.transaction(async (trx) => {
    const changed = await Mail.query(trx)
      .where({ id: mail.id, studioId: actor.studioId })
      .whereIn('state', ['waiting', 'failed', 'unsure'])
      .patch({ state: 'withdrawn', text: blotLinks(mail.text), html: blotLinks(mail.html) });
    if (changed === 0 || !mayWithdraw(mail)) throw wrongState();
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: mail.commissionId,
      actor,
      did: 'mail.withdrawn',
      says: `Withdrew the mail "${mail.subject}" to ${mail.toName || mail.toAddress}`,
      about: { mailId: mail.id },
    });
  });
  return presentMail(await find(ctx, actor, mailId));
}

function wrongState() {
  return problem(409, 'This mail has moved on meanwhile. Look at its present state.', { code: 'mail-moved-on' });
}
