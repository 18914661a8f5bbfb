import { zodResolver } from '@hookform/resolvers/zod';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { AddClient, type ClientDetail } from '../../../../api/contract/clients.ts';
import { api, ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { ChangedMeanwhile } from '../../ui/changed-meanwhile.tsx';
import { Field } from '../../ui/field.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { TextArea } from '../../ui/text-input.tsx';
import { FormError, FormField } from '../sign-in/form-field.tsx';
import { landErrors } from '../sign-in/land-errors.ts';
import { clientKeys, clientQuery } from './queries.ts';

const Fields = z.object({ name: AddClient.shape.name, remarks: AddClient.shape.remarks.removeDefault() });
type Fields = z.infer<typeof Fields>;

/** Name and remarks of a client, saved together. */
export function ClientForm({ client }: { client: ClientDetail }) {
  const queries = useQueryClient();
  const [version, setVersion] = useState(client.version);
  const [newer, setNewer] = useState<ClientDetail | null>(null);
  const form = useForm<Fields>({ resolver: zodResolver(Fields), defaultValues: { name: client.name, remarks: client.remarks } });
  const settle = (saved: ClientDetail) => {
    form.reset({ name: saved.name, remarks: saved.remarks });
    setVersion(saved.version);
    setNewer(null);
  };
  const submit = form.handleSubmit(async (values) => {
    try {
      const saved = await api.patch<ClientDetail>(`/api/clients/${client.id}`, values, { version });
      settle(saved);
      showNotice('Saved.');
      queries.setQueryData(clientQuery(client.id).queryKey, saved);
      void queries.invalidateQueries({ queryKey: [...clientKeys.all, 'list'] });
    } catch (error) {
      if (!(error instanceof ApiProblem) || error.status !== 412) return landErrors(form, error);
      const now = await api.get<ClientDetail>(`/api/clients/${client.id}`);
      setVersion(now.version);
      setNewer(now);
    }
  });
  const typed = form.getValues();
  return (
    <form noValidate className="grid max-w-2xl gap-4" onSubmit={(event) => void submit(event)}>
      <FormError>{form.formState.errors.root?.message}</FormError>
      {newer ? (
        <ChangedMeanwhile
          differences={[
            { label: 'Name', now: newer.name, typed: typed.name },
            { label: 'Remarks', now: newer.remarks, typed: typed.remarks },
          ].filter(({ now, typed: here }) => now !== here)}
          onTakeNewer={() => settle(newer)}
        />
      ) : null}
      <FormField form={form} name="name" label="Name" autoComplete="off" />
      <Field label="Remarks" optional="only the studio sees them" error={form.formState.errors.remarks?.message}>
        {(control) => <TextArea {...control} {...form.register('remarks')} />}
      </Field>
      <div>
        <Button type="submit" busy={form.formState.isSubmitting} disabled={!form.formState.isDirty && !newer}>
          Save
        </Button>
      </div>
    </form>
  );
}
