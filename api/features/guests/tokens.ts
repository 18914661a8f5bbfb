import { createHash, randomBytes } from 'node:crypto';

/** The secret of a link: 256 random bits in 43 characters for the mail, and the SHA-256 of it, in hexadecimal, for the table. */
export function newToken(): { token: string; hash: string } {
  const token = randomBytes(32).toString('base64url');
  return { token, hash: hashToken(token) };
}

/** What the table holds in place of a token, so that a copy of the table opens nothing. */
export function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}

/** The address of a guest's link: where the button of the mail leads. */
export function linkAddress(config: { address: string }, token: string): string {
  return `${config.address}/open/${token}`;
}
