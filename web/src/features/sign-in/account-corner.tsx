import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import type { Me } from '../../../../api/contract/sign-in.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { startOver } from './start-over.ts';

/** Who is signed in, for which studio, and the way out. */
export function AccountCorner({ me }: { me: Me }) {
  const queries = useQueryClient();
  const navigate = useNavigate();
  const signOut = useMutation({
    mutationFn: () => api.post('/api/sign-out'),
    onSuccess: async () => {
      await navigate('/sign-in');
      startOver(queries);
    },
    onError: (error) => showNotice(error.message, { tone: 'problem' }),
  });
  return (
    <div className="flex flex-wrap items-center gap-x-3 gap-y-1 md:block">
      <p className="font-bold wrap-break-word text-ink max-md:hidden">{me.studio.name}</p>
      <p className="wrap-break-word max-md:hidden">{me.account.name}</p>
      {me.mailsPage ? (
        <p className="md:mt-2">
          <a href={me.mailsPage} className="target inline-flex items-center underline underline-offset-4" target="_blank" rel="noreferrer">
            Mails of the demo
          </a>
        </p>
      ) : null}
      <Button size="small" className="md:mt-2" busy={signOut.isPending} onClick={() => signOut.mutate()}>
        Sign out
      </Button>
    </div>
  );
}
