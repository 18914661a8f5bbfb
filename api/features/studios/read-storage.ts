import type { Context } from '../../context.ts';
import type { StoredKind, StudioStorage } from '../../contract/studios.ts';
import type { StaffActor } from '../../middleware/actor.ts';

const BY_KIND = `
  select 'frames' as kind, count(*)::int as files, coalesce(sum(size_bytes), 0)::bigint as bytes from frames where studio_id = :studio
  union all
  select 'finals', count(*)::int, coalesce(sum(size_bytes), 0)::bigint from final_versions where studio_id = :studio
  union all
  select 'archives', count(*)::int, coalesce(sum(size_bytes), 0)::bigint from archives where studio_id = :studio and state = 'ready'
  union all
  select 'uploads', count(*)::int, coalesce(sum(size_bytes), 0)::bigint from uploads
   where studio_id = :studio and state in ('receiving', 'checking')`;

/** What the studio keeps in the store, by kind, and how much it may. Uploads under way count with their whole size. */
export async function readStorage(ctx: Context, actor: StaffActor): Promise<StudioStorage> {
  const { rows } = await ctx.knex.raw<{ rows: StoredKind[] }>(BY_KIND, { studio: actor.studioId });
  return {
    kinds: rows,
    bytes: rows.reduce((sum, { bytes }) => sum + bytes, 0),
    limitBytes: ctx.config.limits.storageBytes,
  };
}
