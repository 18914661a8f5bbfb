import type { Context } from '../../context.ts';
import type { SignIn } from '../../contract/sign-in.ts';
import { problem } from '../../middleware/problem.ts';
import { Account } from '../../models/Account.ts';
import { AccountToken } from '../../models/AccountToken.ts';
import { Studio } from '../../models/Studio.ts';
import { hashPassword, isOutdated, verifyPassword } from './passwords.ts';
import { mailConfirmation } from './sign-up.ts';

/** Somebody whose password was right, and the hash it was right for. */
export interface Known {
  accountId: string;
  passwordHash: string;
}

/**
 * Compares address and password. What is wrong is not said, and an address that waits for its confirmation looks like an unknown one,
 * so that nobody learns by signing up whether an address was known before; its holder gets a new mail.
 * @throws Problem 401; 403 where the account works for no studio
 */
export async function signIn(ctx: Context, { email, password }: SignIn): Promise<Known> {
  const account = await Account.query(ctx.knex).findOne({ email }).withGraphFetched('membership');
  const right = await verifyPassword(account?.passwordHash, password);
  if (!account?.passwordHash || !right) throw refused();
  if (!account.emailConfirmedAt) {
    await remindToConfirm(ctx, account);
    throw refused();
  }
  if (!account.membership) throw problem(403, 'This account works for no studio at present.', { code: 'no-studio' });
  return { accountId: account.id, passwordHash: await renewed(ctx, account.id, account.passwordHash, password) };
}

/** One answer for whatever is wrong, so that nobody learns which addresses have an account. */
export function refused() {
  return problem(
    401,
    'This address and this password do not belong together, or the address is not confirmed yet: then a mail with a link is on its way to it.',
    { code: 'sign-in-refused' },
  );
}

/** True while the password is still the one that was compared: it may have been changed in between. */
export async function stillHolds(ctx: Context, { accountId, passwordHash }: Known): Promise<boolean> {
  return (await Account.query(ctx.knex).where({ id: accountId, passwordHash }).resultSize()) > 0;
}

/** A hash made with older settings is made anew while the password is at hand. */
async function renewed(ctx: Context, id: string, passwordHash: string, password: string): Promise<string> {
  if (!isOutdated(passwordHash)) return passwordHash;
  const better = await hashPassword(password);
  const changed = await Account.query(ctx.knex).where({ id, passwordHash }).patch({ passwordHash: better });
  return changed > 0 ? better : passwordHash;
}

/** At most one a quarter of an hour. */
async function remindToConfirm(ctx: Context, account: Account): Promise<void> {
  const recent = await AccountToken.query(ctx.knex)
    .where({ purpose: 'confirm-email', accountId: account.id })
    .where('createdAt', '>', ctx.knex.raw("now() - interval '15 minutes'"))
    .resultSize();
  const studio = account.membership && (await Studio.query(ctx.knex).findById(account.membership.studioId));
  if (recent > 0 || !studio) return;
  await ctx.knex.transaction((trx) => mailConfirmation(ctx, trx, account, { studioName: studio.name }));
}
