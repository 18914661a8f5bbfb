import type { Ref, SelectHTMLAttributes } from 'react';
import { joinClasses } from './join-classes.ts';

export interface Choice {
  value: string;
  words: string;
  disabled?: boolean;
}

export interface SelectProps extends SelectHTMLAttributes<HTMLSelectElement> {
  choices: Choice[];
  /** small: in a bar above a list. */
  scale?: 'normal' | 'small';
  ref?: Ref<HTMLSelectElement>;
}

/** The browser's own list of choices. */
export function Select({ choices, scale = 'normal', className, ...rest }: SelectProps) {
  const size = scale === 'small' ? 'h-8 px-2 text-13 font-bold border-ink' : 'h-10 px-3 border-grey';
  return (
    <select {...rest} className={joinClasses('target border bg-sheet text-ink aria-invalid:border-copper', size, className)}>
      {choices.map((choice) => (
        <option key={choice.value} value={choice.value} disabled={choice.disabled}>
          {choice.words}
        </option>
      ))}
    </select>
  );
}
