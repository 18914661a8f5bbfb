import { useEffect, useRef, type KeyboardEvent, type ReactNode } from 'react';

interface Props {
  label: string;
  className: string;
  onClose: () => void;
  onKeyDown: (event: KeyboardEvent) => void;
  onKeyUp: (event: KeyboardEvent) => void;
  children: ReactNode;
}

/** The browser's modal dialog over the whole window: what lies below keeps its place and its selection. */
export function FullWindow({ label, className, onClose, onKeyDown, onKeyUp, children }: Props) {
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => {
    const element = dialog.current;
    element?.showModal();
    // The first button would be lit up otherwise, as if it were to be pressed.
    element?.focus();
    return () => element?.close();
  }, []);
  return (
    <dialog
      ref={dialog}
      aria-label={label}
      tabIndex={-1}
      className={`m-0 h-dvh max-h-none w-dvw max-w-none border-0 p-0 open:flex open:flex-col ${className}`}
      onCancel={(event) => {
        // A file chooser, menu or dialog within tells of its own end in the same way.
        if (event.target !== dialog.current) return;
        event.preventDefault();
        onClose();
      }}
      onKeyDown={onKeyDown}
      onKeyUp={onKeyUp}
    >
      {children}
    </dialog>
  );
}
