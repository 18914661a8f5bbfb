import type { Context } from '../../context.ts';
import type { Watermark } from '../../contract/watermark.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { Studio } from '../../models/Studio.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { ownImage } from './own-image.ts';

/** Changes the watermark that new sheets begin with; sheets that are there keep theirs. @throws Problem 422 where its picture is another studio's */
export async function changeWatermark(ctx: Context, actor: StaffActor, watermark: Watermark): Promise<void> {
  ownImage(actor, watermark);
  await ctx.knex.transaction(async (trx) => {
    await Studio.query(trx).findById(actor.studioId).patch({ watermark });
    await addToRecord(trx, {
      studioId: actor.studioId,
      actor,
      did: 'studio.watermark-changed',
      says: 'Changed the watermark of new proof sheets',
    });
  });
}
