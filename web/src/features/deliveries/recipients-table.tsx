import type { FetchState, RecipientItem, StudioDelivery } from '../../../../api/contract/deliveries.ts';
import { formatBytes } from '../../lib/bytes.ts';
import { formatTime } from '../../lib/dates.ts';
import { type Column, DataTable } from '../../ui/data-table.tsx';
import { Menu, type MenuEntry } from '../../ui/menu.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { useDeliveryDeed } from './mutations.ts';

interface Props {
  commissionId: string;
  delivery: StudioDelivery;
}

/** Each recipient: whether the mail went out, whether they looked, what they have and what they have not. */
export function RecipientsTable({ commissionId, delivery }: Props) {
  const size = (kind: 'full' | 'web') => delivery.archives.find((archive) => archive.kind === kind)?.size ?? 0;
  const columns: Column<RecipientItem>[] = [
    { key: 'name', words: 'Recipient', width: '26%', cell: (one) => <Person recipient={one} /> },
    { key: 'opened', words: 'Opened', width: '18%', cell: (one) => <Opened recipient={one} /> },
    { key: 'full', words: 'Everything, full', width: '18%', cell: (one) => <Fetched state={one.full} size={size('full')} /> },
    { key: 'web', words: 'Everything, web size', width: '18%', cell: (one) => <Fetched state={one.web} size={size('web')} /> },
    { key: 'files', words: 'Files', cell: (one) => <Files recipient={one} delivery={delivery} /> },
    {
      key: 'change',
      words: 'Change',
      align: 'right',
      width: '110px',
      cell: (one) => <RecipientMenu commissionId={commissionId} delivery={delivery} recipient={one} />,
    },
  ];
  const caption = `Recipients of delivery ${delivery.number}`;
  return <DataTable caption={caption} columns={columns} rows={delivery.recipients} rowKey={(one) => one.id} />;
}

function Person({ recipient }: { recipient: RecipientItem }) {
  return (
    <>
      <b className={recipient.withdrawnAt ? 'text-mute line-through' : ''}>{recipient.name}</b>
      <span className="block min-w-44 text-13 wrap-anywhere text-mute">{recipient.email}</span>
    </>
  );
}

const MAILS: Record<string, string> = {
  waiting: 'mail on its way',
  'handing-over': 'mail on its way',
  failed: 'the mail failed',
  unsure: 'the mail may not have gone out',
  withdrawn: 'the mail was taken back',
};

function Opened({ recipient }: { recipient: RecipientItem }) {
  if (recipient.withdrawnAt) return <span className="text-mute">taken off</span>;
  if (recipient.firstOpenedAt) return <span>{formatTime(recipient.lastSeenAt ?? recipient.firstOpenedAt)}</span>;
  const mail = recipient.mail ? MAILS[recipient.mail] : undefined;
  const bad = recipient.mail === 'failed' || recipient.mail === 'unsure';
  return <span className={bad ? 'font-bold text-copper' : 'text-mute'}>{mail ?? 'not yet'}</span>;
}

function Fetched({ state, size }: { state: FetchState | null; size: number }) {
  if (!state) return <span className="text-mute">not yet</span>;
  if (!state.finished) {
    return (
      <span className="text-copper">
        <b>broken off</b> at {formatBytes(state.sent)} of {formatBytes(size)}
      </span>
    );
  }
  return (
    <span className="text-verdigris">
      <b>fetched</b> {formatTime(state.lastAt)}
    </span>
  );
}

function Files({ recipient, delivery }: { recipient: RecipientItem; delivery: StudioDelivery }) {
  const missing = delivery.files.filter((file) => !recipient.full?.finished && !recipient.files[file.id]?.finished);
  const all = delivery.files.length;
  const tone = recipient.filesFetched === all ? 'font-bold text-verdigris' : recipient.filesFetched === 0 ? 'text-mute' : '';
  const words = `${recipient.filesFetched} of ${all}`;
  if (missing.length === 0 || missing.length === all) return <span className={tone}>{words}</span>;
  return (
    <details>
      <summary className={`target ${tone}`}>{words}</summary>
      <ul className="mt-1 text-13 text-mute">
        {missing.map((file) => (
          <li key={file.id} className="list-none break-all">
            not {file.name}
          </li>
        ))}
      </ul>
    </details>
  );
}

function RecipientMenu({ commissionId, delivery, recipient }: Props & { recipient: RecipientItem }) {
  const deeds = useDeliveryDeed(commissionId);
  const act = (what: 'send-again' | 'withdraw-recipient' | 'restore-recipient', said: string) =>
    deeds.mutate(
      { what, delivery, recipientId: recipient.id },
      { onSuccess: () => showNotice(said), onError: (error) => showNotice(error.message, { tone: 'problem' }) },
    );
  if (delivery.withdrawnAt) return null;
  const sendAgain: MenuEntry = {
    words: 'Send a new link',
    disabled: delivery.state !== 'Sent',
    onChoose: () => act('send-again', `A new link goes to ${recipient.name}; the one before works no more.`),
  };
  const entries: MenuEntry[] = recipient.withdrawnAt
    ? [{ words: 'Give it back', onChoose: () => act('restore-recipient', `${recipient.name} can open the delivery again.`) }]
    : [
        sendAgain,
        {
          words: 'Take it back',
          dangerous: true,
          onChoose: () => act('withdraw-recipient', `${recipient.name} can no longer open the delivery. You can give it back.`),
        },
      ];
  return <Menu label="Change" entries={entries} />;
}
