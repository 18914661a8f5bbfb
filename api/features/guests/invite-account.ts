import type { Transaction } from 'objection';
import { Account } from '../../models/Account.ts';

/**
 * Finds the account of an address, or makes a guest of it. Answers to the studio must not differ between the two, and
 * must show the name the studio wrote, never the account's own.
 * @param person address in lower case, as `EmailAddress` of the contract gives it
 */
export async function inviteAccount(trx: Transaction, { email, name }: { email: string; name: string }): Promise<Account> {
  await Account.query(trx).insert({ email, name }).onConflict('email').ignore();
  return Account.query(trx).findOne({ email }).throwIfNotFound();
}
