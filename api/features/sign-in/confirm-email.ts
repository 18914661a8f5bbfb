import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import type { ConfirmEmail, ConfirmEmailLink } from '../../contract/sign-in.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Account } from '../../models/Account.ts';
import { AccountToken } from '../../models/AccountToken.ts';
import { Studio } from '../../models/Studio.ts';
import { createStudio } from '../studios/create-studio.ts';
import { hashToken } from '../guests/tokens.ts';
import { findToken, useToken } from './account-tokens.ts';
import { verifyPassword } from './passwords.ts';
import { mailConfirmation } from './sign-up.ts';

/** What a confirmation link is for. @throws Problem 404 or 410 */
export async function lookAtConfirmation(ctx: Context, token: string): Promise<ConfirmEmailLink> {
  const row = await findToken(ctx.knex, 'confirm-email', token);
  return { email: row.email, studioName: await studioNameOf(ctx, row) };
}

async function studioNameOf(ctx: Context, row: AccountToken): Promise<string> {
  if (row.name) return row.name;
  const studio = await Studio.query(ctx.knex)
    .join('memberships', 'memberships.studioId', 'studios.id')
    .findOne({ 'memberships.accountId': row.accountId })
    .select('studios.*');
  return studio?.name ?? 'Oriel';
}

/**
 * Confirms the address of a sign-up. The link alone is not enough: somebody may have signed up with another person's address, who
 * would then confirm an account whose password somebody else knows. Returns the account to begin a session for.
 * @throws Problem 404, 410, or 422 where the password is another one
 */
export async function confirmEmail(ctx: Context, { token, password }: ConfirmEmail): Promise<string> {
  const row = await findToken(ctx.knex, 'confirm-email', token);
  const account = await Account.query(ctx.knex)
    .findById(row.accountId ?? '')
    .throwIfNotFound();
  if (!(await verifyPassword(row.passwordHash ?? account.passwordHash, password))) {
    throw invalid([{ path: 'password', message: 'This is not the password that was chosen when signing up.' }]);
  }
  await ctx.knex.transaction(async (trx) => {
    await useToken(trx, row);
    if (row.passwordHash) await takeOver(trx, account, row);
    await Account.query(trx).findById(account.id).whereNull('emailConfirmedAt').patch({ emailConfirmedAt: new Date() });
  });
  return account.id;
}

/** Of somebody who had an account without a studio: now the studio and the password they chose begin to count. */
async function takeOver(trx: Transaction, account: Account, row: AccountToken): Promise<void> {
  const present = await Account.query(trx).findById(account.id).forUpdate().withGraphFetched('membership').throwIfNotFound();
  if (present.membership) throw problem(409, 'This address has joined a studio meanwhile. Sign in there.', { code: 'has-studio' });
  await Account.query(trx).findById(account.id).patch({ passwordHash: row.passwordHash });
  await createStudio(trx, { name: row.name ?? account.name, replyTo: account.email, owner: account });
}

/** Sends a new confirmation for a link that has expired, to the same address. Does nothing for any other token. */
export async function confirmAgain(ctx: Context, token: string): Promise<void> {
  const row = await AccountToken.query(ctx.knex)
    .findOne({ purpose: 'confirm-email', tokenHash: hashToken(token) })
    .whereNull('usedAt');
  if (!row?.accountId) return;
  const account = await Account.query(ctx.knex).findById(row.accountId).throwIfNotFound();
  if (account.emailConfirmedAt && !row.passwordHash) return;
  const studioName = await studioNameOf(ctx, row);
  await ctx.knex.transaction((trx) =>
    mailConfirmation(ctx, trx, account, {
      studioName,
      ...(row.passwordHash ? { pending: { passwordHash: row.passwordHash, studioName } } : {}),
    }),
  );
}
