import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import type { Asked } from '../../../api/contract/guests.ts';
import type { Me } from '../../../api/contract/sign-in.ts';
import { Door } from '../features/sign-in/door.tsx';
import { LinkEnded } from '../features/sign-in/link-ended.tsx';
import { OnePasswordForm } from '../features/sign-in/password-forms.tsx';
import { linkQuery } from '../features/sign-in/queries.ts';
import { startOver } from '../features/sign-in/start-over.ts';
import { api, ApiProblem } from '../lib/api.ts';
import { Button } from '../ui/button.tsx';
import { LinkButton } from '../ui/link-button.tsx';
import { Pending } from '../ui/pending.tsx';

export function Component() {
  const { token = '' } = useParams();
  const queries = useQueryClient();
  const navigate = useNavigate();
  const link = useQuery(linkQuery('confirm-email', token));
  if (link.isPending) return <Pending />;
  if (link.isError) {
    const expired = link.error instanceof ApiProblem && link.error.code === 'link-expired';
    return (
      <LinkEnded error={link.error} onRetry={() => void link.refetch()}>
        {expired ? <AskAgain token={token} /> : <LinkButton to="/sign-in">Go to sign in</LinkButton>}
      </LinkEnded>
    );
  }
  const confirm = async (password: string) => {
    const me = await api.post<Me>('/api/confirm-email', { token, password });
    startOver(queries, me);
    await navigate('/desk', { replace: true });
  };
  return (
    <Door
      title="Confirm your address"
      lead={`The last step for ${link.data.studioName}.`}
      foot={
        <p>
          <Link to="/reset-password" className="inline-block py-1.5 underline underline-offset-4">
            Forgotten the password you chose?
          </Link>
        </p>
      }
    >
      <OnePasswordForm
        email={link.data.email}
        kind="present"
        label="The password you chose"
        action="Confirm and go to the desk"
        onPassword={confirm}
      />
    </Door>
  );
}

function AskAgain({ token }: { token: string }) {
  const ask = useMutation({ mutationFn: () => api.post<Asked>('/api/confirm-email/again', { token }) });
  if (ask.data) return <p role="status">{ask.data.says}</p>;
  return (
    <>
      <Button tone="first" busy={ask.isPending} onClick={() => ask.mutate()}>
        Send me a new link
      </Button>
      {ask.error ? <p role="alert">{ask.error.message}</p> : null}
    </>
  );
}
