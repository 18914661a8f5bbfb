import { useState, type ReactNode } from 'react';
import type { FieldValues, Path, UseFormReturn } from 'react-hook-form';
import { Button } from '../../ui/button.tsx';
import { Field } from '../../ui/field.tsx';
import { TextInput } from '../../ui/text-input.tsx';

interface Props<Values extends FieldValues> {
  form: UseFormReturn<Values>;
  name: Path<Values>;
  label?: string;
  hint?: ReactNode;
  /** new: chosen now; present: typed to be compared. Password managers ask. */
  kind: 'new' | 'present';
}

/** A password, with a button that shows what was typed. Pasting is welcome. */
export function PasswordField<Values extends FieldValues>({ form, name, label = 'Password', hint, kind }: Props<Values>) {
  const [shown, setShown] = useState(false);
  const error = form.getFieldState(name, form.formState).error?.message;
  const usual = kind === 'new' ? 'At least 12 characters. Four or five words that do not belong together make a good one.' : undefined;
  return (
    <Field label={label} hint={hint ?? usual} error={error}>
      {(control) => (
        <div className="flex">
          <TextInput
            {...control}
            {...form.register(name)}
            className="min-w-0 flex-1"
            type={shown ? 'text' : 'password'}
            autoComplete={kind === 'new' ? 'new-password' : 'current-password'}
            autoCapitalize="none"
            spellCheck={false}
          />
          <Button
            className="-ml-px border-grey"
            aria-pressed={shown}
            aria-label={`Show the ${label.toLowerCase()}`}
            onClick={() => setShown(!shown)}
          >
            {shown ? 'Hide' : 'Show'}
          </Button>
        </div>
      )}
    </Field>
  );
}
