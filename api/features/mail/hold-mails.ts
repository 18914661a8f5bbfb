import type { Transaction } from 'objection';
import { Mail } from '../../models/Mail.ts';
import { enqueueSending } from './queue-mail.ts';

/** Keeps the mails of a commission that still wait from going out. One that is being handed over, or has gone out, cannot be caught. */
export async function holdMails(trx: Transaction, commissionId: string): Promise<void> {
  await Mail.query(trx).where({ commissionId, state: 'waiting' }).patch({ state: 'withdrawn' });
}

/** Lets the mails that were held go out after all. */
export async function releaseMails(trx: Transaction, commissionId: string): Promise<void> {
  const held = await Mail.query(trx).where({ commissionId, state: 'withdrawn' }).patch({ state: 'waiting' }).returning('id');
  for (const { id } of held as unknown as Mail[]) await enqueueSending(trx, id);
}
