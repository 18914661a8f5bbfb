import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { UseFormReturn } from 'react-hook-form';
import { Field } from '../../ui/field.tsx';
import { SearchField } from '../../ui/search-field.tsx';
import { Select } from '../../ui/select.tsx';
import { clientChoicesQuery } from '../clients/queries.ts';
import { FormField } from '../sign-in/form-field.tsx';

export const NEW_CLIENT = 'new';

/** The part of a form that says for whom: a client of the studio, or a new one with a contact. */
export interface ClientFields {
  clientId: string;
  clientName: string;
  contactName: string;
  contactEmail: string;
}

export function ClientChoice({ form }: { form: UseFormReturn<ClientFields> }) {
  const [search, setSearch] = useState('');
  const clients = useQuery(clientChoicesQuery(search));
  const chosen = form.watch('clientId');
  const choices = [
    { value: '', words: clients.isPending ? 'Loading …' : 'Choose the client' },
    ...(clients.data?.items ?? []).map(({ id, name }) => ({ value: id, words: name })),
    { value: NEW_CLIENT, words: 'A new client …' },
  ];
  // What was chosen stays chosen although a search does not show it.
  const kept = chosen && !choices.some(({ value }) => value === chosen) ? [{ value: chosen, words: 'As chosen before' }] : [];
  const many = search !== '' || Boolean(clients.data?.next);
  return (
    <fieldset className="grid gap-4">
      <Field label="Client" error={clients.isError ? clients.error.message : form.formState.errors.clientId?.message}>
        {(control) => (
          <Select
            {...control}
            choices={[...choices, ...kept]}
            value={chosen}
            onChange={(event) =>
              form.setValue('clientId', event.target.value, { shouldDirty: true, shouldValidate: form.formState.isSubmitted })
            }
          />
        )}
      </Field>
      {many ? <SearchField label="Search clients" onSearch={setSearch} /> : null}
      {chosen === NEW_CLIENT ? (
        <>
          <FormField form={form} name="clientName" label="Company" autoComplete="off" />
          <div className="grid gap-4 sm:grid-cols-2">
            <FormField form={form} name="contactName" label="Contact (optional)" autoComplete="off" />
            <FormField form={form} name="contactEmail" label="E-mail address (optional)" type="email" autoComplete="off" />
          </div>
        </>
      ) : null}
    </fieldset>
  );
}
