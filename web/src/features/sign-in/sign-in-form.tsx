import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { SignIn } from '../../../../api/contract/sign-in.ts';
import { Button } from '../../ui/button.tsx';
import { FormError, FormField } from './form-field.tsx';
import { landErrors } from './land-errors.ts';
import { PasswordField } from './password-field.tsx';

/** Address and password. `onSignIn` rejects with what the server said. */
export function SignInForm({ onSignIn }: { onSignIn: (input: SignIn) => Promise<void> }) {
  const form = useForm<z.input<typeof SignIn>, unknown, SignIn>({
    resolver: zodResolver(SignIn),
    defaultValues: { email: '', password: '' },
  });
  const submit = form.handleSubmit((input) => onSignIn(input).catch((error: unknown) => landErrors(form, error)));
  return (
    <form noValidate className="grid gap-4" onSubmit={(event) => void submit(event)}>
      <FormError>{form.formState.errors.root?.message}</FormError>
      <FormField form={form} name="email" label="E-mail address" type="email" autoComplete="username" autoCapitalize="none" />
      <PasswordField form={form} name="password" kind="present" />
      <Button type="submit" tone="first" busy={form.formState.isSubmitting}>
        Sign in
      </Button>
    </form>
  );
}
