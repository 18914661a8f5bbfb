import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import type { z } from 'zod';
import { JoinStudio, type JoinLink, NewPassword } from '../../../../api/contract/sign-in.ts';
import { Button } from '../../ui/button.tsx';
import { FormError, FormField } from './form-field.tsx';
import { landErrors } from './land-errors.ts';
import { PasswordField } from './password-field.tsx';

const Known = JoinStudio.omit({ token: true });
const Fresh = Known.extend({ password: NewPassword });

/** Name and password of somebody who joins a studio: a new password, or the one their account has. */
export function JoinForm({ link, onJoin }: { link: JoinLink; onJoin: (input: z.output<typeof Known>) => Promise<void> }) {
  const fresh = link.password === 'new';
  const form = useForm<z.input<typeof Known>, unknown, z.output<typeof Known>>({
    resolver: zodResolver(fresh ? Fresh : Known),
    defaultValues: { name: link.name, password: '' },
  });
  const submit = form.handleSubmit((input) => onJoin(input).catch((error: unknown) => landErrors(form, error)));
  return (
    <form noValidate className="grid gap-4" onSubmit={(event) => void submit(event)}>
      <FormError>{form.formState.errors.root?.message}</FormError>
      <div>
        <p className="lettering">E-mail address</p>
        <p className="font-bold wrap-break-word">{link.email}</p>
        <input type="email" autoComplete="username" value={link.email} readOnly hidden />
      </div>
      <FormField form={form} name="name" label="Your name" autoComplete="name" />
      <PasswordField
        form={form}
        name="password"
        kind={fresh ? 'new' : 'present'}
        {...(fresh ? {} : { hint: 'You have an account with this address: type its password.' })}
      />
      <Button type="submit" tone="first" busy={form.formState.isSubmitting}>
        Join {link.studioName}
      </Button>
    </form>
  );
}
