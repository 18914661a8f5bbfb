import type { FrameSummary } from '../../contract/frames.ts';
import type { StudioScope } from '../../db/scope.ts';
import { Frame } from '../../models/Frame.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { countToCheck } from './frame-checks.ts';
import { framesCan } from './policy.ts';
import { RESTORABLE_DAYS } from './restore-frames.ts';

type Figures = Omit<FrameSummary, 'views' | 'toCheck' | 'can'>;

const FIGURES = `
  count(*) filter (where deleted_at is null) as total,
  count(*) filter (where deleted_at is null and state = 'ready') as ready,
  count(*) filter (where deleted_at is null and state = 'reading') as reading,
  count(*) filter (where deleted_at is null and state = 'failed') as failed,
  count(*) filter (where deleted_at is null and hidden_at is not null) as hidden,
  count(*) filter (where deleted_at > now() - make_interval(days => ${RESTORABLE_DAYS})) as deleted,
  coalesce(sum(size_bytes) filter (where deleted_at is null), 0)::bigint as bytes,
  count(*) filter (where deleted_at is null and view_id is null) as under_no_view,
  count(distinct bracket_id) filter (where deleted_at is null) as brackets,
  count(*) filter (where deleted_at is null and bracket_id is null) as single,
  count(*) filter (where deleted_at is null and alike is not null) as alike`;

/** The figures of a commission's frames. */
export async function summariseFrames(scope: StudioScope, commissionId: string): Promise<FrameSummary> {
  const commission = await findCommission(scope, commissionId);
  const frames = () => Frame.within(scope).where({ commissionId });
  const figures = await frames().select(Frame.raw(FIGURES)).first().throwIfNotFound().castTo<Figures>();
  const views = await frames()
    .whereNull('deletedAt')
    .whereNotNull('viewId')
    .groupBy('viewId')
    .select('viewId', Frame.raw('count(*) as count'))
    .castTo<FrameSummary['views']>();
  const { total, ready, reading, failed, hidden, deleted, bytes, underNoView, brackets, single, alike } = figures;
  return {
    ...{ total, ready, reading, failed, hidden, deleted, bytes, underNoView, brackets, single, alike },
    toCheck: await countToCheck(scope, commissionId),
    views: views.map(({ viewId, count }) => ({ viewId, count })),
    can: framesCan(commission),
  };
}
