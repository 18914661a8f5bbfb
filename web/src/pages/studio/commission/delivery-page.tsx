import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { DeliveryList } from '../../../../../api/contract/deliveries.ts';
import { useCommissionChanges } from '../../../features/commissions/live.ts';
import { deliverables } from '../../../features/deliveries/choose-finals.tsx';
import { DeliveryBlock } from '../../../features/deliveries/delivery-block.tsx';
import { NewDelivery } from '../../../features/deliveries/new-delivery.tsx';
import { deliveriesQuery, deliveryKeys } from '../../../features/deliveries/queries.ts';
import { finalsQuery } from '../../../features/finals/queries.ts';
import { Button } from '../../../ui/button.tsx';
import { EmptyState } from '../../../ui/empty-state.tsx';
import { LinkButton } from '../../../ui/link-button.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';
import { useCommission } from './layout.tsx';

const CHANGES = ['delivery-changed', 'archive-progress', 'archive-ready', 'archive-failed', 'downloads-changed', 'guests', 'missed'];
/** Progress is told each second; so many tellings in this time ask once. */
const GATHER_MS = 500;

function useLiveDeliveries(commissionId: string): void {
  const client = useQueryClient();
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  useCommissionChanges(commissionId, (change) => {
    if (!CHANGES.includes('what' in change ? String(change.what) : 'missed')) return;
    clearTimeout(timer.current);
    timer.current = setTimeout(() => void client.invalidateQueries({ queryKey: deliveryKeys.list(commissionId) }), GATHER_MS);
  });
  useEffect(() => () => clearTimeout(timer.current), []);
}

/** /commissions/:commissionId/delivery */
export function Component() {
  const commission = useCommission();
  useLiveDeliveries(commission.id);
  return (
    <>
      <PageTitle title="Delivery" where={commission.title} hidden />
      <div className="grid gap-6 pb-8">
        <QueryView query={useQuery(deliveriesQuery(commission.id))}>
          {(list) => (
            <>
              <Beginning commissionId={commission.id} list={list} />
              {list.items.map((delivery) => (
                <DeliveryBlock key={delivery.id} commissionId={commission.id} delivery={delivery} people={list.people} />
              ))}
            </>
          )}
        </QueryView>
      </div>
    </>
  );
}

/** The form of a new delivery where it was asked for, else the way to it, or why there is none yet. */
function Beginning({ commissionId, list }: { commissionId: string; list: DeliveryList }) {
  const [search, setSearch] = useSearchParams();
  const finals = useQuery(finalsQuery(commissionId));
  const close = () => setSearch({}, { replace: true });
  return (
    <QueryView query={finals}>
      {(found) => {
        const ready = deliverables(found.finals).length;
        if (ready === 0) return list.items.length === 0 ? <NothingYet commissionId={commissionId} toAsk={found.figures.toAsk} /> : null;
        if (!list.can.deliver)
          return list.items.length === 0 ? <EmptyState title="Nothing was delivered">The commission is closed.</EmptyState> : null;
        if (search.has('new')) return <NewDelivery commissionId={commissionId} finals={found} list={list} onDone={close} />;
        const button = (
          <Button tone="first" size={list.items.length > 0 ? 'small' : 'normal'} onClick={() => setSearch({ new: '' })}>
            New delivery
          </Button>
        );
        if (list.items.length > 0) return <div className="flex justify-end">{button}</div>;
        return (
          <EmptyState title="Nothing delivered yet" action={button}>
            {ready === 1 ? 'One final is' : `${ready} finals are`} ready to go out, in full resolution and in web size, to the people you
            name.
          </EmptyState>
        );
      }}
    </QueryView>
  );
}

function NothingYet({ commissionId, toAsk }: { commissionId: string; toAsk: number }) {
  return (
    <EmptyState title="Nothing to deliver yet" action={<LinkButton to={`/commissions/${commissionId}/finals`}>Open the finals</LinkButton>}>
      {toAsk > 0
        ? 'Say first which picks the finals belong to.'
        : 'Upload the finished files under Finals; then they can be delivered here.'}
    </EmptyState>
  );
}
