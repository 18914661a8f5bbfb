import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import { type JoinLink, type JoinStudio, NewPassword } from '../../contract/sign-in.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Account } from '../../models/Account.ts';
import type { AccountToken } from '../../models/AccountToken.ts';
import { Membership } from '../../models/Membership.ts';
import { Studio } from '../../models/Studio.ts';
import { inviteAccount } from '../guests/invite-account.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { findToken, useToken } from '../sign-in/account-tokens.ts';
import { endSessions } from '../sign-in/end-sessions.ts';
import { refuseGuessable } from '../sign-in/guessable.ts';
import { hashPassword, verifyPassword } from '../sign-in/passwords.ts';

/** What an invitation into a studio needs from its holder. @throws Problem 404 or 410 */
export async function lookAtInvitation(ctx: Context, token: string): Promise<JoinLink> {
  const row = await findToken(ctx.knex, 'join-studio', token);
  const studio = await Studio.query(ctx.knex)
    .findById(row.studioId ?? '')
    .throwIfNotFound();
  const account = await Account.query(ctx.knex).findOne({ email: row.email });
  return { studioName: studio.name, email: row.email, name: row.name ?? '', password: hasPassword(account) ? 'known' : 'new' };
}

/** A password counts once its address is confirmed; before that, anybody may have chosen it. */
function hasPassword(account: Account | undefined): account is Account & { passwordHash: string } {
  return account?.passwordHash != null && account.emailConfirmedAt !== null;
}

/**
 * Makes the holder of an invitation an assistant: with the password they have, or one they choose now. The link proves the address.
 * Returns the account to begin a session for.
 * @throws Problem 404, 410, 422 for a wrong or guessable password, 409 where they work for another studio
 */
export async function joinStudio(ctx: Context, input: JoinStudio): Promise<string> {
  const row = await findToken(ctx.knex, 'join-studio', input.token);
  const account = await Account.query(ctx.knex).findOne({ email: row.email });
  const passwordHash = await passwordFor(account, row, input);
  return ctx.knex.transaction(async (trx) => {
    await useToken(trx, row);
    const joined = await inviteAccount(trx, { email: row.email, name: input.name });
    await leaveUnconfirmed(trx, joined);
    await Account.query(trx)
      .findById(joined.id)
      .patch({ name: input.name, passwordHash, emailConfirmedAt: joined.emailConfirmedAt ?? new Date() });
    const { studioId } = row;
    if (!studioId) throw problem(404);
    await Membership.query(trx).insert({ studioId, accountId: joined.id, role: 'assistant' });
    await addToRecord(trx, {
      studioId,
      actor: { kind: 'staff', accountId: joined.id, name: input.name },
      did: 'team.joined',
      says: `${input.name} joined as an assistant`,
    });
    return joined.id;
  });
}

async function passwordFor(account: Account | undefined, row: AccountToken, { name, password }: JoinStudio): Promise<string> {
  if (hasPassword(account)) {
    if (await verifyPassword(account.passwordHash, password)) return account.passwordHash;
    throw invalid([{ path: 'password', message: 'This is not the password of your account.' }]);
  }
  const checked = NewPassword.safeParse(password);
  if (!checked.success) throw invalid([{ path: 'password', message: checked.error.issues[0]?.message ?? 'Choose another password.' }]);
  await refuseGuessable(checked.data, { email: row.email, names: [name] });
  return hashPassword(checked.data);
}

/**
 * A person works for one studio. But a studio signed up with this address and never confirmed is nobody's, perhaps somebody else's
 * doing, and must not stand in the way: nobody could ever sign in to it, so it is empty and goes.
 */
async function leaveUnconfirmed(trx: Transaction, account: Account): Promise<void> {
  const membership = await Membership.query(trx).findOne({ accountId: account.id });
  if (!membership) return;
  if (account.emailConfirmedAt) {
    throw problem(409, 'This account works for a studio already. Leave that one first, or ask to be invited at another address.', {
      code: 'has-studio',
    });
  }
  await Studio.query(trx).deleteById(membership.studioId);
  await endSessions(trx, account.id, 'staff');
}
