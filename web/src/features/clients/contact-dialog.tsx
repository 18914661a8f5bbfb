import { zodResolver } from '@hookform/resolvers/zod';
import { useId, useState } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { AddContact, type ClientDetail, type Contact } from '../../../../api/contract/clients.ts';
import { api, ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { ChangedMeanwhile, type Difference } from '../../ui/changed-meanwhile.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { FormError, FormField } from '../sign-in/form-field.tsx';
import { landErrors } from '../sign-in/land-errors.ts';

interface Props {
  clientId: string;
  /** The contact to change; none adds one. */
  contact: Contact | null;
  onClose: () => void;
  onSaved: () => void;
}

const LABELS = { name: 'Name', email: 'E-mail address', position: 'Position', telephone: 'Telephone' } as const;
type Field = keyof typeof LABELS;
const FIELDS = Object.keys(LABELS) as Field[];

/** Adds or changes a contact. Mounted anew for each one. */
export function ContactDialog({ clientId, contact, onClose, onSaved }: Props) {
  const id = useId();
  const [base, setBase] = useState(contact);
  const [newer, setNewer] = useState<Contact | null>(null);
  const form = useForm<z.input<typeof AddContact>, unknown, AddContact>({
    resolver: zodResolver(AddContact),
    defaultValues: contact ?? { name: '', email: '', position: '', telephone: '' },
  });
  const submit = form.handleSubmit(async (values) => {
    try {
      const path = `/api/clients/${clientId}/contacts`;
      await (base ? api.patch(`${path}/${base.id}`, values, { version: base.version }) : api.post(path, values));
      onSaved();
      onClose();
    } catch (error) {
      if (base && error instanceof ApiProblem && error.status === 412) await showNewer(base.id);
      else landErrors(form, error);
    }
  });
  const showNewer = async (contactId: string) => {
    const client = await api.get<ClientDetail>(`/api/clients/${clientId}`);
    const now = client.contacts.find((each) => each.id === contactId) ?? null;
    setNewer(now);
    setBase(now);
  };
  return (
    <Dialog
      open
      title={contact ? `Change ${contact.name}` : 'Add a contact'}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" form={id} tone="first" busy={form.formState.isSubmitting}>
            {contact ? 'Save' : 'Add contact'}
          </Button>
        </>
      }
    >
      <form id={id} noValidate className="grid gap-4" onSubmit={(event) => void submit(event)}>
        <FormError>{form.formState.errors.root?.message}</FormError>
        {newer ? (
          <ChangedMeanwhile
            differences={differences(newer, form.getValues())}
            onTakeNewer={() => {
              form.reset(newer);
              setNewer(null);
            }}
          />
        ) : null}
        {FIELDS.map((name) => (
          <FormField
            key={name}
            form={form}
            name={name}
            label={LABELS[name]}
            type={name === 'email' ? 'email' : 'text'}
            autoComplete="off"
          />
        ))}
      </form>
    </Dialog>
  );
}

function differences(newer: Contact, typed: z.input<typeof AddContact>): Difference[] {
  return FIELDS.filter((field) => newer[field] !== (typed[field] ?? '')).map((field) => ({
    label: LABELS[field],
    now: newer[field],
    typed: typed[field] ?? '',
  }));
}
