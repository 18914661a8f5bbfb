import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Asked } from '../../../api/contract/guests.ts';
import { Door } from '../features/sign-in/door.tsx';
import { MailSent } from '../features/sign-in/mail-sent.tsx';
import { AskResetForm } from '../features/sign-in/password-forms.tsx';
import { api } from '../lib/api.ts';

export function Component() {
  const [sent, setSent] = useState<{ to: string; says: string }>();
  if (sent) return <MailSent to={sent.to} says={sent.says} />;
  return (
    <Door
      title="Forgotten password"
      lead="We send you a link to choose a new one. It works for an hour."
      foot={
        <p>
          <Link to="/sign-in" className="inline-block py-1.5 underline underline-offset-4">
            Back to sign in
          </Link>
        </p>
      }
    >
      <AskResetForm
        onAsk={async ({ email }) => {
          const { says } = await api.post<Asked>('/api/password-resets', { email });
          setSent({ to: email, says });
        }}
      />
    </Door>
  );
}
