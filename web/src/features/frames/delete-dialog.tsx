import { useState } from 'react';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { counted } from '../uploads/upload-words.ts';

const NAMED = 5;

interface Props {
  open: boolean;
  frames: readonly FrameItem[];
  onDelete: () => Promise<void>;
  onClose: () => void;
}

/** Asks before frames are deleted, and names them. */
export function DeleteDialog({ open, frames, onDelete, onClose }: Props) {
  const [busy, setBusy] = useState(false);
  const what = counted(frames.length, { one: 'frame', many: 'frames' });
  const rest = frames.length - NAMED;
  const confirm = async () => {
    setBusy(true);
    await onDelete();
    setBusy(false);
    onClose();
  };
  return (
    <ConfirmDialog
      open={open}
      title={`Delete ${what}?`}
      confirm={`Delete ${what}`}
      busy={busy}
      onClose={onClose}
      onConfirm={() => void confirm()}
    >
      <p className="wrap-break-word">
        {frames
          .slice(0, NAMED)
          .map((frame) => frame.name)
          .join(', ')}
        {rest > 0 ? ` and ${rest} more` : ''}
      </p>
      <p className="mt-2">The files that were uploaded go too. For 30 days they can be brought back; frames that are on a sheet stay.</p>
    </ConfirmDialog>
  );
}
