import type { UseFormReturn } from 'react-hook-form';
import { Field } from '../../ui/field.tsx';
import { TextArea } from '../../ui/text-input.tsx';
import { FormField } from '../sign-in/form-field.tsx';
import type { TypedFields } from './commission-fields.ts';

interface Props {
  form: UseFormReturn<TypedFields>;
  /** False: prices are the owner's, and this person is not. */
  mayPrice: boolean;
}

/** The fields of a commission after its title: dates, allowance, price, brief. */
export function CommissionInputs({ form, mayPrice }: Props) {
  const owner = mayPrice ? {} : { readOnly: true, hint: 'Set by the owner.' };
  return (
    <>
      <div className="grid gap-4 sm:grid-cols-2">
        <FormField form={form} name="shotOn" label="Shoot date (optional)" type="date" />
        <FormField form={form} name="dueOn" label="Due date (optional)" type="date" />
      </div>
      <div className="grid gap-4 sm:grid-cols-3">
        <FormField form={form} name="allowance" label="Allowance" hint="Pictures included." inputMode="numeric" />
        <FormField form={form} name="price" label="Price of an extra" hint="Each picture beyond." inputMode="decimal" {...owner} />
        <FormField form={form} name="currency" label="Currency" hint="Three letters." maxLength={3} {...owner} />
      </div>
      <Field
        label="Brief"
        optional="what the client asked for, in words"
        error={form.getFieldState('brief', form.formState).error?.message}
      >
        {(control) => <TextArea rows={6} {...control} {...form.register('brief')} />}
      </Field>
    </>
  );
}
