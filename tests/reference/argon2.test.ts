import { hashRaw } from '@node-rs/argon2';
import { argon2id, argon2Verify } from 'hash-wasm';
import { describe, expect, it } from 'vitest';
import { hashPassword, isOutdated, verifyPassword } from '../../api/features/sign-in/passwords.ts';

/**
 * Settings of argon2id that OWASP's Password Storage Cheat Sheet lists as equally strong, memory in KiB, all with one lane
 * (read in the state of 2026-08-17).
 */
const OWASP = [
  { m: 47_104, t: 1, p: 1 },
  { m: 19_456, t: 2, p: 1 },
  { m: 12_288, t: 3, p: 1 },
  { m: 9_216, t: 4, p: 1 },
  { m: 7_168, t: 5, p: 1 },
];

const PASSWORD = 'ровно двенадцать слов 🌉';

/** The parts of a PHC string: $argon2id$v=19$m=…,t=…,p=…$salt$hash. */
function partsOf(phc: string) {
  const [, algorithm = '', version = '', settings = '', salt = '', hash = ''] = phc.split('$');
  const numbers = Object.fromEntries(settings.split(',').map((pair) => pair.split('=')));
  return {
    algorithm,
    version,
    settings: { m: Number(numbers.m), t: Number(numbers.t), p: Number(numbers.p) },
    salt: Buffer.from(salt, 'base64'),
    hash: Buffer.from(hash, 'base64'),
  };
}

describe('the hash of a password', () => {
  it("has one of OWASP's settings, a salt of 16 bytes and 32 bytes of hash", async () => {
    const { algorithm, version, settings, salt, hash } = partsOf(await hashPassword(PASSWORD));
    expect(algorithm).toBe('argon2id');
    expect(version).toBe('v=19');
    expect(OWASP).toContainEqual(settings);
    // RFC 9106 3.1: 16 bytes of salt are recommended for password hashing, tags of at least 128 bits.
    expect([salt.length, hash.length]).toEqual([16, 32]);
  });

  it('is verified by another implementation, hash-wasm, and by ours when that one made it', async () => {
    expect(await argon2Verify({ password: PASSWORD, hash: await hashPassword(PASSWORD) })).toBe(true);
    expect(await argon2Verify({ password: `${PASSWORD} `, hash: await hashPassword(PASSWORD) })).toBe(false);
    const salt = Buffer.from('sixteen bytes ok');
    const theirs = await argon2id({
      password: PASSWORD,
      salt,
      parallelism: 1,
      iterations: 2,
      memorySize: 19_456,
      hashLength: 32,
      outputType: 'encoded',
    });
    expect(await verifyPassword(theirs, PASSWORD)).toBe(true);
    expect(await verifyPassword(theirs, 'another')).toBe(false);
    expect(isOutdated(theirs)).toBe(false);
  });

  it('is computed alike, byte for byte, also with a secret and several lanes', async () => {
    // The inputs of RFC 9106 5.3 without its associated data, which neither library takes; the two are compared with one another.
    const [password, salt, secret] = [Buffer.alloc(32, 1), Buffer.alloc(16, 2), Buffer.alloc(8, 3)];
    const ours = await hashRaw(password, { algorithm: 2, memoryCost: 32, timeCost: 3, parallelism: 4, outputLen: 32, salt, secret });
    const theirs = await argon2id({
      password,
      salt,
      secret,
      memorySize: 32,
      iterations: 3,
      parallelism: 4,
      hashLength: 32,
      outputType: 'hex',
    });
    expect(ours.toString('hex')).toBe(theirs);
  });

  it('differs each time, and says no where there is none', async () => {
    const [one, two] = await Promise.all([hashPassword(PASSWORD), hashPassword(PASSWORD)]);
    expect(one).not.toBe(two);
    expect(await verifyPassword(null, PASSWORD)).toBe(false);
    // Not even the password behind the hash that stands in for a missing one lets anybody in.
    expect(await verifyPassword(undefined, 'nobody has this password')).toBe(false);
  });

  it('is outdated where its settings are others', async () => {
    const weaker = await argon2id({
      password: 'x',
      salt: Buffer.alloc(16),
      parallelism: 1,
      iterations: 1,
      memorySize: 8192,
      hashLength: 32,
      outputType: 'encoded',
    });
    expect(isOutdated(weaker)).toBe(true);
  });
});
