import { useTranslation } from 'react-i18next';
import { GuestShell } from '../ui/guest-shell.tsx';
import { LinkButton } from '../ui/link-button.tsx';
import { PageTitle } from '../ui/page-title.tsx';

/** For an address that leads nowhere. */
export function NotFoundPage() {
  const { t } = useTranslation();
  return (
    <GuestShell>
      <div className="max-w-xl py-12">
        <PageTitle title={t('page.notFoundTitle')} />
        <p className="mt-3">{t('page.notFound')}</p>
        <p className="mt-1 text-mute">{t('page.notFoundWhat')}</p>
        <LinkButton className="mt-6" to="/">
          {t('page.start')}
        </LinkButton>
      </div>
    </GuestShell>
  );
}
