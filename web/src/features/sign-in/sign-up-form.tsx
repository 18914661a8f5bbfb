import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { SignUp } from '../../../../api/contract/sign-in.ts';
import { Button } from '../../ui/button.tsx';
import { FormError, FormField } from './form-field.tsx';
import { landErrors } from './land-errors.ts';
import { PasswordField } from './password-field.tsx';

/** A studio and its owner. The studio's zone is taken from the browser and can be changed later. */
export function SignUpForm({ onSignUp }: { onSignUp: (input: SignUp) => Promise<void> }) {
  const { timeZone } = new Intl.DateTimeFormat().resolvedOptions();
  const form = useForm<z.input<typeof SignUp>, unknown, SignUp>({
    resolver: zodResolver(SignUp),
    defaultValues: { studioName: '', name: '', email: '', password: '', timeZone },
  });
  const submit = form.handleSubmit((input) => onSignUp(input).catch((error: unknown) => landErrors(form, error)));
  return (
    <form noValidate className="grid gap-4" onSubmit={(event) => void submit(event)}>
      <FormError>{form.formState.errors.root?.message}</FormError>
      <FormField
        form={form}
        name="studioName"
        label="Name of the studio"
        hint="Your clients see it on everything you send."
        autoComplete="organization"
      />
      <FormField form={form} name="name" label="Your name" autoComplete="name" />
      <FormField form={form} name="email" label="E-mail address" type="email" autoComplete="username" autoCapitalize="none" />
      <PasswordField form={form} name="password" kind="new" />
      <Button type="submit" tone="first" busy={form.formState.isSubmitting}>
        Create the studio
      </Button>
    </form>
  );
}
