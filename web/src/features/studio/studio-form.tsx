import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { ChangeStudio, type Currency, type StudioSettings } from '../../../../api/contract/studios.ts';
import { Button } from '../../ui/button.tsx';
import { Field } from '../../ui/field.tsx';
import { Select } from '../../ui/select.tsx';
import { FormError, FormField } from '../sign-in/form-field.tsx';
import { landErrors } from '../sign-in/land-errors.ts';
import { timeZones } from './time-zones.ts';

interface Props {
  studio: StudioSettings;
  currencies: Currency[];
  /** Saves and gives the settings as they then are; rejects with what the server said. */
  onSave: (change: ChangeStudio, version: number) => Promise<StudioSettings>;
}

const valuesOf = ({ name, replyTo, timeZone, currency }: StudioSettings) => ({ name, replyTo, timeZone, currency });

/** Name, addresses, zone and currency. Read by everybody of the studio, changed by its owner. */
export function StudioForm({ studio, currencies, onSave }: Props) {
  const form = useForm<z.input<typeof ChangeStudio>, unknown, ChangeStudio>({
    resolver: zodResolver(ChangeStudio),
    defaultValues: valuesOf(studio),
  });
  // The version that was read with what stands in the fields: data that arrives later must not lend its own.
  const [version, setVersion] = useState(studio.version);
  const fixed = !studio.can.change;
  const submit = form.handleSubmit((input) =>
    onSave(input, version)
      .then((saved) => {
        setVersion(saved.version);
        form.reset(valuesOf(saved));
      })
      .catch((error: unknown) => landErrors(form, error)),
  );
  return (
    <form noValidate className="grid max-w-xl gap-4" onSubmit={(event) => void submit(event)}>
      <FormError>{form.formState.errors.root?.message}</FormError>
      <FormField form={form} name="name" label="Name" hint="Your clients see it on sheets, deliveries and mails." readOnly={fixed} />
      <FormField
        form={form}
        name="replyTo"
        label="Reply address"
        hint="Answers to the studio's mails go there."
        type="email"
        readOnly={fixed}
      />
      <Field label="Time zone" hint="A last date ends at midnight there." error={form.formState.errors.timeZone?.message}>
        {(control) => (
          <Select
            {...control}
            {...form.register('timeZone')}
            disabled={fixed}
            choices={timeZones(studio.timeZone).map((zone) => ({ value: zone, words: zone.replaceAll('_', ' ') }))}
          />
        )}
      </Field>
      <Field label="Currency" hint="For new commissions; those that are there keep theirs." error={form.formState.errors.currency?.message}>
        {(control) => (
          <Select
            {...control}
            {...form.register('currency')}
            disabled={fixed}
            choices={currencies.map(({ code, name }) => ({ value: code, words: `${code}, ${name}` }))}
          />
        )}
      </Field>
      {fixed ? (
        <p className="text-mute">Only the owner of the studio changes these.</p>
      ) : (
        <Button type="submit" tone="first" className="justify-self-start" busy={form.formState.isSubmitting}>
          Save
        </Button>
      )}
    </form>
  );
}
