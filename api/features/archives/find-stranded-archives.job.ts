import { announce } from '../../db/live.ts';
import type { Job } from '../../jobs/job.ts';
import { Archive } from '../../models/Archive.ts';
import { commissionOf } from './build-archive.job.ts';

/**
 * Archives that wait for nobody: their job ended without a word, as when the worker was killed at its last try. They are
 * shown as failed, so that a person can have them built again.
 */
export const findStrandedArchives: Job = {
  name: 'find-stranded-archives',
  every: '*/5 * * * *',
  async run(ctx) {
    const stranded = await Archive.query(ctx.knex)
      .where({ state: 'building' })
      .where('createdAt', '<', ctx.knex.raw("now() - interval '1 minute'"))
      .whereRaw(
        `not exists (select from graphile_worker.jobs j where j.key = 'build-archive:' || archives.id and (j.attempts < j.max_attempts or j.locked_at is not null))`,
      );
    for (const archive of stranded) {
      const problem = 'The work on this archive was interrupted too often.';
      await Archive.query(ctx.knex).findById(archive.id).where({ state: 'building' }).patch({ state: 'failed', problem });
      const commissionId = await commissionOf(ctx, archive);
      if (commissionId) await announce(ctx.knex, `commission:${commissionId}`, { what: 'archive-failed', archiveId: archive.id });
    }
  },
};
