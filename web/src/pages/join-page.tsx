import { useQuery, useQueryClient } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import type { Me } from '../../../api/contract/sign-in.ts';
import { Door } from '../features/sign-in/door.tsx';
import { JoinForm } from '../features/sign-in/join-form.tsx';
import { LinkEnded } from '../features/sign-in/link-ended.tsx';
import { linkQuery } from '../features/sign-in/queries.ts';
import { startOver } from '../features/sign-in/start-over.ts';
import { api } from '../lib/api.ts';
import { LinkButton } from '../ui/link-button.tsx';
import { Pending } from '../ui/pending.tsx';

export function Component() {
  const { token = '' } = useParams();
  const queries = useQueryClient();
  const navigate = useNavigate();
  const link = useQuery(linkQuery('join', token));
  if (link.isPending) return <Pending />;
  if (link.isError) {
    return (
      <LinkEnded error={link.error} onRetry={() => void link.refetch()}>
        <p className="text-mute">Ask the person who invited you to send the invitation again.</p>
        <LinkButton to="/sign-in">Go to sign in</LinkButton>
      </LinkEnded>
    );
  }
  return (
    <Door
      title={`Join ${link.data.studioName}`}
      lead="As an assistant: frames, proof sheets, finals and deliveries."
      foot={
        link.data.password === 'known' ? (
          <p>
            <Link to="/reset-password" className="inline-block py-1.5 underline underline-offset-4">
              Forgotten your password?
            </Link>
          </p>
        ) : null
      }
    >
      <JoinForm
        link={link.data}
        onJoin={async (input) => {
          const me = await api.post<Me>('/api/join', { token, ...input });
          startOver(queries, me);
          await navigate('/desk', { replace: true });
        }}
      />
    </Door>
  );
}
