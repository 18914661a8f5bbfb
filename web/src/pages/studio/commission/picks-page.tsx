import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { PickListDetail, PickListLine } from '../../../../../api/contract/pick-lists.ts';
import { timesMoney } from '../../../../../api/domain/money.ts';
import { useCommissionChanges } from '../../../features/commissions/live.ts';
import { NamesDialog } from '../../../features/picks/names-dialog.tsx';
import { OriginalsButton } from '../../../features/picks/originals-button.tsx';
import { PicksTable } from '../../../features/picks/picks-table.tsx';
import { pickKeys, pickListQuery, pickListsQuery } from '../../../features/picks/queries.ts';
import { sheetQuery } from '../../../features/sheets/queries.ts';
import { ReopenDialog } from '../../../features/sheets/reopen-dialog.tsx';
import { counted } from '../../../features/sheets/sheet-words.ts';
import { formatTime } from '../../../lib/dates.ts';
import { formatPrice } from '../../../lib/money.ts';
import { Button } from '../../../ui/button.tsx';
import { EmptyState } from '../../../ui/empty-state.tsx';
import { AnchorButton, LinkButton } from '../../../ui/link-button.tsx';
import { PageTitle } from '../../../ui/page-title.tsx';
import { QueryView } from '../../../ui/query-view.tsx';
import { Select } from '../../../ui/select.tsx';
import { useCommission } from './layout.tsx';

/** /commissions/:commissionId/picks */
export function Component() {
  const commission = useCommission();
  const client = useQueryClient();
  useCommissionChanges(commission.id, (change) => {
    const what = 'what' in change ? change.what : 'missed';
    if (['picks', 'missed'].includes(String(what))) void client.invalidateQueries({ queryKey: pickKeys.lists(commission.id) });
  });
  const [search, setSearch] = useSearchParams();
  return (
    <>
      <PageTitle title="Picks" where={commission.title} hidden />
      <QueryView
        query={useQuery(pickListsQuery(commission.id))}
        isEmpty={(data) => data.items.length === 0}
        empty={
          <EmptyState
            title="No pick list yet"
            action={<LinkButton to={`/commissions/${commission.id}/proofs`}>Open the proof sheets</LinkButton>}
          >
            The lead of a proof sheet sends it. It then stands here, and you get an e-mail.
          </EmptyState>
        }
      >
        {({ items }) => {
          const shown = items.find((list) => list.id === search.get('list')) ?? items[0];
          if (!shown) return null;
          return (
            <div className="grid gap-4">
              {items.length > 1 ? <ListChoice lists={items} shown={shown.id} onChoose={(list) => setSearch({ list })} /> : null}
              <OneList key={shown.id} pickListId={shown.id} />
            </div>
          );
        }}
      </QueryView>
    </>
  );
}

function ListChoice({ lists, shown, onChoose }: { lists: PickListLine[]; shown: string; onChoose: (id: string) => void }) {
  const choices = lists.map((list) => ({
    value: list.id,
    words: `Sheet ${list.sheetNumber}, list ${list.number}${list.latest ? '' : ' (replaced)'}`,
  }));
  return (
    <div>
      <Select scale="small" aria-label="Pick list" choices={choices} value={shown} onChange={(event) => onChoose(event.target.value)} />
    </div>
  );
}

function OneList({ pickListId }: { pickListId: string }) {
  const commission = useCommission();
  return (
    <QueryView query={useQuery(pickListQuery(pickListId))}>
      {(list) => (
        <>
          <ListHead list={list} />
          {list.words ? (
            <blockquote className="border-l-2 border-ink pl-3 whitespace-pre-wrap">
              {list.words} <span className="text-mute">— {list.sentBy}</span>
            </blockquote>
          ) : null}
          <PicksTable list={list} commissionId={commission.id} />
        </>
      )}
    </QueryView>
  );
}

/** "12 included, 2 extra at £85 = £170". */
function agreed(list: PickListDetail): string {
  if (list.extraCount === 0) return `${counted(list.pickCount, 'pick')} of ${list.allowance} included`;
  const cost = formatPrice(timesMoney(list.extraPrice, list.extraCount), list.currency);
  return `${list.allowance} included, ${list.extraCount} extra at ${formatPrice(list.extraPrice, list.currency)}: ${cost}`;
}

function ListHead({ list }: { list: PickListDetail }) {
  const [dialog, setDialog] = useState<'names' | 'reopen' | null>(null);
  const sheet = useQuery(sheetQuery(list.sheetId)).data;
  const close = () => setDialog(null);
  return (
    <div className="flex flex-wrap items-center justify-between gap-x-6 gap-y-3">
      <p>
        <b className="text-17">Pick list {list.number}</b>
        <span className="text-mute">
          {' '}
          · sent by {list.sentBy}, {formatTime(list.sentAt)} · {agreed(list)}
        </span>
      </p>
      <div className="flex flex-wrap gap-2">
        <Button size="small" onClick={() => setDialog('names')}>
          File names
        </Button>
        <AnchorButton size="small" href={`/api/pick-lists/${list.id}/csv`} download>
          CSV
        </AnchorButton>
        {sheet?.can.reopen && list.latest ? (
          <Button size="small" onClick={() => setDialog('reopen')}>
            Reopen the sheet
          </Button>
        ) : null}
        <OriginalsButton list={list} />
      </div>
      {dialog === 'names' ? <NamesDialog list={list} onClose={close} /> : null}
      {dialog === 'reopen' && sheet ? <ReopenDialog sheet={sheet} onClose={close} /> : null}
    </div>
  );
}
