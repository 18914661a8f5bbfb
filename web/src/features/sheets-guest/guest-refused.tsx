import { useTranslation } from 'react-i18next';
import { ApiProblem } from '../../lib/api.ts';
import { GuestShell } from '../../ui/guest-shell.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { Failure } from '../../ui/query-view.tsx';

const WHY: Record<number, 'noSession' | 'notYours'> = { 401: 'noSession', 403: 'notYours', 404: 'notYours', 410: 'notYours' };

/** In place of a guest's page that does not open: why, and what to do. */
export function GuestRefused({ error, onRetry }: { error: Error; onRetry?: () => void }) {
  const { t } = useTranslation();
  const why = error instanceof ApiProblem ? WHY[error.status] : undefined;
  return (
    <GuestShell>
      <div className="max-w-xl py-8">
        {why ? (
          <>
            <PageTitle title={t(`refused.${why}Title`)} />
            <p className="mt-3">{(error as ApiProblem).code === 'look' ? error.message : t(`refused.${why}`)}</p>
            {why === 'notYours' ? (
              <LinkButton to="/mine" className="mt-6">
                {t('refused.mine')}
              </LinkButton>
            ) : null}
          </>
        ) : (
          <>
            <PageTitle title={t('refused.title')} hidden />
            <Failure error={error} {...(onRetry ? { onRetry } : {})} />
          </>
        )}
      </div>
    </GuestShell>
  );
}
