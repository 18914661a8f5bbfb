import { useQueryClient } from '@tanstack/react-query';
import { BriefForm } from '../../../features/commissions/brief-form.tsx';
import { CommissionEnd } from '../../../features/commissions/commission-end.tsx';
import { useCommissionChanges } from '../../../features/commissions/live.ts';
import { viewsQuery } from '../../../features/commissions/queries.ts';
import { ViewsList } from '../../../features/commissions/views-list.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { useCommission } from './layout.tsx';

/** /commissions/:commissionId/brief */
export function Component() {
  const commission = useCommission();
  const queries = useQueryClient();
  useCommissionChanges(commission.id, () => void queries.invalidateQueries({ queryKey: viewsQuery(commission.id).queryKey }));
  return (
    <>
      <PageTitle title="Brief" where={commission.title} hidden />
      <div className="grid items-start gap-6 xl:grid-cols-2">
        <div>
          <h2 className="mb-2 flex min-h-8 items-center text-17">What was agreed</h2>
          <BriefForm key={commission.id} commission={commission} />
        </div>
        <ViewsList commission={commission} />
      </div>
      <CommissionEnd commission={commission} />
    </>
  );
}
