import type { Context } from '../../context.ts';
import type { StudioChecks } from '../../contract/studios.ts';
import { type CheckThresholds, DEFAULT_THRESHOLDS } from '../../domain/check-thresholds.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { Commission } from '../../models/Commission.ts';
import { Studio } from '../../models/Studio.ts';
import { queueGrouping } from '../brackets/queue-grouping.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { mayChangeStudio } from './policy.ts';

/** From where on the studio's frames are pointed out. */
export async function readChecks(actor: StaffActor): Promise<StudioChecks> {
  const { checkThresholds } = await Studio.query().findById(actor.studioId).throwIfNotFound();
  return {
    thresholds: { ...DEFAULT_THRESHOLDS, ...checkThresholds },
    defaults: DEFAULT_THRESHOLDS,
    can: { change: mayChangeStudio(actor) },
  };
}

/** Changes them. Checks follow at once; near-doubles are looked for anew where that is what changed. */
export async function changeChecks(ctx: Context, actor: StaffActor, thresholds: CheckThresholds): Promise<StudioChecks> {
  await ctx.knex.transaction(async (trx) => {
    const before = await Studio.query(trx).findById(actor.studioId).forUpdate().throwIfNotFound();
    await Studio.query(trx).findById(actor.studioId).patch({ checkThresholds: thresholds });
    if ((before.checkThresholds ?? DEFAULT_THRESHOLDS).alikeBits !== thresholds.alikeBits) {
      const commissions = await Commission.within(actor, trx).whereNull('deletedAt').select('id');
      for (const { id } of commissions) await queueGrouping(trx, id);
    }
    await addToRecord(trx, {
      studioId: actor.studioId,
      actor,
      did: 'studio.checks-changed',
      says: 'Changed from where on frames are pointed out',
      about: { thresholds },
    });
  });
  return readChecks(actor);
}
