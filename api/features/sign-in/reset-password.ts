import type { Context } from '../../context.ts';
import type { FinishPasswordReset, PasswordResetLink } from '../../contract/sign-in.ts';
import { Account } from '../../models/Account.ts';
import { AccountToken } from '../../models/AccountToken.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { findToken, issueToken, useToken } from './account-tokens.ts';
import { mailPasswordChanged } from './change-password.ts';
import { endSessions } from './end-sessions.ts';
import { refuseGuessable } from './guessable.ts';
import { hashPassword } from './passwords.ts';
import { resetPasswordMail } from './reset-password.mail.ts';

/** Mails a link to choose a new password where the address has one. The caller answers the same in every case. */
export async function askPasswordReset(ctx: Context, email: string): Promise<void> {
  const account = await Account.query(ctx.knex).findOne({ email }).whereNotNull('passwordHash');
  if (!account) return;
  await ctx.knex.transaction(async (trx) => {
    const issued = await issueToken(trx, { purpose: 'reset-password', email, accountId: account.id });
    await queueMail(trx, {
      accountId: account.id,
      kind: 'reset-password',
      to: { address: email, name: account.name },
      fromName: 'Oriel',
      ...resetPasswordMail({
        name: account.name,
        address: `${ctx.config.address}/reset-password/${issued.token}`,
        until: issued.expiresAt,
      }),
    });
  });
}

/** Whose password a link is for. @throws Problem 404 or 410 */
export async function lookAtReset(ctx: Context, token: string): Promise<PasswordResetLink> {
  const { email } = await findToken(ctx.knex, 'reset-password', token);
  return { email };
}

/**
 * Sets the new password, ends every session and uses up every reset link of the account. The link proves the address too.
 * @throws Problem 404, 410, or 422 where the password would be guessed
 */
export async function finishPasswordReset(ctx: Context, { token, password }: FinishPasswordReset): Promise<void> {
  const row = await findToken(ctx.knex, 'reset-password', token);
  const account = await Account.query(ctx.knex)
    .findById(row.accountId ?? '')
    .throwIfNotFound();
  await refuseGuessable(password, { email: account.email, names: [account.name] });
  const passwordHash = await hashPassword(password);
  await ctx.knex.transaction(async (trx) => {
    await useToken(trx, row);
    await AccountToken.query(trx)
      .where({ purpose: 'reset-password', accountId: account.id })
      .whereNull('usedAt')
      .patch({ usedAt: new Date() });
    await Account.query(trx)
      .findById(account.id)
      .patch({ passwordHash, emailConfirmedAt: account.emailConfirmedAt ?? new Date() });
    await endSessions(trx, account.id);
    await mailPasswordChanged(ctx, trx, account);
  });
}
