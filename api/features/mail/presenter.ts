import type { MailContent, MailRow } from '../../contract/mail.ts';
import type { Mail } from '../../models/Mail.ts';
import { blotLinks } from './blot-links.ts';
import { maySendAgain, mayWithdraw } from './policy.ts';

/** A row of the outbox with its commission's title beside it. */
export type MailWithCommission = Mail & { commissionTitle: string | null };

export function presentMail(mail: MailWithCommission): MailRow {
  return {
    id: mail.id,
    kind: mail.kind,
    to: { name: mail.toName, address: mail.toAddress },
    subject: mail.subject,
    state: mail.state,
    problem: mail.problem,
    attempts: mail.attempts,
    createdAt: mail.createdAt.toISOString(),
    sentAt: mail.sentAt?.toISOString() ?? null,
    commission: mail.commissionId ? { id: mail.commissionId, title: mail.commissionTitle ?? '' } : null,
    can: { sendAgain: maySendAgain(mail), withdraw: mayWithdraw(mail) },
  };
}

export function presentMailContent(mail: MailWithCommission): MailContent {
  return { ...presentMail(mail), text: blotLinks(mail.text), html: blotLinks(mail.html) };
}
