import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import type { ChangePassword } from '../../contract/sign-in.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Account } from '../../models/Account.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { endSessions } from './end-sessions.ts';
import { refuseGuessable } from './guessable.ts';
import { passwordChangedMail } from './password-changed.mail.ts';
import { hashPassword, verifyPassword } from './passwords.ts';

/**
 * Changes the own password and ends every session; the caller opens a new one for this browser.
 * @throws Problem 422 where the present password is wrong or the new one would be guessed
 */
export async function changePassword(ctx: Context, actor: StaffActor, { current, password }: ChangePassword): Promise<void> {
  const account = await Account.query(ctx.knex).findById(actor.accountId).throwIfNotFound();
  if (!(await verifyPassword(account.passwordHash, current))) {
    throw invalid([{ path: 'current', message: 'This is not your present password.' }]);
  }
  await refuseGuessable(password, { email: account.email, names: [account.name] });
  const passwordHash = await hashPassword(password);
  await ctx.knex.transaction(async (trx) => {
    const changed = await Account.query(trx).where({ id: account.id, passwordHash: account.passwordHash }).patch({ passwordHash });
    if (changed === 0) throw problem(409, 'The password was changed meanwhile at another browser.', { code: 'password-moved-on' });
    await endSessions(trx, account.id);
    await mailPasswordChanged(ctx, trx, account);
  });
}

/** Tells the holder, who may not have been the one. */
export async function mailPasswordChanged(ctx: Context, trx: Transaction, account: Account): Promise<void> {
  await queueMail(trx, {
    accountId: account.id,
    kind: 'password-changed',
    to: { address: account.email, name: account.name },
    fromName: 'Oriel',
    ...passwordChangedMail({ name: account.name, address: ctx.config.address, at: new Date() }),
  });
}
