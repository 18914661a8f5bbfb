import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { AskPasswordReset, ConfirmEmail, FinishPasswordReset } from '../../../../api/contract/sign-in.ts';
import { Button } from '../../ui/button.tsx';
import { FormError, FormField } from './form-field.tsx';
import { landErrors } from './land-errors.ts';
import { PasswordField } from './password-field.tsx';

/** Asks for a mail with a link to choose a new password. */
export function AskResetForm({ onAsk }: { onAsk: (input: AskPasswordReset) => Promise<void> }) {
  const form = useForm<z.input<typeof AskPasswordReset>, unknown, AskPasswordReset>({
    resolver: zodResolver(AskPasswordReset),
    defaultValues: { email: '' },
  });
  const submit = form.handleSubmit((input) => onAsk(input).catch((error: unknown) => landErrors(form, error)));
  return (
    <form noValidate className="grid gap-4" onSubmit={(event) => void submit(event)}>
      <FormError>{form.formState.errors.root?.message}</FormError>
      <FormField form={form} name="email" label="E-mail address" type="email" autoComplete="username" autoCapitalize="none" />
      <Button type="submit" tone="first" busy={form.formState.isSubmitting}>
        Send me a link
      </Button>
    </form>
  );
}

const Chosen = FinishPasswordReset.pick({ password: true });
const Typed = ConfirmEmail.pick({ password: true });

interface OnePasswordProps {
  /** Shown and handed to password managers, which file the password under it. */
  email: string;
  /** new: checked as a new password; present: as it was typed. */
  kind: 'new' | 'present';
  label?: string;
  action: string;
  onPassword: (password: string) => Promise<void>;
}

/** One password for a known address: a new one, or the one that was chosen before. */
export function OnePasswordForm({ email, kind, label, action, onPassword }: OnePasswordProps) {
  const form = useForm<z.input<typeof Typed>, unknown, z.output<typeof Typed>>({
    resolver: zodResolver(kind === 'new' ? Chosen : Typed),
    defaultValues: { password: '' },
  });
  const submit = form.handleSubmit(({ password }) => onPassword(password).catch((error: unknown) => landErrors(form, error)));
  return (
    <form noValidate className="grid gap-4" onSubmit={(event) => void submit(event)}>
      <FormError>{form.formState.errors.root?.message}</FormError>
      <div>
        <p className="lettering">E-mail address</p>
        <p className="font-bold wrap-break-word">{email}</p>
        <input type="email" autoComplete="username" value={email} readOnly hidden />
      </div>
      <PasswordField form={form} name="password" kind={kind} {...(label ? { label } : {})} />
      <Button type="submit" tone="first" busy={form.formState.isSubmitting}>
        {action}
      </Button>
    </form>
  );
}
