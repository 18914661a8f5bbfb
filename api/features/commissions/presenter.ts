import type { CommissionDetail, CommissionSummary } from '../../contract/commissions.ts';
import type { CommissionState } from '../../domain/commission-state.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { mayOnCommission } from './policy.ts';
import type { CommissionRow } from './read-commission.ts';

export function presentCommission(row: CommissionRow, actor: StaffActor): CommissionDetail {
  return {
    id: row.id,
    title: row.title,
    brief: row.brief,
    client: { id: row.clientId, name: row.clientName },
    shotOn: row.shotOn,
    dueOn: row.dueOn,
    allowance: row.allowance,
    extraPrice: row.extraPrice,
    currency: row.currency,
    state: row.state,
    figures: {
      views: row.views,
      frames: row.frames,
      proofs: row.proofs,
      proofsOut: row.proofsOut,
      picks: row.picks,
      extras: row.extras,
      finals: row.finals,
      ofPicks: row.picksWithFinal,
      deliveries: row.deliveries,
      record: row.record,
    },
    closedAt: row.closedAt?.toISOString() ?? null,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    version: row.version,
    can: mayOnCommission(actor, row),
  };
}

/** A row of the list's question. */
export interface CommissionLine {
  id: string;
  title: string;
  clientId: string;
  clientName: string;
  shotOn: string | null;
  dueOn: string | null;
  state: CommissionState;
  frames: number;
  picks: number;
  finals: number;
  createdAt: Date;
  deletedAt: Date | null;
}

export function presentCommissionLine(row: CommissionLine): CommissionSummary {
  return {
    id: row.id,
    title: row.title,
    client: { id: row.clientId, name: row.clientName },
    shotOn: row.shotOn,
    dueOn: row.dueOn,
    state: row.state,
    frames: row.frames,
    picks: row.picks,
    finals: row.finals,
    createdAt: row.createdAt.toISOString(),
    deletedAt: row.deletedAt?.toISOString() ?? null,
  };
}
