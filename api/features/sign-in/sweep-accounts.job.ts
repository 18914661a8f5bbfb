import type { Job } from '../../jobs/job.ts';

/** Removes sessions, lookers, tokens and counts of tries that have ended: nobody misses them, and a copy of the tables should not hold them. */
export const sweepAccounts: Job = {
  name: 'sweep-accounts',
  every: '17 * * * *',
  async run({ knex }) {
    await knex('sessions').where('expiresAt', '<', knex.fn.now()).delete();
    await knex('lookers').where('expiresAt', '<', knex.fn.now()).delete();
    // Kept for a month so that a late opening of the link is told that it has expired, not that there is no such link.
    await knex('accountTokens').where('expiresAt', '<', knex.raw("now() - interval '30 days'")).delete();
    await knex('rateLimits').where('expire', '<', Date.now()).delete();
  },
};
