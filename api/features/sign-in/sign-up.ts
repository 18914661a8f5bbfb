import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import type { SignUp } from '../../contract/sign-in.ts';
import { Account } from '../../models/Account.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { createStudio } from '../studios/create-studio.ts';
import { issueToken } from './account-tokens.ts';
import { alreadyHereMail } from './already-here.mail.ts';
import { confirmEmailMail } from './confirm-email.mail.ts';
import { refuseGuessable } from './guessable.ts';
import { hashPassword } from './passwords.ts';

/**
 * Signs up a studio with its owner. Tells the caller nothing about the address: whoever holds it gets a mail that says what is next.
 * Until the address is confirmed nobody can sign in with it.
 * @throws Problem 422 where the password would be guessed
 */
export async function signUp(ctx: Context, input: SignUp): Promise<void> {
  await refuseGuessable(input.password, { email: input.email, names: [input.name, input.studioName] });
  // The hash is made for an address that is known too, so that both take the same time.
  const passwordHash = await hashPassword(input.password);
  await ctx.knex.transaction(async (trx) => {
    const made = await Account.query(trx)
      .insert({ email: input.email, name: input.name, passwordHash })
      .onConflict('email')
      .ignore()
      .returning('*');
    const account = await Account.query(trx).findOne({ email: input.email }).forUpdate().withGraphFetched('membership').throwIfNotFound();
    if (wasInserted(made)) await startStudio(ctx, trx, account, input);
    else await answerKnown(ctx, trx, account, input, passwordHash);
  });
}

/** "on conflict do nothing" returns no row. */
function wasInserted(made: Account): boolean {
  return typeof made.id === 'string';
}

async function startStudio(ctx: Context, trx: Transaction, account: Account, input: SignUp): Promise<void> {
  const { studioName: name, timeZone } = input;
  await createStudio(trx, { name, replyTo: account.email, owner: account, timeZone });
  await mailConfirmation(ctx, trx, account, { studioName: name });
}

async function answerKnown(ctx: Context, trx: Transaction, account: Account, input: SignUp, passwordHash: string): Promise<void> {
  if (account.membership && account.emailConfirmedAt) return mailAlreadyHere(ctx, trx, account);
  if (account.membership) return mailConfirmation(ctx, trx, account, { studioName: input.studioName, again: true });
  // A guest, or somebody who left a studio: the new password and studio wait at the token until the address is confirmed.
  await mailConfirmation(ctx, trx, account, { studioName: input.studioName, pending: { passwordHash, studioName: input.studioName } });
}

interface Confirmation {
  studioName: string;
  /** The account waits for its confirmation since an earlier sign-up. */
  again?: boolean;
  pending?: { passwordHash: string; studioName: string };
}

/** Mails a link to confirm the address of a sign-up. Concerns the account alone, so it stands in no studio's outbox. */
export async function mailConfirmation(ctx: Context, trx: Transaction, account: Account, what: Confirmation): Promise<void> {
  const issued = await issueToken(trx, {
    purpose: 'confirm-email',
    email: account.email,
    accountId: account.id,
    ...(what.pending ? { name: what.pending.studioName, passwordHash: what.pending.passwordHash } : {}),
  });
  await queueMail(trx, {
    accountId: account.id,
    kind: 'confirm-email',
    to: { address: account.email, name: account.name },
    fromName: 'Oriel',
    ...confirmEmailMail({
      address: `${ctx.config.address}/confirm-email/${issued.token}`,
      name: account.name,
      studioName: what.studioName,
      until: issued.expiresAt,
      again: what.again ?? false,
    }),
  });
}

async function mailAlreadyHere(ctx: Context, trx: Transaction, account: Account): Promise<void> {
  await queueMail(trx, {
    accountId: account.id,
    kind: 'already-here',
    to: { address: account.email, name: account.name },
    fromName: 'Oriel',
    ...alreadyHereMail(ctx.config.address),
  });
}
