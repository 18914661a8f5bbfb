import type { Knex } from 'knex';
import type { CommissionContents } from '../../contract/commissions.ts';
import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';

/** Days in which a deleted commission can be brought back. */
export const UNDO_DAYS = 30;

/** What goes when a commission is deleted. @throws Problem 404 */
export async function countContents(db: Knex, scope: StudioScope, commissionId: string): Promise<CommissionContents> {
  const { rows } = await db.raw<{ rows: Omit<CommissionContents, 'undoDays'>[] }>(
    `select
       (select count(*)::int from frames f where f.commission_id = c.id and f.deleted_at is null) as frames,
       (select count(*)::int from sheets s where s.commission_id = c.id) as sheets,
       (select count(*)::int from pick_lists l where l.commission_id = c.id) as pick_lists,
       (select count(*)::int from finals f where f.commission_id = c.id and f.deleted_at is null) as finals,
       (select count(*)::int from deliveries d where d.commission_id = c.id) as deliveries,
       ((select coalesce(sum(f.size_bytes), 0) from frames f where f.commission_id = c.id)
         + (select coalesce(sum(v.size_bytes), 0) from finals f join final_versions v on v.final_id = f.id where f.commission_id = c.id))::bigint
         as stored_bytes
     from commissions c where c.studio_id = ? and c.id = ? and c.deleted_at is null`,
    [scope.studioId, commissionId],
  );
  if (!rows[0]) throw problem(404);
  return { ...rows[0], undoDays: UNDO_DAYS };
}
