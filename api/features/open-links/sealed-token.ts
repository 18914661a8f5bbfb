import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto';

// AES-256-GCM with a nonce of 96 bits and a tag of 128, as NIST SP 800-38D recommends them.
const NONCE_BYTES = 12;
const TAG_BYTES = 16;

const keyOf = (secret: string) => Buffer.from(hkdfSync('sha256', secret, '', 'oriel open link', 32));

/**
 * Seals the token of an open link with the installation's secret. Other links are kept as a hash alone, since each stands in one person's mail; this one
 * is handed on by the studio itself, which has to see its address again without changing it for everybody who has it already. A copy of
 * the table still opens nothing.
 * @param sheetId bound into the seal: a row copied to another sheet is not read there
 */
export function sealToken(secret: string, sheetId: string, token: string): string {
  const nonce = randomBytes(NONCE_BYTES);
  const cipher = createCipheriv('aes-256-gcm', keyOf(secret), nonce, { authTagLength: TAG_BYTES }).setAAD(Buffer.from(sheetId));
  const sealed = Buffer.concat([cipher.update(token, 'utf8'), cipher.final()]);
  return Buffer.concat([nonce, cipher.getAuthTag(), sealed]).toString('base64url');
}

/** The token again; undefined where it was sealed with another secret or for another sheet. */
export function unsealToken(secret: string, sheetId: string, text: string): string | undefined {
  const bytes = Buffer.from(text, 'base64url');
  try {
    const decipher = createDecipheriv('aes-256-gcm', keyOf(secret), bytes.subarray(0, NONCE_BYTES), { authTagLength: TAG_BYTES })
      .setAAD(Buffer.from(sheetId))
      .setAuthTag(bytes.subarray(NONCE_BYTES, NONCE_BYTES + TAG_BYTES));
    return decipher.update(bytes.subarray(NONCE_BYTES + TAG_BYTES), undefined, 'utf8') + decipher.final('utf8');
  } catch {
    return undefined;
  }
}
