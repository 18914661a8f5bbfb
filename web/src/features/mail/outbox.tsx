import { useInfiniteQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { MailRow } from '../../../../api/contract/mail.ts';
import { formatTime } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { DataTable } from '../../ui/data-table.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { Failure, QueryView } from '../../ui/query-view.tsx';
import { Select } from '../../ui/select.tsx';
import { MailDialog } from './mail-dialog.tsx';
import { MailStateWord } from './mail-state.tsx';
import { type MailFilter, mailsQuery } from './queries.ts';

const CHOICES: { value: MailFilter; words: string }[] = [
  { value: 'all', words: 'All mails' },
  { value: 'open', words: 'To look at' },
  { value: 'waiting', words: 'Waiting' },
  { value: 'sent', words: 'Sent' },
  { value: 'failed', words: 'Failed' },
  { value: 'unsure', words: 'May have gone out' },
  { value: 'withdrawn', words: 'Withdrawn' },
];

interface Props {
  state: MailFilter;
  onState: (state: MailFilter) => void;
}

/** The mails of the studio with their states, newest first. */
export function Outbox({ state, onState }: Props) {
  const mails = useInfiniteQuery(mailsQuery(state));
  const [shown, setShown] = useState<string | null>(null);
  const open = mails.data?.pages[0]?.open ?? 0;
  return (
    <div>
      <div className="mb-3 flex flex-wrap items-center gap-3">
        <label className="flex items-center gap-2">
          <span className="lettering">Show</span>
          <Select scale="small" value={state} choices={CHOICES} onChange={(event) => onState(event.target.value as MailFilter)} />
        </label>
        {open > 0 && state !== 'open' ? (
          <Button size="small" tone="danger" onClick={() => onState('open')}>
            {open === 1 ? '1 mail to look at' : `${open} mails to look at`}
          </Button>
        ) : null}
      </div>
      <QueryView query={mails} isEmpty={({ pages }) => pages[0]?.items.length === 0} empty={<Empty state={state} onState={onState} />}>
        {({ pages }) => <MailsTable mails={pages.flatMap((page) => page.items)} onShow={setShown} />}
      </QueryView>
      {mails.isFetchNextPageError ? <Failure error={mails.error} onRetry={() => void mails.fetchNextPage()} /> : null}
      {mails.hasNextPage && !mails.isFetchNextPageError ? (
        <Button className="mt-4" busy={mails.isFetchingNextPage} onClick={() => void mails.fetchNextPage()}>
          Show older ones
        </Button>
      ) : null}
      {shown ? <MailDialog id={shown} onClose={() => setShown(null)} /> : null}
    </div>
  );
}

function Empty({ state, onState }: Props) {
  if (state === 'all')
    return <EmptyState title="No mails yet">Invitations, links and deliveries that the studio sends stand here.</EmptyState>;
  return <EmptyState title="None of these" action={<Button onClick={() => onState('all')}>Show all mails</Button>} />;
}

function MailsTable({ mails, onShow }: { mails: MailRow[]; onShow: (id: string) => void }) {
  return (
    <DataTable
      caption="Mails"
      rows={mails}
      rowKey={(row) => row.id}
      columns={[
        { key: 'state', words: 'State', width: '120px', cell: (row) => <MailStateWord state={row.state} /> },
        {
          key: 'subject',
          words: 'Mail',
          cell: (row) => (
            <>
              <button type="button" className="target text-left font-bold underline underline-offset-4" onClick={() => onShow(row.id)}>
                {row.subject}
              </button>
              {row.problem && row.state !== 'sent' ? <span className="block max-w-prose text-13 text-copper">{row.problem}</span> : null}
              {row.commission ? (
                <Link
                  to={`/commissions/${row.commission.id}`}
                  className="block w-fit py-0.5 text-13 text-mute underline underline-offset-4"
                >
                  {row.commission.title}
                </Link>
              ) : null}
            </>
          ),
        },
        {
          key: 'to',
          words: 'To',
          width: '30%',
          cell: (row) => (
            <>
              {row.to.name}
              <span className="block text-13 wrap-anywhere text-mute">{row.to.address}</span>
            </>
          ),
        },
        { key: 'when', words: 'When', width: '136px', cell: (row) => formatTime(row.sentAt ?? row.createdAt) },
      ]}
    />
  );
}
