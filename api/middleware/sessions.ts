import { createHash, randomBytes } from 'node:crypto';
import { NodePostgresAdapter } from '@lucia-auth/adapter-postgresql';
import DataLoader from 'dataloader';
import type { CookieOptions, Request, Response } from 'express';
import { type DatabaseSession, type DatabaseUser, Lucia, TimeSpan } from 'lucia';
import pg from 'pg';
import type { Config } from '../config.ts';

export type SessionKind = 'staff' | 'guest';

declare module 'lucia' {
  interface Register {
    Lucia: Lucia<{ kind: SessionKind }, { email: string; name: string }>;
    UserId: string;
    DatabaseSessionAttributes: { kind: SessionKind };
    DatabaseUserAttributes: { email: string; name: string };
  }
}

export interface LiveSession {
  id: string;
  kind: SessionKind;
  accountId: string;
  email: string;
  name: string;
}

/** Idle sessions end after this many days; one in use is prolonged at half-time. */
const DAYS = { staff: 14, guest: 30 } as const;
const COOKIES = { staff: 'oriel_studio', guest: 'oriel_guest' } as const;

const hash = (token: string) => createHash('sha256').update(token).digest('hex');

interface SessionRow {
  id: string;
  userId: string;
  expiresAt: Date;
  kind: SessionKind;
  email: string;
  name: string;
}

/**
 * Reads a session and whose it is in one go, where the library's adapter asks twice for whole rows. Requests that arrive in the same turn of
 * the event loop share the question; nothing is remembered after it, so a session that was ended is gone with the next request.
 */
class SessionTable extends NodePostgresAdapter {
  readonly #rows: DataLoader<string, SessionRow | undefined>;

  constructor(pool: pg.Pool) {
    super(pool, { user: 'accounts', session: 'sessions' });
    const read = async (ids: readonly string[]) => {
      const { rows } = await pool.query<SessionRow>({
        name: 'sessions',
        text: `select s.id, s.user_id as "userId", s.expires_at as "expiresAt", s.kind, a.email, a.name
                 from sessions s join accounts a on a.id = s.user_id where s.id = any($1)`,
        values: [ids],
      });
      const byId = new Map(rows.map((row) => [row.id, row]));
      return ids.map((id) => byId.get(id));
    };
    this.#rows = new DataLoader(read, { cache: false, batchScheduleFn: (ask) => setImmediate(ask) });
  }

  override async getSessionAndUser(id: string): Promise<[DatabaseSession | null, DatabaseUser | null]> {
    const row = await this.#rows.load(id);
    if (!row) return [null, null];
    const { userId, expiresAt, kind, email, name } = row;
    return [
      { id, userId, expiresAt, attributes: { kind } },
      { id: userId, attributes: { email, name } },
    ];
  }
}

/**
 * Sessions in PostgreSQL. The cookie holds a random token of 160 bits; the table holds its SHA-256 alone, so a copy of the table opens nothing.
 * A person of a studio and a guest have cookies of their own: opening a link does not sign anybody out.
 */
export class Sessions {
  readonly #pool: pg.Pool;
  readonly #lucia: Record<SessionKind, Lucia<{ kind: SessionKind }, { email: string; name: string }>>;

  constructor(private readonly config: Config) {
    this.#pool = new pg.Pool({ connectionString: config.database.url, max: 4, application_name: 'oriel-sessions' });
    this.#pool.on('error', () => undefined);
    const adapter = new SessionTable(this.#pool);
    const make = (kind: SessionKind) =>
      new Lucia(adapter, {
        sessionExpiresIn: new TimeSpan(DAYS[kind], 'd'),
        getSessionAttributes: ({ kind: stored }) => ({ kind: stored }),
        getUserAttributes: ({ email, name }) => ({ email, name }),
      });
    this.#lucia = { staff: make('staff'), guest: make('guest') };
  }

  /** Opens a session under a new token and ends the one this browser had: a token never outlives a sign-in. */
  async open(req: Request, res: Response, kind: SessionKind, accountId: string): Promise<void> {
    const before = this.#token(req, kind);
    if (before) await this.#lucia[kind].invalidateSession(hash(before));
    const token = randomBytes(20).toString('base64url');
    await this.#lucia[kind].createSession(accountId, { kind }, { sessionId: hash(token) });
    this.#setCookie(res, kind, token);
  }

  /** Whose session this is; prolongs it, and takes the cookie away where it has ended. */
  async read(req: Request, res: Response, kind: SessionKind): Promise<LiveSession | undefined> {
    const token = this.#token(req, kind);
    if (!token) return undefined;
    const { session, user } = await this.#lucia[kind].validateSession(hash(token));
    if (!session || session.kind !== kind) {
      res.clearCookie(COOKIES[kind], this.#cookie());
      return undefined;
    }
    if (session.fresh) this.#setCookie(res, kind, token);
    return { id: session.id, kind, accountId: user.id, email: user.email, name: user.name };
  }

  /** Signs this browser out, on the server too. */
  async close(req: Request, res: Response, kind: SessionKind): Promise<void> {
    const token = this.#token(req, kind);
    if (token) await this.#lucia[kind].invalidateSession(hash(token));
    res.clearCookie(COOKIES[kind], this.#cookie());
  }

  /** Signs an account out everywhere. */
  async closeAll(accountId: string): Promise<void> {
    await this.#lucia.staff.invalidateUserSessions(accountId);
  }

  /** Removes what has ended; nobody misses it. */
  async sweep(): Promise<void> {
    await this.#lucia.staff.deleteExpiredSessions();
  }

  async stop(): Promise<void> {
    await this.#pool.end();
  }

  #token(req: Request, kind: SessionKind): string | undefined {
    const pair = (req.headers.cookie ?? '').split(/; */).find((each) => each.startsWith(`${COOKIES[kind]}=`));
    const token = pair?.slice(COOKIES[kind].length + 1);
    return token && /^[\w-]{20,64}$/.test(token) ? token : undefined;
  }

  #cookie(): CookieOptions {
    return { httpOnly: true, sameSite: 'lax', secure: this.config.secureCookies, path: '/' };
  }

  #setCookie(res: Response, kind: SessionKind, token: string): void {
    res.cookie(COOKIES[kind], token, { ...this.#cookie(), maxAge: DAYS[kind] * 24 * 60 * 60 * 1000 });
  }
}
