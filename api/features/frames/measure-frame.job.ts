import type { Context } from '../../context.ts';
import { type FrameMeasures, MEASURES_RECIPE } from '../../domain/frame-measures.ts';
import { isInVain } from '../../jobs/in-vain.ts';
import type { Job, JobTools } from '../../jobs/job.ts';
import { Frame } from '../../models/Frame.ts';
import { FrameMeasure } from '../../models/FrameMeasure.ts';
import { frameKey } from '../../services/storage-keys.ts';
import { queueGrouping } from '../brackets/queue-grouping.ts';

/**
 * Measures a frame on its largest picture, and has its commission grouped. A frame that cannot be measured is judged by its settings alone.
 * Run twice it changes nothing.
 */
export const measureFrame: Job<{ frameId: string }> = {
  name: 'measure-frame',
  async run(ctx, { frameId }, tools) {
    const frame = await Frame.query().findById(frameId).whereNull('deletedAt');
    if (frame?.state !== 'ready' || frame.measuresRecipe === MEASURES_RECIPE) return;
    const measures = await measure(ctx, frame, tools);
    await Frame.transaction(async (trx) => {
      const { studioId } = frame;
      if (measures) await FrameMeasure.query(trx).insert({ frameId, studioId, measures }).onConflict('frameId').merge();
      await Frame.within(frame, trx).findById(frameId).patch({ measuresRecipe: MEASURES_RECIPE });
      await queueGrouping(trx, frame.commissionId);
    });
  },
};

async function measure(ctx: Context, frame: Frame, tools: JobTools): Promise<FrameMeasures | null> {
  try {
    return await ctx.pixels.measure(await ctx.store.getBuffer(frameKey(frame, 2560)));
  } catch (error) {
    if (tools.signal.aborted || !isInVain(error, tools)) throw error;
    ctx.log.warn({ frameId: frame.id, err: error }, 'a frame could not be measured');
    return null;
  }
}
