import { Link } from 'react-router-dom';
import type { PickListDetail, PickRow } from '../../../../api/contract/pick-lists.ts';
import { type Column, DataTable } from '../../ui/data-table.tsx';
import { Keystone } from '../../ui/keystone.tsx';
import { Thumb } from '../finals/thumb.tsx';

function finalWords(pick: PickRow): string {
  if (!pick.final) return 'not yet';
  return pick.final.versions > 1 ? `version ${pick.final.versions}` : 'in';
}

function columnsOf(commissionId: string, changed: boolean): Column<PickRow>[] {
  const columns: Column<PickRow>[] = [
    { key: 'pick', words: 'Pick', width: '64px', cell: (pick) => <Keystone number={pick.number} extra={pick.extra} size="small" /> },
    {
      key: 'proof',
      words: 'Proof',
      cell: (pick) => (
        <span className="flex items-center gap-3">
          <Thumb {...pick} />
          <span className="text-mute">{String(pick.proofNumber).padStart(2, '0')}</span>
        </span>
      ),
    },
    { key: 'view', words: 'View', cell: (pick) => pick.viewTitle ?? 'Also made' },
    {
      key: 'frame',
      words: 'Frame',
      cell: (pick) => (
        <>
          <Link
            to={`/commissions/${commissionId}/frames/${pick.frameId}`}
            className="inline-block min-w-24 wrap-anywhere underline-offset-4 hover:underline"
          >
            {pick.frameName}
          </Link>
          {pick.frames.length > 1 ? (
            <span className="block text-13 text-mute" title={pick.frames.map((frame) => frame.name).join(', ')}>
              {pick.frames.length} exposures
            </span>
          ) : null}
        </>
      ),
    },
    {
      key: 'marked',
      words: 'Marked by',
      cell: (pick) => (
        <span title={pick.markedBy.map((guest) => guest.name).join(', ')}>{pick.markedBy.map((guest) => guest.initials).join(', ')}</span>
      ),
    },
    {
      key: 'final',
      words: 'Final',
      cell: (pick) => <span className={pick.final ? 'font-bold text-verdigris' : 'text-mute'}>{finalWords(pick)}</span>,
    },
  ];
  if (!changed) return columns;
  const change: Column<PickRow> = {
    key: 'change',
    words: 'Against the list before',
    cell: (pick) => (pick.change === 'added' ? <b className="text-copper">new</b> : <span className="text-mute">as before</span>),
  };
  return [...columns, change];
}

/** The picks of a list in their order. */
export function PicksTable({ list, commissionId }: { list: PickListDetail; commissionId: string }) {
  const changed = list.picks.some((pick) => pick.change !== null);
  return (
    <>
      <DataTable
        caption={`Picks of list ${list.number}`}
        columns={columnsOf(commissionId, changed)}
        rows={list.picks}
        rowKey={(pick) => pick.id}
      />
      {list.dropped.length > 0 ? (
        <p className="mt-3">
          <b className="text-copper">No longer picked:</b>{' '}
          {list.dropped.map((pick) => `proof ${pick.proofNumber} (${pick.frameName}, ${pick.viewTitle ?? 'Also made'})`).join('; ')}
        </p>
      ) : null}
    </>
  );
}
