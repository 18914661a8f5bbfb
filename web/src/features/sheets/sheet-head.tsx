import type { StudioSheet } from '../../../../api/contract/sheets.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { Menu, type MenuEntry } from '../../ui/menu.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { InviteDialog } from './invite-dialog.tsx';
import { useRemoveSheet, useSheetDeed } from './mutations.ts';
import { RemindDialog } from './remind-dialog.tsx';
import { ReopenDialog } from './reopen-dialog.tsx';
import { counted, whereItStands } from './sheet-words.ts';
import { WatermarkDialog } from './watermark-dialog.tsx';

export type SheetDialog = 'invite' | 'remind' | 'reopen' | 'watermark' | 'withdraw' | 'remove' | null;

interface Props {
  sheet: StudioSheet;
  clientId: string;
  dialog: SheetDialog;
  onDialog: (dialog: SheetDialog) => void;
}

/** What a sheet is, where it stands, and everything that can be done with it as a whole. */
export function SheetHead({ sheet, clientId, dialog, onDialog }: Props) {
  const waiting = sheet.proofCount - sheet.proofsReady;
  return (
    <div className="flex flex-wrap items-center justify-between gap-x-6 gap-y-3">
      <div>
        <p>
          <b className="text-17">Proof sheet {sheet.number}</b>
          <span className="text-mute"> · {counted(sheet.proofCount, 'proof')}</span>
        </p>
        <p className="text-mute">
          {whereItStands(sheet)}
          {waiting > 0 ? ` Watermarks are being laid: ${sheet.proofsReady} of ${sheet.proofCount}.` : ''}
        </p>
      </div>
      <div className="flex flex-wrap gap-2">
        <LinkButton size="small" to={`/commissions/${sheet.commissionId}/proofs/${sheet.id}/preview`}>
          See it as the client
        </LinkButton>
        <Menu label="More" entries={entriesOf(sheet, onDialog)} />
        <FirstDeed sheet={sheet} onDialog={onDialog} />
      </div>
      <SheetDialogs sheet={sheet} clientId={clientId} dialog={dialog} onClose={() => onDialog(null)} />
    </div>
  );
}

function entriesOf(sheet: StudioSheet, onDialog: Props['onDialog']): MenuEntry[] {
  return [
    { words: 'Watermark …', onChoose: () => onDialog('watermark'), disabled: !sheet.can.edit },
    { words: 'Invite people …', onChoose: () => onDialog('invite'), disabled: !sheet.can.invite },
    { words: 'Remind …', onChoose: () => onDialog('remind'), disabled: sheet.state !== 'Open' },
    ...(sheet.can.remove
      ? [{ words: 'Remove the draft …', onChoose: () => onDialog('remove'), dangerous: true }]
      : [{ words: 'Take the sheet back …', onChoose: () => onDialog('withdraw'), disabled: !sheet.can.withdraw, dangerous: true }]),
  ];
}

/** The one thing that comes next. */
function FirstDeed({ sheet, onDialog }: Pick<Props, 'sheet' | 'onDialog'>) {
  const deed = useSheetDeed(sheet);
  if (sheet.can.issue) {
    return (
      <Button size="small" tone="first" onClick={() => onDialog('invite')}>
        Send to the client
      </Button>
    );
  }
  if (sheet.withdrawnAt) {
    return (
      <Button size="small" tone="first" busy={deed.isPending} onClick={() => deed.mutate({ what: 'restore' })}>
        Put it back
      </Button>
    );
  }
  if (sheet.can.reopen) {
    return (
      <Button size="small" onClick={() => onDialog('reopen')}>
        Reopen the sheet
      </Button>
    );
  }
  if (sheet.state !== 'Open') return null;
  return (
    <Button size="small" tone="first" onClick={() => onDialog('remind')}>
      Remind
    </Button>
  );
}

function SheetDialogs({
  sheet,
  clientId,
  dialog,
  onClose,
}: {
  sheet: StudioSheet;
  clientId: string;
  dialog: SheetDialog;
  onClose: () => void;
}) {
  if (dialog === 'invite') return <InviteDialog sheet={sheet} clientId={clientId} onClose={onClose} />;
  if (dialog === 'remind') return <RemindDialog sheet={sheet} onClose={onClose} />;
  if (dialog === 'reopen') return <ReopenDialog sheet={sheet} onClose={onClose} />;
  if (dialog === 'watermark') return <WatermarkDialog sheet={sheet} onClose={onClose} />;
  if (dialog === 'withdraw') return <WithdrawDialog sheet={sheet} onClose={onClose} />;
  if (dialog === 'remove') return <RemoveDialog sheet={sheet} onClose={onClose} />;
  return null;
}

function WithdrawDialog({ sheet, onClose }: { sheet: StudioSheet; onClose: () => void }) {
  const deed = useSheetDeed(sheet);
  const takeBack = () =>
    deed.mutate(
      { what: 'withdraw' },
      {
        onSuccess: () => {
          onClose();
          showNotice(`Proof sheet ${sheet.number} is taken back.`, { undo: () => deed.mutate({ what: 'restore' }) });
        },
      },
    );
  return (
    <ConfirmDialog
      open
      title="Take the sheet back"
      confirm="Take it back"
      busy={deed.isPending}
      error={deed.error?.message}
      onConfirm={takeBack}
      onClose={onClose}
    >
      Nobody can open proof sheet {sheet.number} any more: {counted(sheet.guestCount, 'person', 'people')} lose it at once. Marks and lists
      that were sent stay, and you can put the sheet back.
    </ConfirmDialog>
  );
}

function RemoveDialog({ sheet, onClose }: { sheet: StudioSheet; onClose: () => void }) {
  const remove = useRemoveSheet(sheet);
  return (
    <ConfirmDialog
      open
      title="Remove the draft"
      confirm="Remove the draft"
      busy={remove.isPending}
      error={remove.error?.message}
      onConfirm={() => remove.mutate()}
      onClose={onClose}
    >
      The order, terms and watermark of proof sheet {sheet.number} go. Its {counted(sheet.proofCount, 'frame')} stay under Frames. This
      cannot be undone.
    </ConfirmDialog>
  );
}
