import { useEffect, useId, useRef, type ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from './button.tsx';
import { joinClasses } from './join-classes.ts';

interface Props {
  open: boolean;
  /** Called for Escape, the close button and a press outside. */
  onClose: () => void;
  title: string;
  children: ReactNode;
  /** The row of buttons at the lower edge. */
  actions?: ReactNode;
  wide?: boolean;
}

/**
 * The browser's own modal dialog: it keeps the focus inside and closes on Escape. The focus goes back to where it was
 * when the dialog closes, also when it closes because its data changed.
 */
export function Dialog({ open, onClose, title, children, actions, wide }: Props) {
  const { t } = useTranslation();
  const id = useId();
  const dialog = useRef<HTMLDialogElement>(null);
  const before = useRef<Element | null>(null);

  useEffect(() => {
    const element = dialog.current;
    if (!element || !open) return;
    before.current = document.activeElement;
    element.showModal();
    return () => {
      element.close();
      if (before.current instanceof HTMLElement && before.current.isConnected) before.current.focus();
    };
  }, [open]);

  if (!open) return null;
  return (
    <dialog
      ref={dialog}
      aria-labelledby={id}
      className={joinClasses(
        'm-auto max-h-[90dvh] w-[calc(100vw-32px)] border border-ink bg-sheet p-0 text-ink backdrop:bg-black/50',
        wide ? 'max-w-3xl' : 'max-w-lg',
      )}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      onClick={(event) => {
        if (event.target === dialog.current) onClose();
      }}
    >
      <div className="flex items-center justify-between gap-4 border-b border-line px-5 py-2">
        <h2 id={id} className="text-17">
          {title}
        </h2>
        <Button size="small" tone="quiet" className="-mr-3" onClick={onClose}>
          {t('ui.close')}
        </Button>
      </div>
      <div className="px-5 py-4">{children}</div>
      {actions ? <div className="flex flex-wrap justify-end gap-2 border-t border-line px-5 py-3">{actions}</div> : null}
    </dialog>
  );
}
