import { z } from 'zod';
import type { Operation } from './operation.ts';
import { Limit } from './paging.ts';

export const MailState = z.enum(['waiting', 'handing-over', 'sent', 'failed', 'unsure', 'withdrawn']);
export type MailState = z.infer<typeof MailState>;

export const ListMails = z.object({
  /** open: what a person may have to look at, failed or unsure. */
  state: z.enum(['all', 'open', 'waiting', 'sent', 'failed', 'unsure', 'withdrawn']).default('all'),
  commissionId: z.uuid().optional(),
  after: z.string().max(500).optional(),
  limit: Limit,
});
export type ListMails = z.infer<typeof ListMails>;

export const MailRow = z.object({
  id: z.uuid(),
  kind: z.string(),
  to: z.object({ name: z.string(), address: z.string() }),
  subject: z.string(),
  state: MailState,
  /** What went wrong the last time, in a sentence. */
  problem: z.string().nullable(),
  attempts: z.number().int(),
  createdAt: z.iso.datetime(),
  sentAt: z.iso.datetime().nullable(),
  commission: z.object({ id: z.uuid(), title: z.string() }).nullable(),
  can: z.object({ sendAgain: z.boolean(), withdraw: z.boolean() }),
});
export type MailRow = z.infer<typeof MailRow>;

export const MailsPage = z.object({
  items: z.array(MailRow),
  next: z.string().nullable(),
  /** How many mails of the studio failed or may have gone out. */
  open: z.number().int(),
});
export type MailsPage = z.infer<typeof MailsPage>;

/** The mail as it goes out, except that the secret part of its links is blotted out: a link lets in whoever has it. */
export const MailContent = MailRow.extend({ text: z.string(), html: z.string() });
export type MailContent = z.infer<typeof MailContent>;

const mail = '/api/mails/{mailId}';

export const mailOperations: Operation[] = [
  {
    method: 'get',
    path: '/api/mails',
    summary: "The studio's outbox, newest first",
    who: 'staff',
    query: ListMails,
    answer: MailsPage,
  },
  { method: 'get', path: mail, summary: 'One mail with its words', who: 'staff', answer: MailContent },
  { method: 'post', path: `${mail}/send-again`, summary: 'Send a mail that failed or may have gone out', who: 'staff', answer: MailRow },
  { method: 'post', path: `${mail}/withdraw`, summary: 'Do not send a mail that has not gone out', who: 'staff', answer: MailRow },
];
