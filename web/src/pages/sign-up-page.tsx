import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Asked } from '../../../api/contract/guests.ts';
import { Door } from '../features/sign-in/door.tsx';
import { MailSent } from '../features/sign-in/mail-sent.tsx';
import { SignUpForm } from '../features/sign-in/sign-up-form.tsx';
import { api } from '../lib/api.ts';

export function Component() {
  const [sent, setSent] = useState<{ to: string; says: string }>();
  if (sent) return <MailSent to={sent.to} says={sent.says} />;
  return (
    <Door
      title="Sign up a studio"
      lead="You become its owner; assistants are invited later."
      foot={
        <p>
          Signed up already?{' '}
          <Link to="/sign-in" className="inline-block py-1.5 underline underline-offset-4">
            Sign in
          </Link>
        </p>
      }
    >
      <SignUpForm
        onSignUp={async (input) => {
          const { says } = await api.post<Asked>('/api/sign-up', input);
          setSent({ to: input.email, says });
        }}
      />
    </Door>
  );
}
