import type { Knex } from 'knex';
import type { Transaction } from 'objection';
import { problem } from '../../middleware/problem.ts';
import { AccountToken } from '../../models/AccountToken.ts';
import { hashToken, newToken } from '../guests/tokens.ts';

export type Purpose = AccountToken['purpose'];

const HOUR = 60 * 60 * 1000;
const LASTS: Record<Purpose, number> = {
  'reset-password': HOUR,
  'confirm-email': 7 * 24 * HOUR,
  'join-studio': 7 * 24 * HOUR,
  'begin-marking': 24 * HOUR,
};

export interface IssuedToken {
  id: string;
  /** For the mail alone; the table holds its hash. */
  token: string;
  expiresAt: Date;
}

type Fields = Pick<AccountToken, 'purpose' | 'email'> &
  Partial<Pick<AccountToken, 'accountId' | 'studioId' | 'name' | 'passwordHash' | 'openLinkId' | 'createdBy'>>;

/** Makes a single-use token: a reset lasts an hour, what begins marking a day, a confirmation and an invitation seven days. */
export async function issueToken(trx: Transaction, fields: Fields): Promise<IssuedToken> {
  const { token, hash } = newToken();
  const expiresAt = new Date(Date.now() + LASTS[fields.purpose]);
  const row = await AccountToken.query(trx).insertAndFetch({ ...fields, tokenHash: hash, expiresAt });
  return { id: row.id, token, expiresAt };
}

/** The row of a token that can still be used. @throws Problem 404 where there is none, 410 where it was used or has expired */
export async function findToken(db: Knex, purpose: Purpose, token: string): Promise<AccountToken> {
  const row = await AccountToken.query(db).findOne({ purpose, tokenHash: hashToken(token) });
  if (!row) throw problem(404, 'There is no such link. It may have been cut short, withdrawn, or replaced by a newer one.');
  if (row.usedAt) throw used();
  if (row.expiresAt <= new Date()) throw problem(410, 'The time of this link is over.', { code: 'link-expired' });
  return row;
}

/** Uses a token up; the guard is in the UPDATE, so of two uses at once one fails. @throws Problem 410 */
export async function useToken(trx: Transaction, row: AccountToken): Promise<void> {
  const changed = await AccountToken.query(trx)
    .findById(row.id)
    .whereNull('usedAt')
    .where('expiresAt', '>', new Date())
    .patch({ usedAt: new Date() });
  if (changed === 0) throw used();
}

function used() {
  return problem(410, 'This link was used already; it works once.', { code: 'link-used' });
}
