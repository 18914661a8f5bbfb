import type { InputHTMLAttributes, Ref, TextareaHTMLAttributes } from 'react';
import { joinClasses } from './join-classes.ts';

const FRAME =
  'w-full border border-grey bg-sheet px-3 text-ink placeholder:text-mute aria-invalid:border-2 aria-invalid:border-copper disabled:bg-paper disabled:text-mute read-only:bg-paper';

export type TextInputProps = InputHTMLAttributes<HTMLInputElement> & { ref?: Ref<HTMLInputElement> };

/** One line of text, of any of the browser's types (email, password, date, number …). */
export function TextInput({ className, type = 'text', ...rest }: TextInputProps) {
  return <input {...rest} type={type} className={joinClasses(FRAME, 'target h-10', className)} />;
}

export type TextAreaProps = TextareaHTMLAttributes<HTMLTextAreaElement> & { ref?: Ref<HTMLTextAreaElement> };

/** Several lines of text; grows with its content where the browser can. */
export function TextArea({ className, rows = 4, ...rest }: TextAreaProps) {
  return <textarea {...rest} rows={rows} className={joinClasses(FRAME, 'min-h-20 py-2 [field-sizing:content]', className)} />;
}
