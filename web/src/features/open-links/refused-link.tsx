import { useTranslation } from 'react-i18next';
import { ApiProblem } from '../../lib/api.ts';
import { GuestShell } from '../../ui/guest-shell.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { Failure } from '../../ui/query-view.tsx';
import '../../messages/beyond-sheet.ts';

const TITLES: Record<string, 'withdrawn' | 'ended' | 'expired' | 'used'> = {
  withdrawn: 'withdrawn',
  ended: 'ended',
  'link-expired': 'expired',
  'link-used': 'used',
};

/** A link that opens nothing: why, in the server's words, and the way to what is open. */
export function RefusedLink({ error, onRetry }: { error: Error; onRetry: () => void }) {
  const { t } = useTranslation();
  const isRefusal = error instanceof ApiProblem && [400, 403, 404, 410, 422].includes(error.status);
  const title = error instanceof ApiProblem ? TITLES[error.code ?? ''] : undefined;
  return (
    <GuestShell>
      <div className="max-w-xl py-8">
        {isRefusal ? (
          <>
            <PageTitle title={title ? t(`lookLink.${title}`) : t('open.unknown')} />
            <p className="mt-3">{error.detail}</p>
            {title === 'expired' || title === 'used' ? <p className="mt-3">{t('lookLink.again')}</p> : null}
            <LinkButton to="/mine" className="mt-6">
              {t('refused.mine')}
            </LinkButton>
          </>
        ) : (
          <>
            <PageTitle title={t('open.failedTitle')} className="mb-4 text-30" />
            <Failure error={error} onRetry={onRetry} />
          </>
        )}
      </div>
    </GuestShell>
  );
}
