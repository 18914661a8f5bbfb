import { useState } from 'react';
import type { ArchiveState, DeliveryState, KnownPerson, StudioDelivery } from '../../../../api/contract/deliveries.ts';
import { formatBytes } from '../../lib/bytes.ts';
import { formatDay, formatTime } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { ProgressBar } from '../../ui/progress-bar.tsx';
import { TitleBlock } from '../../ui/title-block.tsx';
import { Thumb } from '../finals/thumb.tsx';
import { AddRecipientsDialog, ExtendDialog } from './delivery-dialogs.tsx';
import { useDeliveryDeed } from './mutations.ts';
import { RecipientsTable } from './recipients-table.tsx';

interface Props {
  commissionId: string;
  delivery: StudioDelivery;
  people: readonly KnownPerson[];
}

const TONES: Record<DeliveryState, string> = {
  Preparing: '',
  Failed: 'text-copper',
  Sent: 'text-verdigris',
  Ended: 'text-mute',
  Withdrawn: 'text-copper',
};

/** One delivery: its figures, its pictures, how far it is, and what each recipient has fetched. */
export function DeliveryBlock({ commissionId, delivery, people }: Props) {
  const heading = `delivery-${delivery.number}`;
  const count = delivery.files.length;
  return (
    <section aria-labelledby={heading}>
      <TitleBlock
        cells={[
          { label: 'Delivery', value: <h2 id={heading}>{delivery.number}</h2> },
          { label: 'State', value: <span className={TONES[delivery.state]}>{delivery.state}</span> },
          { label: 'Files', value: `${count}, ${formatBytes(delivery.bytes)}`, share: 1.4 },
          { label: delivery.sentAt ? 'Sent' : 'Made', value: formatTime(delivery.sentAt ?? delivery.createdAt), share: 1.6 },
          { label: 'Fetch by', value: formatDay(delivery.fetchBy), share: 1.4 },
        ]}
      >
        <div className="grid gap-4 border-t border-line px-3.5 py-3.5">
          <Building commissionId={commissionId} delivery={delivery} />
          {delivery.words ? <blockquote className="border-l-2 border-ink pl-3 whitespace-pre-wrap">{delivery.words}</blockquote> : null}
          <Pictures delivery={delivery} />
          <RecipientsTable commissionId={commissionId} delivery={delivery} />
          <Actions commissionId={commissionId} delivery={delivery} people={people} />
        </div>
      </TitleBlock>
    </section>
  );
}

const ARCHIVES: Record<ArchiveState['kind'], string> = { full: 'full resolution', web: 'web size', picks: 'originals' };

function Building({ commissionId, delivery }: Omit<Props, 'people'>) {
  const deeds = useDeliveryDeed(commissionId);
  if (delivery.sentAt || delivery.withdrawnAt) return null;
  return (
    <div className="grid gap-3">
      {delivery.archives.map((archive) =>
        archive.state === 'failed' ? (
          <p key={archive.kind} role="alert" className="font-bold text-copper">
            The archive in {ARCHIVES[archive.kind]} failed. {archive.problem}
          </p>
        ) : (
          <ProgressBar
            key={archive.kind}
            label={`${archive.state === 'ready' ? 'Built' : 'Building'} the archive in ${ARCHIVES[archive.kind]}`}
            part={archive.state === 'ready' ? 1 : archive.size ? archive.written / archive.size : null}
            bytes={archive.size ? { done: archive.written, total: archive.size } : undefined}
          />
        ),
      )}
      {delivery.can.retry ? (
        <div>
          <Button size="small" busy={deeds.isPending} onClick={() => deeds.mutate({ what: 'retry', delivery })}>
            Build again
          </Button>
        </div>
      ) : (
        <p className="text-13 text-mute">You can leave this page. The e-mails go out when both are built.</p>
      )}
    </div>
  );
}

const SHOWN = 12;

function Pictures({ delivery }: { delivery: StudioDelivery }) {
  const more = delivery.files.length - SHOWN;
  return (
    <div className="flex flex-wrap items-end gap-2">
      {delivery.files.slice(0, SHOWN).map((file) => (
        <Thumb key={file.id} {...file} alt={file.title} box={{ width: 96, height: 64 }} />
      ))}
      {more > 0 ? <span className="text-13 text-mute">and {more} more</span> : null}
    </div>
  );
}

function Actions({ commissionId, delivery, people }: Props) {
  const [open, setOpen] = useState<'extend' | 'add' | 'withdraw' | null>(null);
  const deeds = useDeliveryDeed(commissionId);
  const close = () => setOpen(null);
  const restore = () => deeds.mutate({ what: 'restore', delivery }, { onError: (error) => showNotice(error.message, { tone: 'problem' }) });
  const withdraw = () =>
    deeds.mutate(
      { what: 'withdraw', delivery },
      {
        onSuccess: () => {
          close();
          showNotice(`Delivery ${delivery.number} is withdrawn.`, { undo: restore });
        },
      },
    );
  const { can } = delivery;
  return (
    <div className="flex flex-wrap gap-2">
      {can.invite ? (
        <Button size="small" onClick={() => setOpen('add')}>
          Add people
        </Button>
      ) : null}
      {can.extend ? (
        <Button size="small" onClick={() => setOpen('extend')}>
          Change the last date
        </Button>
      ) : null}
      {can.withdraw ? (
        <Button size="small" tone="danger" onClick={() => setOpen('withdraw')}>
          Withdraw
        </Button>
      ) : null}
      {can.restore ? (
        <Button size="small" busy={deeds.isPending} onClick={restore}>
          Give it back
        </Button>
      ) : null}
      {open === 'extend' ? <ExtendDialog commissionId={commissionId} delivery={delivery} onClose={close} /> : null}
      {open === 'add' ? <AddRecipientsDialog commissionId={commissionId} delivery={delivery} people={people} onClose={close} /> : null}
      <ConfirmDialog
        open={open === 'withdraw'}
        title={`Withdraw delivery ${delivery.number}?`}
        confirm="Withdraw it from everybody"
        busy={deeds.isPending}
        error={deeds.error?.message}
        onConfirm={withdraw}
        onClose={close}
      >
        Nobody can open or download it from then on, and its links say so. What was fetched already stays with your client. You can give it
        back later.
      </ConfirmDialog>
    </div>
  );
}
