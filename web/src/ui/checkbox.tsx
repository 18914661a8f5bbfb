import type { InputHTMLAttributes, ReactNode, Ref } from 'react';
import { joinClasses } from './join-classes.ts';

interface Props extends InputHTMLAttributes<HTMLInputElement> {
  label: ReactNode;
  hint?: ReactNode;
  /** A radio button of a group with the same `name`. */
  kind?: 'checkbox' | 'radio';
  ref?: Ref<HTMLInputElement>;
}

/** A box, or a radio button, whose words are its target too. */
export function Checkbox({ label, hint, kind = 'checkbox', className, ...rest }: Props) {
  return (
    <label className={joinClasses('target flex items-start gap-2.5 py-1', className)}>
      <input {...rest} type={kind} className="mt-0.5 size-[18px] shrink-0" />
      <span>
        {label}
        {hint ? <span className="block text-13 text-mute">{hint}</span> : null}
      </span>
    </label>
  );
}
