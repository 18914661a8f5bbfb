import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { Link, Outlet, useOutletContext, useParams } from 'react-router-dom';
import type { CommissionDetail } from '../../../../../api/contract/commissions.ts';
import { commissionSteps } from '../../../features/commissions/commission-steps.ts';
import { useCommissionChanges } from '../../../features/commissions/live.ts';
import { commissionQuery } from '../../../features/commissions/queries.ts';
import { formatDay } from '../../../lib/dates.ts';
import { QueryView } from '../../../ui/query-view.tsx';
import { StepBar } from '../../../ui/step-bar.tsx';
import { TitleBlock } from '../../../ui/title-block.tsx';

/** The commission of the pages below this layout. */
export function useCommission(): CommissionDetail {
  return useOutletContext<CommissionDetail>();
}

/** Many small changes at once (frames being read, say) ask for the figures once. */
const GATHER_MS = 400;

function useFreshFigures(commissionId: string): void {
  const queries = useQueryClient();
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  useCommissionChanges(commissionId, () => {
    clearTimeout(timer.current);
    timer.current = setTimeout(() => void queries.invalidateQueries({ queryKey: commissionQuery(commissionId).queryKey }), GATHER_MS);
  });
  useEffect(() => () => clearTimeout(timer.current), []);
}

function CommissionBlock({ commission }: { commission: CommissionDetail }) {
  return (
    <TitleBlock
      cells={[
        { label: 'Commission', value: commission.title, share: 2.2 },
        {
          label: 'Client',
          value: (
            <Link to={`/clients/${commission.client.id}`} className="hover:underline">
              {commission.client.name}
            </Link>
          ),
          share: 1.6,
        },
        { label: 'Shot', value: commission.shotOn ? formatDay(commission.shotOn) : 'not set' },
        { label: 'Due', value: commission.dueOn ? formatDay(commission.dueOn) : 'not set' },
        { label: 'Now', value: commission.state },
      ]}
    >
      <StepBar steps={commissionSteps(commission.id, commission.figures)} />
    </TitleBlock>
  );
}

/** Around every page of a commission: its title block and its steps. */
export function Component() {
  const { commissionId = '' } = useParams();
  useFreshFigures(commissionId);
  return (
    <QueryView query={useQuery(commissionQuery(commissionId))}>
      {(commission) => (
        <>
          <CommissionBlock commission={commission} />
          <div className="mt-5">
            <Outlet context={commission} />
          </div>
        </>
      )}
    </QueryView>
  );
}
