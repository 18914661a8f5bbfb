import type { Job } from '../../jobs/job.ts';
import { Mail } from '../../models/Mail.ts';
import { enqueueSending } from './queue-mail.ts';

/** Longer than a handing over can take with its own limits of time. */
const MINUTES = 5;

/**
 * Looks after mails that nobody works on. One left at "handing-over" belonged to a process that died: it may have gone out, so a
 * person decides. One that waits without a job lost it to a queue that gave up, and gets a new one.
 */
export const findUnsureMails: Job = {
  name: 'find-unsure-mails',
  every: '* * * * *',
  async run(ctx) {
    await Mail.query(ctx.knex)
      .where('state', 'handing-over')
      .where('handedOverAt', '<', ctx.knex.raw(`now() - interval '${MINUTES} minutes'`))
      .patch({ state: 'unsure', problem: 'Oriel was interrupted while the mail was handed over. It may have gone out.' });
    await ctx.knex.transaction(async (trx) => {
      const { rows } = await trx.raw<{ rows: { id: string }[] }>(
        `select id from mails
          where state = 'waiting' and created_at < now() - interval '5 minutes'
            and not exists (select from commissions c where c.id = mails.commission_id and c.deleted_at is not null)
            and not exists (select from graphile_worker.jobs where key = 'send-mail:' || mails.id and attempts < max_attempts)
          limit 500 for update skip locked`,
      );
      for (const { id } of rows) await enqueueSending(trx, id);
    });
  },
};
