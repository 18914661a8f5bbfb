import type { Context } from '../../context.ts';
import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';

/** Bytes of a studio's files: frames and finals, those not yet purged among them, and uploads under way. */
export async function storedBytes(ctx: Context, scope: StudioScope): Promise<number> {
  const { rows } = await ctx.knex.raw<{ rows: { bytes: number }[] }>(
    `select (
       coalesce((select sum(size_bytes) from frames where studio_id = :studioId), 0)
       + coalesce((select sum(size_bytes) from final_versions where studio_id = :studioId), 0)
       + coalesce((select sum(size_bytes) from uploads where studio_id = :studioId and state in ('receiving', 'checking')), 0)
     )::bigint as bytes`,
    { studioId: scope.studioId },
  );
  return rows[0]?.bytes ?? 0;
}

/** @throws Problem 413 where a file of so many bytes would not fit into what the studio may store. */
export async function refuseFullStorage(ctx: Context, scope: StudioScope, size: number): Promise<void> {
  const most = ctx.config.limits.storageBytes;
  if ((await storedBytes(ctx, scope)) + size <= most) return;
  const gigabytes = new Intl.NumberFormat('en-GB', { maximumFractionDigits: 1 }).format(most / 1e9);
  throw problem(413, `The studio's storage of ${gigabytes} GB is full. Delete frames you no longer need, or make it larger.`, {
    code: 'storage-full',
  });
}
