import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useNavigate, useParams } from 'react-router-dom';
import type { Asked, OpenedLink } from '../../../../api/contract/guests.ts';
import { useHandOver } from '../../features/guests/use-hand-over.ts';
import { api, ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { GuestShell } from '../../ui/guest-shell.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { Pending } from '../../ui/pending.tsx';
import { Failure } from '../../ui/query-view.tsx';
import '../../messages/beyond-sheet.ts';

/**
 * Where the link of an e-mail leads. The token is handed over by POST: mail scanners that follow links only fetch this page
 * and begin no session. What was cached for another guest at this browser is forgotten.
 */
export function Component() {
  const { token = '' } = useParams();
  const { t } = useTranslation();
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const open = useMutation({
    mutationFn: () => api.post<OpenedLink>('/api/open', { token }),
    onSuccess: ({ goTo }) => {
      queryClient.clear();
      void navigate(goTo, { replace: true });
    },
  });
  const { mutate } = open;
  useHandOver(token, mutate);

  if (!open.isError) return <Pending what={t('open.opening')} />;
  const error = open.error;
  const isRefusal = error instanceof ApiProblem && [400, 404, 410, 422].includes(error.status);
  return (
    <GuestShell>
      <div className="max-w-xl py-8">
        {isRefusal ? (
          <DeadLink token={token} error={error} />
        ) : (
          <>
            <PageTitle title={t('open.failedTitle')} className="mb-4 text-30" />
            <Failure error={error} onRetry={() => mutate()} />
          </>
        )}
      </div>
    </GuestShell>
  );
}

const TITLES: Record<string, 'replaced' | 'withdrawn' | 'ended'> = { replaced: 'replaced', withdrawn: 'withdrawn', ended: 'ended' };

/** A link that was replaced, taken back, is over or is not known: which of them, and what to do about it. */
function DeadLink({ token, error }: { token: string; error: ApiProblem }) {
  const { t } = useTranslation();
  const renew = useMutation({ mutationFn: () => api.post<Asked>('/api/new-link', { token }) });
  const why = TITLES[error.code ?? ''] ?? 'unknown';
  return (
    <>
      <PageTitle title={t(`open.${why}`)} />
      <p className="mt-3">{error.detail}</p>
      {renew.isSuccess ? (
        <p role="status" className="mt-5 border-l-4 border-verdigris bg-sheet px-4 py-2.5">
          {renew.data.says}
        </p>
      ) : (
        <div className="mt-6 flex flex-wrap gap-3">
          {why === 'replaced' ? (
            <Button tone="first" busy={renew.isPending} onClick={() => renew.mutate()}>
              {t('open.ask')}
            </Button>
          ) : null}
          <LinkButton to="/mine">{t('refused.mine')}</LinkButton>
        </div>
      )}
      {renew.isError ? (
        <p role="alert" className="mt-4 font-bold text-copper">
          {renew.error.message}
        </p>
      ) : null}
    </>
  );
}
