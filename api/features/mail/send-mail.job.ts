import type { Context } from '../../context.ts';
import type { Job } from '../../jobs/job.ts';
import { Commission } from '../../models/Commission.ts';
import { Mail } from '../../models/Mail.ts';
import { handOver, type Outcome } from '../../services/mail.ts';
import { blotLinks } from './blot-links.ts';

/**
 * Hands one mail of the outbox to the mail server, and never twice: "handing-over" is committed before the first byte leaves, and only
 * a mail that waits is taken. A process that dies in between leaves the mail at that state, for `find-unsure-mails` to find.
 */
export const sendMail: Job<{ mailId: string }> = {
  name: 'send-mail',
  timeoutSeconds: 180,
  async run(ctx, { mailId }, { lastAttempt }) {
    const mail = await claim(ctx, mailId);
    if (!mail) return;
    const outcome = await handOver(ctx.config, {
      messageId: messageIdOf(ctx.config.mail.from, mail.id),
      to: { address: mail.toAddress, name: mail.toName },
      fromName: mail.fromName,
      replyTo: mail.replyTo,
      subject: mail.subject,
      text: mail.text,
      html: mail.html,
    });
    await note(ctx, mail, outcome, lastAttempt);
    // The server's own words may hold the address, which is for no log.
    if (outcome.is === 'later' && !lastAttempt) throw new Error('the mail was not taken and waits for another try');
  },
};

/** Always the same for the same mail (RFC 5322 3.6.4). */
export function messageIdOf(from: string, mailId: string): string {
  return `<${mailId}@${from.split('@').at(-1) ?? 'localhost'}>`;
}

/** The UPDATE is the claim: of two workers one gets the row, the other none. What a deleted commission has to say waits until it is brought back. */
async function claim(ctx: Context, mailId: string): Promise<Mail | undefined> {
  const [mail] = await Mail.query(ctx.knex)
    .where({ id: mailId, state: 'waiting' })
    .whereNotExists(Commission.query().whereColumn('commissions.id', 'mails.commissionId').whereNotNull('commissions.deletedAt'))
    .patch({ state: 'handing-over', handedOverAt: new Date(), attempts: ctx.knex.raw('attempts + 1') })
    .returning('*');
  return mail;
}

async function note(ctx: Context, mail: Mail, outcome: Outcome, lastAttempt: boolean): Promise<void> {
  // An answer that comes late, after the mail was found unsure, is still the truth.
  const row = Mail.query(ctx.knex).findById(mail.id).whereIn('state', ['handing-over', 'unsure']);
  if (outcome.is === 'sent') {
    const words = { text: blotLinks(mail.text), html: blotLinks(mail.html) };
    await row.patch({ state: 'sent', sentAt: new Date(), problem: null, ...words });
  } else if (outcome.is === 'later' && !lastAttempt) {
    await row.patch({ state: 'waiting', problem: outcome.problem });
  } else {
    await row.patch({ state: outcome.is === 'unsure' ? 'unsure' : 'failed', problem: outcome.problem });
  }
}
