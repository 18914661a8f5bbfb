import type { ButtonHTMLAttributes, Ref } from 'react';
import { joinClasses } from './join-classes.ts';

/** first: the one action of a page; plain: the others; quiet: without a frame; picked: a pick; danger: what cannot be taken back. */
export type ButtonTone = 'first' | 'plain' | 'quiet' | 'picked' | 'danger';
export type ButtonSize = 'normal' | 'small';

const TONES: Record<ButtonTone, string> = {
  first: 'border-ink bg-ink text-sheet hover:bg-mute hover:border-mute',
  plain: 'border-ink bg-sheet text-ink hover:bg-hair',
  quiet: 'border-transparent bg-transparent text-ink underline underline-offset-4 hover:bg-hair',
  picked: 'border-copper bg-copper-soft text-copper hover:bg-sheet',
  danger: 'border-copper bg-sheet text-copper hover:bg-copper-soft',
};

const SIZES: Record<ButtonSize, string> = { normal: 'h-10 px-4 text-15', small: 'h-8 px-3 text-13' };

/** The classes of a button, for links that look like one. */
export function buttonClasses(tone: ButtonTone = 'plain', size: ButtonSize = 'normal', more?: string): string {
  return joinClasses(
    'inline-flex items-center justify-center gap-2 border font-bold whitespace-nowrap no-underline select-none',
    'target disabled:cursor-default disabled:border-line disabled:bg-paper disabled:text-mute',
    TONES[tone],
    SIZES[size],
    more,
  );
}

export interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  tone?: ButtonTone;
  size?: ButtonSize;
  /** While true the button says that it is at work and ignores further presses, but keeps the focus. */
  busy?: boolean;
  ref?: Ref<HTMLButtonElement>;
}

export function Button({ tone, size, busy = false, className, onClick, type = 'button', children, ...rest }: ButtonProps) {
  return (
    <button
      {...rest}
      type={type}
      aria-disabled={busy || rest['aria-disabled'] || undefined}
      aria-busy={busy || undefined}
      className={joinClasses(buttonClasses(tone, size), busy && 'cursor-progress opacity-70', className)}
      onClick={(event) => {
        if (busy) event.preventDefault();
        else onClick?.(event);
      }}
    >
      {children}
    </button>
  );
}
