import type { Knex } from 'knex';
import type { View as ViewAnswer } from '../../contract/commissions.ts';
import type { StudioScope } from '../../db/scope.ts';

/** The views of a commission in order, each with what hangs under it. */
export async function listViews(db: Knex, scope: StudioScope, commissionId: string): Promise<ViewAnswer[]> {
  const { rows } = await db.raw<{ rows: ViewAnswer[] }>(
    `select v.id, v.title, v.asked_for, v.version,
       (select count(*)::int from frames f where f.view_id = v.id and f.deleted_at is null) as frames,
       (select count(*)::int from sheets s join proofs p on p.sheet_id = s.id
         where s.commission_id = v.commission_id and p.view_id = v.id) as proofs
     from views v where v.studio_id = ? and v.commission_id = ? order by v.position, v.id`,
    [scope.studioId, commissionId],
  );
  return rows;
}
