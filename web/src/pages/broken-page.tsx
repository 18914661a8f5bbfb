import { useTranslation } from 'react-i18next';
import { useNavigate, useRouteError } from 'react-router-dom';
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
  const navigate = useNavigate();
  const isGone = isStaleBuild(error);
  // Without a line no page can be fetched, and loading this one again would lose it.
  const kind = isGone ? (navigator.onLine ? 'stale' : 'offline') : 'broken';
  return (
    <GuestShell>
      <div className="max-w-xl py-12">
        <PageTitle title={t(`page.${kind}Title`)} />
        <p className="mt-3">{error instanceof ApiProblem ? error.detail : t(`page.${kind}`)}</p>
        <Button
          className="mt-6"
          tone="first"
          onClick={() => (kind === 'offline' ? void navigate('.', { replace: true }) : window.location.reload())}
        >
          {t(kind === 'offline' ? 'ui.tryAgain' : 'ui.reload')}
        </Button>
      </div>
    </GuestShell>
  );
}
