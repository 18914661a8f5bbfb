import { afterAll, beforeAll, expect, it } from 'vitest';
import { makeAccount, makeStudio } from '../support/factories/studio.ts';
import { hashPassword } from '../../api/features/sign-in/passwords.ts';
import { Membership } from '../../api/models/Membership.ts';
import { type House, startHouse } from '../support/house.ts';

const PASSWORD = 'copper gutters drip at noon';
let house: House;
let email: string;
// The public address is https, as behind a proxy; the tests themselves speak plain HTTP on loopback.
beforeAll(async () => {
  house = await startHouse({ env: { ORIEL_ADDRESS: 'https://proofs.harrow-lane.test' } });
  const account = await makeAccount({ passwordHash: await hashPassword(PASSWORD) });
  const { studio } = await makeStudio(house);
  await Membership.query().insert({ studioId: studio.id, accountId: account.id, role: 'assistant' });
  email = account.email;
});
afterAll(() => house.stop());

/** Reads a Set-Cookie line by the algorithm of RFC 6265bis 5.6 (draft-ietf-httpbis-rfc6265bis). */
function readSetCookie(line: string) {
  const [pair = '', ...rest] = line.split(';');
  const at = pair.indexOf('=');
  const attributes = new Map(
    rest.map((each) => {
      const [name = '', value = ''] = each.split('=');
      return [name.trim().toLowerCase(), value.trim()] as const;
    }),
  );
  return { name: pair.slice(0, at).trim(), value: pair.slice(at + 1).trim(), attributes };
}

const signIn = () => house.request.post('/api/sign-in').send({ email, password: PASSWORD }).expect(200);

it('sets one session cookie: HttpOnly, SameSite=Lax, Secure, for this host alone, on every path', async () => {
  const lines = (await signIn()).headers['set-cookie'] as unknown as string[];
  expect(lines).toHaveLength(1);
  const { name, value, attributes } = readSetCookie(lines[0] ?? '');
  expect(name).toBe('oriel_studio');
  expect(attributes.has('httponly')).toBe(true);
  expect(attributes.has('secure')).toBe(true);
  expect(attributes.get('samesite')).toBe('Lax');
  expect(attributes.get('path')).toBe('/');
  // Without a Domain attribute the cookie is host-only (RFC 6265bis 5.7): no neighbour of the same domain gets it.
  expect(attributes.has('domain')).toBe(false);
  // RFC 6265bis 4.1.1: cookie-octet has neither blanks, quotes, commas, semicolons nor backslashes.
  expect(value).toMatch(/^[\x21\x23-\x2b\x2d-\x3a\x3c-\x5b\x5d-\x7e]+$/);
  expect(Number(attributes.get('max-age'))).toBe(14 * 24 * 60 * 60);
  // RFC 6265bis 5.6.2 cuts lifetimes at 400 days.
  expect(Number(attributes.get('max-age'))).toBeLessThan(400 * 24 * 60 * 60);
});

it('draws at least 128 bits for each, as ASVS 5.0.0 7.2.3 asks', async () => {
  const values = await Promise.all(
    [1, 2, 3].map(async () => readSetCookie(((await signIn()).headers['set-cookie'] as unknown as string[])[0] ?? '').value),
  );
  expect(new Set(values).size).toBe(3);
  for (const value of values) expect(Buffer.from(value, 'base64url').length * 8).toBeGreaterThanOrEqual(128);
});

it('takes the cookie away with the same attributes when signing out', async () => {
  const cookie = ((await signIn()).headers['set-cookie'] as unknown as string[])[0]?.split(';')[0] ?? '';
  const lines = (await house.request.post('/api/sign-out').set('Cookie', cookie).expect(204)).headers['set-cookie'] as unknown as string[];
  const { name, value, attributes } = readSetCookie(lines[0] ?? '');
  expect([name, value, attributes.get('path'), attributes.has('domain')]).toEqual(['oriel_studio', '', '/', false]);
  expect(Date.parse(attributes.get('expires') ?? '')).toBeLessThan(Date.now());
});
