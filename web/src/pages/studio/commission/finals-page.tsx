import { useQuery, useQueryClient } from '@tanstack/react-query';
import type { FinalList } from '../../../../../api/contract/finals.ts';
import { useCommissionChanges } from '../../../features/commissions/live.ts';
import { AskedFinals } from '../../../features/finals/asked-finals.tsx';
import { FurtherFinals, PickedFinals } from '../../../features/finals/finals-tables.tsx';
import { finalKeys, finalsQuery } from '../../../features/finals/queries.ts';
import { UploadPanel } from '../../../features/uploads/upload-panel.tsx';
import { useCommissionUploads } from '../../../features/uploads/use-commission-uploads.ts';
import { formatBytes } from '../../../lib/bytes.ts';
import { EmptyState } from '../../../ui/empty-state.tsx';
import { LinkButton } from '../../../ui/link-button.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';
import { useCommission } from './layout.tsx';

const CHANGES = ['final-added', 'final-ready', 'finals-changed', 'picks', 'delivery-changed', 'missed'];

/** /commissions/:commissionId/finals */
export function Component() {
  const commission = useCommission();
  const client = useQueryClient();
  const queue = useCommissionUploads(commission.id, 'final');
  useCommissionChanges(commission.id, (change) => {
    const what = 'what' in change ? String(change.what) : 'missed';
    if (CHANGES.includes(what)) void client.invalidateQueries({ queryKey: finalKeys.list(commission.id) });
  });
  return (
    <>
      <PageTitle title="Finals" where={commission.title} hidden />
      <div className="grid gap-6 pb-8">
        {commission.closedAt ? null : <UploadPanel queue={queue} noun={{ one: 'final', many: 'finals' }} />}
        <QueryView
          query={useQuery(finalsQuery(commission.id))}
          isEmpty={(list) => list.finals.length === 0 && list.picks.length === 0}
          empty={
            <EmptyState title="No finals yet">
              Upload the finished files here. Once picks are in, each file is matched to its pick by name and time; without proofing they
              can be delivered as they are.
            </EmptyState>
          }
        >
          {(list) => (
            <>
              <FinalsHead commissionId={commission.id} list={list} />
              <AskedFinals commissionId={commission.id} list={list} />
              <PickedFinals commissionId={commission.id} list={list} />
              <FurtherFinals commissionId={commission.id} list={list} />
            </>
          )}
        </QueryView>
      </div>
    </>
  );
}

function FinalsHead({ commissionId, list }: { commissionId: string; list: FinalList }) {
  const { picks, picksWithFinal, toAsk, further, bytes } = list.figures;
  const words = [
    picks > 0 ? `${picksWithFinal} of ${picks} picks have their final` : '',
    further > 0 ? `${further} ${picks > 0 ? 'further' : further === 1 ? 'final' : 'finals'}` : '',
    bytes > 0 ? formatBytes(bytes) : '',
  ].filter(Boolean);
  return (
    <div className="flex flex-wrap items-center justify-between gap-x-6 gap-y-3">
      <p>
        <b className="text-17">Finals</b>
        <span className="text-mute"> · {words.join(' · ')}</span>
        {toAsk > 0 ? <b className="text-copper"> · {toAsk} to answer</b> : null}
      </p>
      {list.finals.length > 0 ? (
        <LinkButton tone="first" size="small" to={`/commissions/${commissionId}/delivery?new`}>
          Deliver
        </LinkButton>
      ) : null}
    </div>
  );
}
