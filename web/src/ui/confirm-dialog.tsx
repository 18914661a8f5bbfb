import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from './button.tsx';
import { Dialog } from './dialog.tsx';

interface Props {
  open: boolean;
  title: string;
  /** What goes, by name and number, and whether it can come back. */
  children: ReactNode;
  /** The verb on the button: "Delete 12 frames", never "OK". */
  confirm: string;
  busy?: boolean;
  /** What went wrong with the last try. */
  error?: string | undefined;
  /** False for a step that is serious but takes nothing away. */
  dangerous?: boolean;
  onConfirm: () => void;
  onClose: () => void;
}

/** Asks before something goes. The way out has the focus first. */
export function ConfirmDialog({ open, title, children, confirm, busy, error, dangerous = true, onConfirm, onClose }: Props) {
  const { t } = useTranslation();
  return (
    <Dialog
      open={open}
      title={title}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose} autoFocus>
            {t('ui.cancel')}
          </Button>
          <Button tone={dangerous ? 'danger' : 'first'} busy={busy ?? false} onClick={onConfirm}>
            {confirm}
          </Button>
        </>
      }
    >
      {children}
      {error ? (
        <p role="alert" className="mt-3 font-bold text-copper">
          {error}
        </p>
      ) : null}
    </Dialog>
  );
}
