import { zodResolver } from '@hookform/resolvers/zod';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { useNavigate } from 'react-router-dom';
import type { z } from 'zod';
import { ChangeMe, ChangePassword, type Me } from '../../../../api/contract/sign-in.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Checkbox } from '../../ui/checkbox.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { FormError, FormField } from './form-field.tsx';
import { landErrors } from './land-errors.ts';
import { PasswordField } from './password-field.tsx';
import { meKey } from './queries.ts';
import { startOver } from './start-over.ts';

/** The own account: name, shortcuts, password, and the ways out. */
export function AccountPanel({ me }: { me: Me }) {
  return (
    <div className="grid gap-8">
      <OwnName me={me} />
      <OwnPassword email={me.account.email} />
      <WaysOut me={me} />
    </div>
  );
}

function OwnName({ me }: { me: Me }) {
  const queries = useQueryClient();
  const form = useForm<z.input<typeof ChangeMe>, unknown, ChangeMe>({
    resolver: zodResolver(ChangeMe),
    defaultValues: { name: me.account.name, shortcuts: me.account.shortcuts },
  });
  const patch = useMutation({ mutationFn: (change: ChangeMe) => api.patch<Me>('/api/me', change) });
  const save = async (change: ChangeMe) => {
    queries.setQueryData(meKey, await patch.mutateAsync(change));
    showNotice('Saved.');
  };
  const submit = form.handleSubmit((change) => save(change).catch((error: unknown) => landErrors(form, error)));
  return (
    <form noValidate className="grid max-w-xl gap-4" onSubmit={(event) => void submit(event)}>
      <FormError>{form.formState.errors.root?.message}</FormError>
      <div>
        <p className="lettering">E-mail address</p>
        <p className="font-bold wrap-break-word">{me.account.email}</p>
      </div>
      <FormField form={form} name="name" label="Your name" autoComplete="name" />
      <Checkbox {...form.register('shortcuts')} label="Single keys act on pages" hint="Arrows and Enter work in any case." />
      <Button type="submit" className="justify-self-start" busy={form.formState.isSubmitting}>
        Save
      </Button>
    </form>
  );
}

function OwnPassword({ email }: { email: string }) {
  const form = useForm<z.input<typeof ChangePassword>, unknown, ChangePassword>({
    resolver: zodResolver(ChangePassword),
    defaultValues: { current: '', password: '' },
  });
  const put = useMutation({ mutationFn: (input: ChangePassword) => api.put('/api/me/password', input) });
  const change = async (input: ChangePassword) => {
    await put.mutateAsync(input);
    form.reset();
    showNotice('The new password counts from now on. Other browsers were signed out.');
  };
  const submit = form.handleSubmit((input) => change(input).catch((error: unknown) => landErrors(form, error)));
  return (
    <form noValidate className="grid max-w-xl gap-4" onSubmit={(event) => void submit(event)}>
      <h2 className="text-17">Change the password</h2>
      <FormError>{form.formState.errors.root?.message}</FormError>
      <input type="email" autoComplete="username" value={email} readOnly hidden />
      <PasswordField form={form} name="current" label="Present password" kind="present" />
      <PasswordField form={form} name="password" label="New password" kind="new" />
      <Button type="submit" className="justify-self-start" busy={form.formState.isSubmitting}>
        Change the password
      </Button>
    </form>
  );
}

function WaysOut({ me }: { me: Me }) {
  const queries = useQueryClient();
  const navigate = useNavigate();
  const [asks, setAsks] = useState<'everywhere' | 'leave' | null>(null);
  const go = useMutation({
    mutationFn: () => api.post(asks === 'leave' ? '/api/team/leave' : '/api/sign-out-everywhere'),
    onSuccess: async () => {
      await navigate('/sign-in');
      startOver(queries);
    },
  });
  return (
    <div className="flex flex-wrap gap-2">
      <Button onClick={() => setAsks('everywhere')}>Sign out everywhere</Button>
      {me.can.leave ? (
        <Button tone="danger" onClick={() => setAsks('leave')}>
          Leave {me.studio.name}
        </Button>
      ) : null}
      <ConfirmDialog
        open={asks !== null}
        title={asks === 'leave' ? `Leave ${me.studio.name}?` : 'Sign out everywhere?'}
        confirm={asks === 'leave' ? 'Leave the studio' : 'Sign out everywhere'}
        dangerous={asks === 'leave'}
        busy={go.isPending}
        error={go.error?.message}
        onConfirm={() => go.mutate()}
        onClose={() => setAsks(null)}
      >
        {asks === 'leave'
          ? 'You can see nothing of it any more, in this moment. What you did stays in the record. Only the owner can invite you again.'
          : 'Every browser, this one too, has to sign in again; so do sheets and deliveries that you opened as a guest.'}
      </ConfirmDialog>
    </div>
  );
}
