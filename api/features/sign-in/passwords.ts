import { type Algorithm, hash, verify } from '@node-rs/argon2';

/**
 * argon2id with 19 MiB, two passes and one lane: one of the settings of OWASP's Password Storage Cheat Sheet. The library draws the
 * salt of 16 bytes and writes all of it into the hash, so the settings can change without making older hashes useless.
 */
/* 2 is argon2id: the library's enum is a const one and cannot be named under verbatimModuleSyntax. */
const SETTINGS = { algorithm: 2 as Algorithm, memoryCost: 19_456, timeCost: 2, parallelism: 1, outputLen: 32 };
const PRESENT = '$argon2id$v=19$m=19456,t=2,p=1$';

/** What the table holds of a password, in PHC string form. */
export function hashPassword(password: string): Promise<string> {
  return hash(password, SETTINGS);
}

let nobodys: Promise<string> | undefined;

/** Whether the password is the one behind the hash. Without a hash it works as long and says no: no account is told by its absence. */
export async function verifyPassword(passwordHash: string | null | undefined, password: string): Promise<boolean> {
  nobodys ??= hashPassword('nobody has this password');
  const right = await verify(passwordHash ?? (await nobodys), password);
  return right && passwordHash != null;
}

/** True for a hash made with other settings than today's: it is made anew when its password comes by. */
export function isOutdated(passwordHash: string): boolean {
  return !passwordHash.startsWith(PRESENT);
}
