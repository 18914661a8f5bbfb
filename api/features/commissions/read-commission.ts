import type { Knex } from 'knex';
import type { CommissionDetail } from '../../contract/commissions.ts';
import type { CommissionState } from '../../domain/commission-state.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { COMMISSION_FACTS, type CommissionFactsRow } from './commission-facts.ts';
import { presentCommission } from './presenter.ts';

/** A commission with everything its title block and steps show, from one question. */
export interface CommissionRow extends CommissionFactsRow {
  id: string;
  title: string;
  brief: string;
  clientId: string;
  clientName: string;
  shotOn: string | null;
  dueOn: string | null;
  allowance: number;
  extraPrice: number;
  currency: string;
  closedAt: Date | null;
  createdAt: Date;
  updatedAt: Date;
  version: number;
  state: CommissionState;
  views: number;
  frames: number;
  proofs: number;
  proofsOut: number;
  deliveries: number;
  record: number;
}

const QUESTION = `
  select c.*, cl.name as client_name, facts.*,
    (select count(*)::int from views v where v.commission_id = c.id) as views,
    (select count(*)::int from frames f where f.commission_id = c.id and f.deleted_at is null) as frames,
    (select count(*)::int from deliveries d where d.commission_id = c.id and d.sent_at is not null and d.withdrawn_at is null) as deliveries,
    (select count(*)::int from record_entries r where r.commission_id = c.id) as record,
    proofs.*
  from commissions c
  join clients cl on cl.id = c.client_id
  cross join lateral (
    select count(*)::int as proofs, count(*) filter (where s.issued_at is not null)::int as proofs_out
    from sheets s join proofs p on p.sheet_id = s.id where s.commission_id = c.id and s.withdrawn_at is null
  ) proofs
  ${COMMISSION_FACTS}
  where c.studio_id = ? and c.id = ? and c.deleted_at is null`;

/** A commission as its pages' title block shows it. @throws Problem 404 */
export async function readCommission(db: Knex, actor: StaffActor, commissionId: string): Promise<CommissionDetail> {
  const { rows } = await db.raw<{ rows: CommissionRow[] }>(QUESTION, [actor.studioId, commissionId]);
  if (!rows[0]) throw problem(404);
  return presentCommission(rows[0], actor);
}
