import { useId, type ReactNode } from 'react';
import { joinClasses } from './join-classes.ts';

/** What a control inside a field must carry. */
export interface FieldProps {
  id: string;
  'aria-describedby': string | undefined;
  'aria-invalid': true | undefined;
}

interface Props {
  label: string;
  /** A sentence below the label that helps to answer. */
  hint?: ReactNode;
  /** What is wrong, in a sentence; announced when it appears. */
  error?: string | undefined;
  /** The word after the label of a field that may stay empty. */
  optional?: string | undefined;
  className?: string;
  children: (control: FieldProps) => ReactNode;
}

/** A label, a hint, a control and its error, tied together for screen readers. */
export function Field({ label, hint, error, optional, className, children }: Props) {
  const id = useId();
  const described = [hint ? `${id}-hint` : '', error ? `${id}-error` : ''].filter(Boolean).join(' ');
  return (
    <div className={joinClasses('grid content-start gap-1', className)}>
      <label htmlFor={id} className="font-bold">
        {label} {optional ? <span className="font-normal text-mute">({optional})</span> : null}
      </label>
      {hint ? (
        <p id={`${id}-hint`} className="text-13 text-mute">
          {hint}
        </p>
      ) : null}
      {children({ id, 'aria-describedby': described || undefined, 'aria-invalid': error ? true : undefined })}
      <p id={`${id}-error`} role="alert" className={joinClasses('text-13 font-bold text-copper', !error && 'hidden')}>
        {error}
      </p>
    </div>
  );
}
