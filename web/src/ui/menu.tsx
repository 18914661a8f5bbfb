import { useId, useRef, type ReactNode } from 'react';
import { buttonClasses, type ButtonSize } from './button.tsx';
import { joinClasses } from './join-classes.ts';

export interface MenuEntry {
  words: string;
  onChoose: () => void;
  disabled?: boolean;
  /** For a choice among several: which one holds now. */
  chosen?: boolean;
  dangerous?: boolean;
}

interface Props {
  /** What the button says. */
  label: ReactNode;
  entries: MenuEntry[];
  size?: ButtonSize;
  className?: string;
  align?: 'left' | 'right';
}

/** A button with a list of actions below it, in the browser's own popover: Escape and a press outside close it. */
export function Menu({ label, entries, size = 'small', className, align = 'right' }: Props) {
  const id = useId();
  const list = useRef<HTMLDivElement>(null);
  const button = useRef<HTMLButtonElement>(null);

  const place = () => {
    const box = button.current?.getBoundingClientRect();
    const element = list.current;
    if (!box || !element) return;
    const left = align === 'right' ? box.right - element.offsetWidth : box.left;
    const below = box.bottom + 4;
    const fits = below + element.offsetHeight <= window.innerHeight;
    element.style.left = `${Math.max(8, Math.min(left, window.innerWidth - element.offsetWidth - 8))}px`;
    element.style.top = `${fits ? below : Math.max(8, box.top - element.offsetHeight - 4)}px`;
  };

  const step = (event: React.KeyboardEvent) => {
    const items = [...(list.current?.querySelectorAll<HTMLButtonElement>('button:not(:disabled)') ?? [])];
    const at = items.indexOf(document.activeElement as HTMLButtonElement);
    const moves: Record<string, number> = { ArrowDown: at + 1, ArrowUp: at - 1, Home: 0, End: items.length - 1 };
    const next = moves[event.key];
    if (next === undefined) return;
    event.preventDefault();
    event.stopPropagation();
    items[(next + items.length) % items.length]?.focus();
  };

  return (
    <>
      <button ref={button} type="button" popoverTarget={id} aria-haspopup="true" className={buttonClasses('plain', size, className)}>
        {label}
        <svg width="8" height="5" viewBox="0 0 8 5" aria-hidden="true">
          <path d="M0 0H8L4 5Z" fill="currentColor" />
        </svg>
      </button>
      <div
        ref={list}
        id={id}
        popover="auto"
        className="fixed inset-auto m-0 min-w-40 border border-ink bg-sheet p-0 text-ink"
        onToggle={(event) => {
          if (event.newState !== 'open') return;
          place();
          (list.current?.querySelector<HTMLButtonElement>('[aria-current=true]') ?? list.current?.querySelector('button'))?.focus();
        }}
        onKeyDown={step}
      >
        {entries.map((entry) => (
          <button
            key={entry.words}
            type="button"
            disabled={entry.disabled}
            aria-current={entry.chosen || undefined}
            className={joinClasses(
              'target flex w-full items-center gap-2 px-3 py-1 text-left -outline-offset-2 hover:bg-hair focus-visible:shadow-none disabled:text-mute',
              entry.dangerous && 'font-bold text-copper',
            )}
            onClick={() => {
              list.current?.hidePopover();
              entry.onChoose();
            }}
          >
            {entries.some((other) => other.chosen !== undefined) ? (
              <span aria-hidden="true" className="w-3">
                {entry.chosen ? '✓' : ''}
              </span>
            ) : null}
            {entry.words}
          </button>
        ))}
      </div>
    </>
  );
}
