import { zodResolver } from '@hookform/resolvers/zod';
import { useEffect } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import type { StudioSheet } from '../../../../api/contract/sheets.ts';
import { moneyAsDecimal, parseMoney } from '../../../../api/domain/money.ts';
import { ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Field } from '../../ui/field.tsx';
import { TextInput } from '../../ui/text-input.tsx';
import { useSheetDeed } from './mutations.ts';

const termsOf = (currency: string) =>
  z.object({
    chooseBy: z.string().refine((day) => day === '' || /^\d{4}-\d{2}-\d{2}$/.test(day), 'Write the day as day, month and year.'),
    allowance: z.coerce
      .number('Write a number.')
      .int('A whole number, please.')
      .min(0, 'Not less than none.')
      .max(10_000, 'At most 10 000.'),
    price: z.string().refine((text) => parseMoney(text, currency) !== null, `Write an amount in ${currency}, such as 85 or 85.50.`),
  });
type Terms = z.input<ReturnType<typeof termsOf>>;

const valuesOf = (sheet: StudioSheet): Terms => ({
  chooseBy: sheet.chooseBy ?? '',
  allowance: sheet.allowance,
  price: moneyAsDecimal({ minor: sheet.extraPrice, currency: sheet.currency }),
});

/** Last date, allowance and the price of an extra. */
export function SheetTerms({ sheet }: { sheet: StudioSheet }) {
  const deed = useSheetDeed(sheet);
  const form = useForm<Terms, unknown, z.output<ReturnType<typeof termsOf>>>({
    resolver: zodResolver(termsOf(sheet.currency)),
    defaultValues: valuesOf(sheet),
  });
  const { errors, isDirty } = form.formState;
  const { reset } = form;
  useEffect(() => {
    // What is being typed is never overwritten by what arrives.
    if (!isDirty) reset(valuesOf(sheet));
  }, [sheet, isDirty, reset]);

  const save = form.handleSubmit((terms) =>
    deed
      .mutateAsync({
        what: 'change',
        version: sheet.version,
        input: { chooseBy: terms.chooseBy || null, allowance: terms.allowance, extraPrice: parseMoney(terms.price, sheet.currency) ?? 0 },
      })
      .then(
        (saved) => reset(valuesOf(saved)),
        (error: unknown) => {
          const fields = error instanceof ApiProblem ? error.errors : [];
          for (const field of fields)
            form.setError(field.path === 'extraPrice' ? 'price' : (field.path as keyof Terms), { message: field.message });
          if (fields.length === 0) form.setError('root', { message: error instanceof Error ? error.message : 'This could not be saved.' });
        },
      ),
  );

  const locked = !sheet.can.edit;
  return (
    <form className="grid gap-4" onSubmit={(event) => void save(event)} noValidate>
      <Field label="Choose by" hint="The last day, in your studio’s time zone." error={errors.chooseBy?.message}>
        {(control) => <TextInput {...control} type="date" disabled={locked} {...form.register('chooseBy')} />}
      </Field>
      <div className="grid grid-cols-2 gap-4">
        <Field label="Included picks" error={errors.allowance?.message}>
          {(control) => <TextInput {...control} inputMode="numeric" disabled={locked} {...form.register('allowance')} />}
        </Field>
        <Field label={`Each further, ${sheet.currency}`} error={errors.price?.message}>
          {(control) => (
            <TextInput {...control} inputMode="decimal" readOnly={!sheet.can.price} disabled={locked} {...form.register('price')} />
          )}
        </Field>
      </div>
      {errors.root ? (
        <p role="alert" className="font-bold text-copper">
          {errors.root.message}
        </p>
      ) : null}
      {locked ? null : (
        <div className="flex gap-2">
          <Button type="submit" disabled={!isDirty} busy={deed.isPending}>
            Save terms
          </Button>
          {isDirty ? (
            <Button tone="quiet" onClick={() => reset(valuesOf(sheet))}>
              Leave as it was
            </Button>
          ) : null}
        </div>
      )}
    </form>
  );
}
