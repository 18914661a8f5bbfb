import { useInfiniteQuery, useQueryClient } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import type { RecordLine, RecordNoun } from '../../../../../api/contract/record.ts';
import { useCommissionChanges } from '../../../features/commissions/live.ts';
import { recordQuery } from '../../../features/record/queries.ts';
import { formatTime } from '../../../lib/dates.ts';
import { DataTable } from '../../../ui/data-table.tsx';
import { EmptyState } from '../../../ui/empty-state.tsx';
import { MoreButton } from '../../../ui/more-button.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';
import { Select } from '../../../ui/select.tsx';
import { useCommission } from './layout.tsx';

/** The nouns that occur in a commission's record, in the words of the filter. */
const NOUNS: [RecordNoun, string][] = [
  ['commission', 'The commission'],
  ['frame', 'Frames'],
  ['sheet', 'Proof sheets'],
  ['guest', 'Guests'],
  ['pick-list', 'Pick lists'],
  ['final', 'Finals'],
  ['delivery', 'Deliveries'],
  ['download', 'Downloads'],
  ['mail', 'Mail'],
];
const KINDS = { staff: 'studio', guest: 'guest', oriel: '' } as const;

/** /commissions/:commissionId/record */
export function Component() {
  const commission = useCommission();
  const [search, setSearch] = useSearchParams();
  const noun = NOUNS.find(([value]) => value === search.get('about'))?.[0];
  const query = useInfiniteQuery(recordQuery(commission.id, noun));
  const queries = useQueryClient();
  useCommissionChanges(commission.id, () => void queries.invalidateQueries({ queryKey: ['commissions', commission.id, 'record'] }));
  return (
    <>
      <PageTitle title="Record" where={commission.title} hidden />
      <label className="mb-3 flex items-center gap-2">
        Show
        <Select
          scale="small"
          value={noun ?? ''}
          choices={[{ value: '', words: 'everything' }, ...NOUNS.map(([value, words]) => ({ value, words }))]}
          onChange={(event) => setSearch(event.target.value ? { about: event.target.value } : {}, { replace: true })}
        />
      </label>
      <QueryView
        query={query}
        isEmpty={({ pages }) => pages[0]?.items.length === 0}
        empty={
          <EmptyState title="Nothing here yet">
            {noun
              ? 'Nothing of this kind was done so far.'
              : 'Whatever is done in this commission will stand here, with who did it and when.'}
          </EmptyState>
        }
      >
        {({ pages }) => <RecordTable lines={pages.flatMap((page) => page.items)} />}
      </QueryView>
      <MoreButton query={query} />
    </>
  );
}

function RecordTable({ lines }: { lines: RecordLine[] }) {
  return (
    <DataTable
      caption="What was done, newest first"
      rows={lines}
      rowKey={(line) => String(line.id)}
      columns={[
        { key: 'at', words: 'When', width: '180px', cell: (line) => <time dateTime={line.at}>{formatTime(line.at)}</time> },
        {
          key: 'by',
          words: 'Who',
          width: '220px',
          cell: (line) => (
            <>
              {line.by.name} <span className="text-13 text-mute">{KINDS[line.by.kind]}</span>
            </>
          ),
        },
        { key: 'says', words: 'What', cell: (line) => <span className="wrap-break-word">{line.says}</span> },
      ]}
    />
  );
}
