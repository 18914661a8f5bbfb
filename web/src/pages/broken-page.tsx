import { useTranslation } from 'react-i18next';
import { useRouteError } from 'react-router-dom';
import { ApiProblem } from '../lib/api.ts';
import { Button } from '../ui/button.tsx';
import { GuestShell } from '../ui/guest-shell.tsx';
import { PageTitle } from '../ui/page-title.tsx';

/** True when a lazy page is gone from the server: a newer build has taken its place. */
function isStaleBuild(error: unknown): boolean {
  return error instanceof TypeError && /dynamically imported module|module script failed/i.test(error.message);
}

/** Shown when a page threw: what happened, and the one thing that helps. */
export function BrokenPage() {
  const { t } = useTranslation();
  const error = useRouteError();
  const stale = isStaleBuild(error);
  return (
    <GuestShell>
      <div className="max-w-xl py-12">
        <PageTitle title={t(stale ? 'page.staleTitle' : 'page.brokenTitle')} />
        <p className="mt-3">{error instanceof ApiProblem ? error.detail : t(stale ? 'page.stale' : 'page.broken')}</p>
        <Button className="mt-6" tone="first" onClick={() => window.location.reload()}>
          {t('ui.reload')}
        </Button>
      </div>
    </GuestShell>
  );
}
