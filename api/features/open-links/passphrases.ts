import { invalid } from '../../middleware/problem.ts';
import { hashPassword, verifyPassword } from '../sign-in/passwords.ts';

/** Two keyboards may write one accent in two ways; both are the same words. */
const written = (passphrase: string) => passphrase.normalize('NFC');

/** What the table holds of a passphrase: argon2id, as of passwords. */
export function hashPassphrase(passphrase: string): Promise<string> {
  return hashPassword(written(passphrase));
}

/** @throws Problem 422 at the field `passphrase` where it is another one */
export async function checkPassphrase(passphraseHash: string, passphrase: string): Promise<void> {
  if (await verifyPassword(passphraseHash, written(passphrase))) return;
  throw invalid([{ path: 'passphrase', message: 'This is not the passphrase of this link.' }]);
}
