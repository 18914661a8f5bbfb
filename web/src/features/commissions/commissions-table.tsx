import { Link } from 'react-router-dom';
import type { CommissionSummary } from '../../../../api/contract/commissions.ts';
import { formatDay } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { type Column, DataTable } from '../../ui/data-table.tsx';

interface Props {
  commissions: CommissionSummary[];
  /** On the page of one client its name says nothing. */
  withoutClient?: boolean;
  /** For deleted ones: they open no page, but can be brought back. */
  onRestore?: (commission: CommissionSummary) => void;
}

const SETTLED = new Set(['Delivered', 'Closed']);

/** Commissions as lines of a list. */
export function CommissionsTable({ commissions, withoutClient = false, onRestore }: Props) {
  const columns: (Column<CommissionSummary> | false)[] = [
    {
      key: 'title',
      words: 'Commission',
      cell: ({ id, title, client }) => (
        <>
          {onRestore ? (
            <b className="block wrap-break-word">{title}</b>
          ) : (
            <Link to={`/commissions/${id}/brief`} className="block font-bold wrap-break-word hover:underline">
              {title}
            </Link>
          )}
          {withoutClient ? null : <span className="block text-13 text-mute wrap-break-word">{client.name}</span>}
        </>
      ),
    },
    {
      key: 'state',
      words: 'Now',
      width: '110px',
      cell: ({ state }) => <span className={SETTLED.has(state) ? 'font-bold text-verdigris' : ''}>{state}</span>,
    },
    { key: 'shot', words: 'Shot', width: '110px', cell: ({ shotOn }) => <Day day={shotOn} /> },
    { key: 'due', words: 'Due', width: '110px', cell: ({ dueOn }) => <Day day={dueOn} /> },
    { key: 'frames', words: 'Frames', align: 'right', width: '76px', cell: ({ frames }) => frames || '–' },
    { key: 'picks', words: 'Picks', align: 'right', width: '64px', cell: ({ picks }) => picks || '–' },
    { key: 'finals', words: 'Finals', align: 'right', width: '68px', cell: ({ finals }) => finals || '–' },
    onRestore !== undefined && {
      key: 'restore',
      words: 'Bring back',
      align: 'right',
      cell: (commission) => (
        <Button size="small" aria-label={`Bring ${commission.title} back`} onClick={() => onRestore(commission)}>
          Bring back
        </Button>
      ),
    },
  ];
  return (
    <DataTable
      caption="Commissions"
      rows={commissions}
      rowKey={({ id }) => id}
      columns={columns.filter((column): column is Column<CommissionSummary> => column !== false)}
    />
  );
}

function Day({ day }: { day: string | null }) {
  return <span className="whitespace-nowrap">{day ? formatDay(day) : '–'}</span>;
}
