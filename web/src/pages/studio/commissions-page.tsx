import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useCallback } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { CommissionSummary } from '../../../../api/contract/commissions.ts';
import { COMMISSION_STATES } from '../../../../api/domain/commission-state.ts';
import { CommissionsTable } from '../../features/commissions/commissions-table.tsx';
import { commissionKeys, commissionsQuery, type CommissionFilter } from '../../features/commissions/queries.ts';
import { meQuery } from '../../features/sign-in/queries.ts';
import { api } from '../../lib/api.ts';
import { EmptyState } from '../../ui/empty-state.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { MoreButton } from '../../ui/more-button.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { QueryView } from '../../ui/query-view.tsx';
import { SearchField } from '../../ui/search-field.tsx';
import { Select } from '../../ui/select.tsx';

const DELETED = 'deleted';
const SORTS = [
  { value: 'newest', words: 'Newest first' },
  { value: 'due', words: 'Due first' },
  { value: 'title', words: 'By title' },
] as const;

function filterOf(search: URLSearchParams): CommissionFilter {
  const now = search.get('now') ?? '';
  return {
    search: search.get('search') ?? undefined,
    state: COMMISSION_STATES.find((state) => state === now),
    deleted: now === DELETED ? 'true' : undefined,
    sort: SORTS.find(({ value }) => value === search.get('sort'))?.value,
  };
}

/** /commissions; what is searched and how it is sorted stands in the address. */
export function Component() {
  const [address, setAddress] = useSearchParams();
  const filter = filterOf(address);
  const query = useInfiniteQuery(commissionsQuery(filter));
  const queries = useQueryClient();
  const set = useCallback(
    (name: string, value: string) =>
      setAddress(
        (before) => {
          const after = new URLSearchParams(before);
          if (value) after.set(name, value);
          else after.delete(name);
          return after;
        },
        { replace: true },
      ),
    [setAddress],
  );
  const search = useCallback((words: string) => set('search', words), [set]);
  const restore = useMutation({
    mutationFn: ({ id }: CommissionSummary) => api.post(`/api/commissions/${id}/restore`),
    onSuccess: (_answer, { title }) => showNotice(`${title} is back.`),
    onError: (error) => showNotice(error.message, { tone: 'problem' }),
    onSettled: () => void queries.invalidateQueries({ queryKey: commissionKeys.all }),
  });
  return (
    <>
      <div className="mb-4 flex flex-wrap items-center justify-between gap-3">
        <PageTitle title="Commissions" />
        <LinkButton to="/commissions/new" tone="first">
          New commission
        </LinkButton>
      </div>
      <div className="mb-3 flex flex-wrap items-center gap-3">
        <SearchField label="Search titles and clients" initial={filter.search ?? ''} onSearch={search} />
        <FilterChoices address={address} set={set} />
      </div>
      <QueryView
        query={query}
        isEmpty={({ pages }) => pages[0]?.items.length === 0}
        empty={<NothingHere narrowed={Boolean(filter.search ?? filter.state)} deleted={filter.deleted === 'true'} />}
      >
        {({ pages }) => (
          <CommissionsTable
            commissions={pages.flatMap((page) => page.items)}
            {...(filter.deleted ? { onRestore: (commission: CommissionSummary) => restore.mutate(commission) } : {})}
          />
        )}
      </QueryView>
      <MoreButton query={query} />
    </>
  );
}

function FilterChoices({ address, set }: { address: URLSearchParams; set: (name: string, value: string) => void }) {
  const me = useQuery(meQuery);
  const states = [
    { value: '', words: 'In every state' },
    ...COMMISSION_STATES.map((state) => ({ value: state, words: state })),
    ...(me.data?.can.deleteCommissions ? [{ value: DELETED, words: 'Deleted' }] : []),
  ];
  return (
    <>
      <Select aria-label="State" choices={states} value={address.get('now') ?? ''} onChange={(event) => set('now', event.target.value)} />
      <Select
        aria-label="Order"
        choices={[...SORTS]}
        value={address.get('sort') ?? 'newest'}
        onChange={(event) => set('sort', event.target.value === 'newest' ? '' : event.target.value)}
      />
    </>
  );
}

function NothingHere({ narrowed, deleted }: { narrowed: boolean; deleted: boolean }) {
  if (deleted) return <EmptyState title="Nothing deleted">Deleted commissions stand here for 30 days and can be brought back.</EmptyState>;
  if (narrowed) return <EmptyState title="Nothing found">No commission fits what you search for.</EmptyState>;
  return (
    <EmptyState title="No commissions yet" action={<LinkButton to="/commissions/new">Begin a commission</LinkButton>}>
      One job for one client: brief, frames, proofs, picks, finals and deliveries in one place.
    </EmptyState>
  );
}
