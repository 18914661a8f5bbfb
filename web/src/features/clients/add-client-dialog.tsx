import { zodResolver } from '@hookform/resolvers/zod';
import { useId } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { AddClient, AddContact, type ClientDetail } from '../../../../api/contract/clients.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { FormError, FormField } from '../sign-in/form-field.tsx';
import { landErrors } from '../sign-in/land-errors.ts';

/** A client and its first contact; the contact may be left out, but then wholly. */
const Fields = z
  .object({ name: AddClient.shape.name, contactName: z.string().trim().max(120), contactEmail: z.string().trim() })
  .superRefine(({ contactName, contactEmail }, check) => {
    if (!contactName && !contactEmail) return;
    const wrong = AddContact.safeParse({ name: contactName, email: contactEmail }).error?.issues ?? [];
    for (const { path, message } of wrong) {
      check.addIssue({ code: 'custom', path: [path[0] === 'email' ? 'contactEmail' : 'contactName'], message });
    }
  });
type Fields = z.infer<typeof Fields>;

interface Props {
  open: boolean;
  onClose: () => void;
  onAdded: (client: ClientDetail) => void;
}

export function AddClientDialog({ open, onClose, onAdded }: Props) {
  const id = useId();
  const form = useForm<Fields>({ resolver: zodResolver(Fields), defaultValues: { name: '', contactName: '', contactEmail: '' } });
  const close = () => {
    form.reset();
    onClose();
  };
  const submit = form.handleSubmit(async ({ name, contactName, contactEmail }) => {
    const contacts = contactName ? [{ name: contactName, email: contactEmail }] : [];
    try {
      const client = await api.post<ClientDetail>('/api/clients', { name, contacts });
      close();
      onAdded(client);
    } catch (error) {
      landErrors(form, error);
    }
  });
  return (
    <Dialog
      open={open}
      title="Add a client"
      onClose={close}
      actions={
        <>
          <Button onClick={close}>Cancel</Button>
          <Button type="submit" form={id} tone="first" busy={form.formState.isSubmitting}>
            Add client
          </Button>
        </>
      }
    >
      <form id={id} noValidate className="grid gap-4" onSubmit={(event) => void submit(event)}>
        <FormError>{form.formState.errors.root?.message}</FormError>
        <FormField form={form} name="name" label="Company" autoComplete="off" />
        <FormField form={form} name="contactName" label="Contact (optional)" autoComplete="off" />
        <FormField form={form} name="contactEmail" label="E-mail address of the contact (optional)" type="email" autoComplete="off" />
      </form>
    </Dialog>
  );
}
