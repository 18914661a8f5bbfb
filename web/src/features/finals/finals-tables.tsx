import type { FinalItem, FinalList, PickForFinal } from '../../../../api/contract/finals.ts';
import { type Column, DataTable } from '../../ui/data-table.tsx';
import { Keystone } from '../../ui/keystone.tsx';
import { DeliveredCell, FinalCell, FinalMenu } from './final-cells.tsx';
import { sheetCount } from './final-words.ts';
import { Thumb } from './thumb.tsx';

interface Props {
  commissionId: string;
  list: FinalList;
}

/** Every pick with its final, in the order of the pick lists. */
export function PickedFinals({ commissionId, list }: Props) {
  if (list.picks.length === 0) return null;
  const finals = new Map(list.finals.map((final) => [final.id, final]));
  const finalOf = (pick: PickForFinal) => (pick.finalId ? finals.get(pick.finalId) : undefined);
  const sheets = sheetCount(list.picks);
  const columns: Column<PickForFinal>[] = [
    { key: 'pick', words: sheets > 1 ? 'Sheet, pick' : 'Pick', width: '92px', cell: (pick) => <PickNumber pick={pick} sheets={sheets} /> },
    { key: 'proof', words: 'Proof', cell: (pick) => <Thumb {...pick} /> },
    { key: 'view', words: 'View', cell: (pick) => <ViewCell pick={pick} title={finalOf(pick)} /> },
    { key: 'final', words: 'Final', width: '38%', cell: (pick) => <OptionalFinal final={finalOf(pick)} /> },
    { key: 'delivered', words: 'Delivered', cell: (pick) => <OptionalDelivered final={finalOf(pick)} /> },
    {
      key: 'change',
      words: 'Change',
      align: 'right',
      width: '110px',
      cell: (pick) => {
        const final = finalOf(pick);
        return final ? <FinalMenu commissionId={commissionId} final={final} list={list} /> : null;
      },
    },
  ];
  return <DataTable caption="Picks and their finals" columns={columns} rows={list.picks} rowKey={(pick) => pick.frameId} />;
}

function PickNumber({ pick, sheets }: { pick: PickForFinal; sheets: number }) {
  return (
    <span className="flex items-center gap-2">
      {sheets > 1 ? <span className="text-mute">{pick.sheetNumber},</span> : null}
      <Keystone number={pick.number} extra={pick.extra} size="small" />
    </span>
  );
}

function ViewCell({ pick, title }: { pick: PickForFinal; title: FinalItem | undefined }) {
  return (
    <>
      <span className="block min-w-28">{title?.ownTitle ? title.title : (pick.viewTitle ?? 'Also made')}</span>
      <span className="block text-13 wrap-anywhere text-mute">
        {pick.frameName}
        {pick.exposures > 1 ? ` · ${pick.exposures} exposures` : ''}
      </span>
    </>
  );
}

function OptionalFinal({ final }: { final: FinalItem | undefined }) {
  return final ? <FinalCell final={final} besideProof /> : <span className="text-mute">not yet</span>;
}

function OptionalDelivered({ final }: { final: FinalItem | undefined }) {
  return final ? <DeliveredCell final={final} /> : null;
}

/** Finals that belong to no pick: further ones, or all of them where the commission has no proofing. */
export function FurtherFinals({ commissionId, list }: Props) {
  const shown = new Set(list.picks.map((pick) => pick.finalId));
  const further = list.finals.filter((final) => final.match !== 'ask' && !shown.has(final.id));
  if (further.length === 0) return null;
  const columns: Column<FinalItem>[] = [
    { key: 'final', words: 'Final', width: '46%', cell: (final) => <FinalCell final={final} /> },
    { key: 'title', words: 'Title', cell: (final) => final.title },
    { key: 'delivered', words: 'Delivered', cell: (final) => <DeliveredCell final={final} /> },
    {
      key: 'change',
      words: 'Change',
      align: 'right',
      width: '110px',
      cell: (final) => <FinalMenu commissionId={commissionId} final={final} list={list} />,
    },
  ];
  const words = list.picks.length > 0 ? 'Further finals' : 'Finals';
  return (
    <section aria-labelledby="further" className="grid gap-3">
      <h2 id="further" className="text-17">
        {words} <span className="font-normal text-mute">· {further.length}</span>
      </h2>
      <DataTable caption={words} columns={columns} rows={further} rowKey={(final) => final.id} />
    </section>
  );
}
