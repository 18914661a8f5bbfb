import { createHash, randomBytes } from 'node:crypto';
import type supertest from 'supertest';
import type { House } from './house.ts';

/** A person at a browser: supertest's agent with the session's cookie, and that cookie as a Set-Cookie line for a real browser. */
export interface SignedIn {
  agent: ReturnType<typeof supertest.agent>;
  cookie: string;
}

const COOKIES = { staff: 'oriel_studio', guest: 'oriel_guest' } as const;

/**
 * Opens a session by its row, without the sign-in route: tests of other features need somebody signed in, not the signing in.
 * The table holds the SHA-256 of the cookie's token, as api/middleware/sessions.ts has it.
 */
export async function openSession(house: House, accountId: string, kind: keyof typeof COOKIES): Promise<SignedIn> {
  const token = randomBytes(20).toString('base64url');
  const id = createHash('sha256').update(token).digest('hex');
  await house.ctx.knex('sessions').insert({ id, userId: accountId, kind, expiresAt: new Date(Date.now() + 10 * 24 * 60 * 60 * 1000) });
  const cookie = `${COOKIES[kind]}=${token}`;
  const agent = house.agent();
  agent.jar.setCookie(cookie, new URL(house.address).hostname, '/');
  return { agent, cookie: `${cookie}; Path=/; HttpOnly; SameSite=Lax` };
}
