import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import { Door } from '../features/sign-in/door.tsx';
import { LinkEnded } from '../features/sign-in/link-ended.tsx';
import { OnePasswordForm } from '../features/sign-in/password-forms.tsx';
import { linkQuery } from '../features/sign-in/queries.ts';
import { startOver } from '../features/sign-in/start-over.ts';
import { api } from '../lib/api.ts';
import { LinkButton } from '../ui/link-button.tsx';
import { Pending } from '../ui/pending.tsx';

export function Component() {
  const { token = '' } = useParams();
  const queries = useQueryClient();
  const navigate = useNavigate();
  const link = useQuery(linkQuery('password-resets', token));
  if (link.isPending) return <Pending />;
  if (link.isError) {
    return (
      <LinkEnded error={link.error} onRetry={() => void link.refetch()}>
        <LinkButton to="/reset-password">Ask for a new link</LinkButton>
      </LinkEnded>
    );
  }
  const finish = async (password: string) => {
    await api.post('/api/password-resets/finish', { token, password });
    startOver(queries);
    await navigate('/sign-in', { replace: true, state: { says: 'The new password counts from now on. You are signed out everywhere.' } });
  };
  return (
    <Door title="Choose a new password" lead="You are then signed out everywhere.">
      <OnePasswordForm email={link.data.email} kind="new" label="New password" action="Set the new password" onPassword={finish} />
    </Door>
  );
}
