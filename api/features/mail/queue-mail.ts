import type { Transaction } from 'objection';
import { enqueue } from '../../jobs/queue.ts';
import { Mail } from '../../models/Mail.ts';

/** A mail with its words already made by one of the `*.mail.ts` files. */
export interface MailToSend {
  studioId?: string | null;
  commissionId?: string | null;
  accountId?: string | null;
  /** Which `*.mail.ts` made it: "sheet-invitation", "reset-password" … */
  kind: string;
  to: { address: string; name?: string };
  fromName: string;
  replyTo?: string | null;
  subject: string;
  text: string;
  html: string;
}

/** Puts a mail into the outbox and its sending into the queue, both within the caller's transaction. Returns the mail's id. */
export async function queueMail(trx: Transaction, mail: MailToSend): Promise<string> {
  const row = await Mail.query(trx).insert({
    studioId: mail.studioId ?? null,
    commissionId: mail.commissionId ?? null,
    accountId: mail.accountId ?? null,
    kind: mail.kind,
    toAddress: mail.to.address,
    toName: mail.to.name ?? '',
    fromName: mail.fromName,
    replyTo: mail.replyTo ?? null,
    subject: mail.subject,
    text: mail.text,
    html: mail.html,
  });
  await enqueueSending(trx, row.id);
  return row.id;
}

/** Servers that ask to come back later (greylisting) want hours at times: twelve tries with the queue's back-off span some eleven hours. */
const ATTEMPTS = 12;

/** Puts the sending of a waiting mail into the queue. A second call while the first waits changes nothing. */
export async function enqueueSending(trx: Transaction, mailId: string): Promise<void> {
  await enqueue(trx, 'send-mail', { mailId }, { key: `send-mail:${mailId}`, priority: -5, maxAttempts: ATTEMPTS });
}
