import type { ReactNode } from 'react';
import type { FieldValues, Path, UseFormReturn } from 'react-hook-form';
import { Field } from '../../ui/field.tsx';
import { TextInput, type TextInputProps } from '../../ui/text-input.tsx';

interface Props<Values extends FieldValues> extends Omit<TextInputProps, 'form' | 'name' | 'ref'> {
  form: UseFormReturn<Values>;
  name: Path<Values>;
  label: string;
  hint?: ReactNode;
}

/** A line of text of a form, with the sentence of what is wrong with it. */
export function FormField<Values extends FieldValues>({ form, name, label, hint, className, ...input }: Props<Values>) {
  const error = form.getFieldState(name, form.formState).error?.message;
  return (
    <Field label={label} hint={hint} error={error} {...(className ? { className } : {})}>
      {(control) => <TextInput {...input} {...control} {...form.register(name)} />}
    </Field>
  );
}

/** What is wrong with the form as a whole. */
export function FormError({ children }: { children: ReactNode }) {
  if (!children) return null;
  return (
    <p role="alert" className="border border-copper px-4 py-3 font-bold text-copper">
      {children}
    </p>
  );
}
