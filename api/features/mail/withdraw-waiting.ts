import type { Transaction } from 'objection';
import { Mail } from '../../models/Mail.ts';

/**
 * Keeps mails that still wait from going out, when what they invite to is taken back. Returns how many that were; one that is
 * being handed over, or has gone out, cannot be caught.
 */
export async function withdrawWaitingMails(
  trx: Transaction,
  which: { studioId: string; commissionId?: string; accountId?: string; kinds: string[] },
): Promise<number> {
  const { kinds, ...columns } = which;
  return Mail.query(trx).where(columns).whereIn('kind', kinds).where('state', 'waiting').patch({ state: 'withdrawn' });
}
