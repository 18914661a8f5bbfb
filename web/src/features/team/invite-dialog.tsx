import { zodResolver } from '@hookform/resolvers/zod';
import { useId } from 'react';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { InviteAssistant } from '../../../../api/contract/team.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { FormError, FormField } from '../sign-in/form-field.tsx';
import { landErrors } from '../sign-in/land-errors.ts';

interface Props {
  open: boolean;
  onClose: () => void;
  onInvite: (input: InviteAssistant) => Promise<unknown>;
}

/** Name and address of a new assistant. */
export function InviteDialog({ open, onClose, onInvite }: Props) {
  const id = useId();
  const form = useForm<z.input<typeof InviteAssistant>, unknown, InviteAssistant>({
    resolver: zodResolver(InviteAssistant),
    defaultValues: { name: '', email: '' },
  });
  const close = () => {
    form.reset();
    onClose();
  };
  const submit = form.handleSubmit((input) =>
    onInvite(input)
      .then(close)
      .catch((error: unknown) => landErrors(form, error)),
  );
  return (
    <Dialog
      open={open}
      title="Invite an assistant"
      onClose={close}
      actions={
        <>
          <Button onClick={close}>Cancel</Button>
          <Button type="submit" form={id} tone="first" busy={form.formState.isSubmitting}>
            Send the invitation
          </Button>
        </>
      }
    >
      <form id={id} noValidate className="grid gap-4" onSubmit={(event) => void submit(event)}>
        <FormError>{form.formState.errors.root?.message}</FormError>
        <p className="text-mute">
          Assistants work on frames, proofs, finals and deliveries. They see no money, change no team and delete no commission.
        </p>
        <FormField form={form} name="name" label="Name" autoComplete="off" />
        <FormField
          form={form}
          name="email"
          label="E-mail address"
          type="email"
          autoComplete="off"
          hint="The link in the mail works for seven days."
        />
      </form>
    </Dialog>
  );
}
