import type { Context } from '../../context.ts';
import { DERIVATIVE_SIZES } from '../../imaging/derivative-sizes.ts';
import type { Job } from '../../jobs/job.ts';
import { DeliveryFile } from '../../models/DeliveryFile.ts';
import { Final } from '../../models/Final.ts';
import { FinalVersion } from '../../models/FinalVersion.ts';
import { finalKey, webSizeKey } from '../../services/storage-keys.ts';

/** How long a removed version can be restored. */
export const KEPT_DAYS = 30;

type Removed = FinalVersion & { commissionId: string };

/** Lets go of versions removed long ago, first their files, then their rows: killed in between, it begins again. */
export const sweepFinals: Job = {
  name: 'sweep-finals',
  every: '37 3 * * *',
  async run(ctx) {
    const removed = (await FinalVersion.query(ctx.knex)
      .join('finals', 'finals.id', 'finalVersions.finalId')
      .where('finalVersions.deletedAt', '<', new Date(Date.now() - KEPT_DAYS * 86_400_000))
      .whereNotExists(DeliveryFile.query(ctx.knex).whereColumn('deliveryFiles.finalVersionId', 'finalVersions.id'))
      .limit(500)
      .select('finalVersions.*', 'finals.commissionId')) as Removed[];
    for (const version of removed) await letGo(ctx, version);
    await Final.query(ctx.knex)
      .delete()
      .whereNotNull('deletedAt')
      .whereNotExists(FinalVersion.query(ctx.knex).whereColumn('finalVersions.finalId', 'finals.id'));
  },
};

async function letGo(ctx: Context, version: Removed): Promise<void> {
  const pictures = DERIVATIVE_SIZES.map((size) => finalKey(version, version.commissionId, size));
  await ctx.store.remove(version.storageKey, webSizeKey(version, version.commissionId), ...pictures);
  await FinalVersion.query(ctx.knex).deleteById(version.id);
}
