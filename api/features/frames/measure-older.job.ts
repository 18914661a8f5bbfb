import { MEASURES_RECIPE } from '../../domain/frame-measures.ts';
import type { Job } from '../../jobs/job.ts';
import { Frame } from '../../models/Frame.ts';
import { queueMeasuring } from './queue-measuring.ts';

const A_RUN = 500;

/** Has frames measured that were there before there was measuring, or before it was done as it is now. */
export const measureOlder: Job = {
  name: 'measure-older',
  every: '*/5 * * * *',
  async run(ctx) {
    const frames = await Frame.query()
      .where({ state: 'ready' })
      .whereNull('deletedAt')
      .where((any) => any.whereNull('measuresRecipe').orWhere('measuresRecipe', '<', MEASURES_RECIPE))
      // What was just taken in has its job already.
      .whereRaw(`created_at < now() - interval '10 minutes'`)
      .orderBy('createdAt', 'desc')
      .limit(A_RUN)
      .select('id', 'commissionId');
    for (const frame of frames) await queueMeasuring(ctx.knex, frame);
  },
};
