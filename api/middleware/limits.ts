import type { Knex } from 'knex';
import { type RateLimiterAbstract, RateLimiterMemory, RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible';
import { problem } from './problem.ts';
import type { Station } from './station.ts';

/** Attempts in a span of seconds, counted for each key. */
interface Limit {
  points: number;
  seconds: number;
  /** Counted by this process alone: for traffic that is frequent and harmless. */
  here?: true;
}

/** Every limit of the API in one place. Shared ones are counted in PostgreSQL, so that more processes do not mean more tries. */
const LIMITS = {
  'sign-in-address': { points: 30, seconds: 15 * 60 },
  'sign-in-account': { points: 10, seconds: 15 * 60 },
  'sign-up': { points: 10, seconds: 60 * 60 },
  'reset-address': { points: 10, seconds: 60 * 60 },
  'reset-account': { points: 3, seconds: 60 * 60 },
  token: { points: 40, seconds: 15 * 60 },
  look: { points: 120, seconds: 15 * 60 },
  /** Passphrases tried at one open link from one address. */
  passphrase: { points: 10, seconds: 15 * 60 },
  'ask-to-mark': { points: 20, seconds: 60 * 60 },
  /** Mails to one address, whoever asks for them. */
  'ask-to-mark-person': { points: 5, seconds: 60 * 60 },
  mail: { points: 60, seconds: 60 * 60 },
  'new-link': { points: 5, seconds: 60 * 60 },
  send: { points: 20, seconds: 60 * 60 },
  upload: { points: 6000, seconds: 60, here: true },
  /** Pixels that somebody waits for: each costs a child a good part of a second and this process megabytes meanwhile. */
  'watermark-picture': { points: 120, seconds: 60, here: true },
  mark: { points: 600, seconds: 60, here: true },
  download: { points: 600, seconds: 60, here: true },
} satisfies Record<string, Limit>;
export type LimitName = keyof typeof LIMITS;

export interface Limits {
  /** Counts one attempt. @throws Problem 429 with Retry-After once there are too many. */
  count(name: LimitName, key: string): Promise<void>;
  /** Takes one attempt back that turned out to be none. */
  giveBack(name: LimitName, key: string): Promise<void>;
  /** A station that counts by the address the request came from, or by the account where somebody is signed in. */
  limit(name: LimitName): Station;
}

function limiter(knex: Knex, name: LimitName): RateLimiterAbstract {
  const { points, seconds, here }: Limit = LIMITS[name];
  const common = { keyPrefix: name, points, duration: seconds };
  if (here) return new RateLimiterMemory(common);
  return new RateLimiterPostgres({
    ...common,
    storeClient: knex,
    storeType: 'knex',
    tableName: 'rate_limits',
    tableCreated: true,
    clearExpiredByTimeout: false,
  });
}

export function createLimits(knex: Knex, scale = 1): Limits {
  const names = Object.keys(LIMITS) as LimitName[];
  const limiters = new Map(names.map((name) => [name, limiter(knex, name)]));
  for (const each of limiters.values()) each.points = Math.ceil(each.points * scale);
  async function count(name: LimitName, key: string): Promise<void> {
    try {
      await limiters.get(name)?.consume(key);
    } catch (refusal) {
      if (!(refusal instanceof RateLimiterRes)) throw refusal;
      const minutes = Math.ceil(refusal.msBeforeNext / 60_000);
      throw problem(429, `Too many tries. Please wait ${minutes === 1 ? 'a minute' : `${minutes} minutes`}.`, {
        retryAfter: refusal.msBeforeNext / 1000,
      });
    }
  }
  return {
    count,
    giveBack: async (name, key) => void (await limiters.get(name)?.reward(key)),
    limit: (name) => async (req, _res, next) => {
      await count(name, req.actor ? `account:${req.actor.accountId}` : `address:${req.ip ?? ''}`);
      next();
    },
  };
}
