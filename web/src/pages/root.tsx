import { useTranslation } from 'react-i18next';
import { Outlet, ScrollRestoration } from 'react-router-dom';
import { NoticeRegion } from '../ui/notices.tsx';

/** Around every page: the way past the navigation, and the region in which notices are shown and read out. */
export function Root() {
  const { t } = useTranslation();
  return (
    <>
      <a href="#content" className="sr-only focus:not-sr-only focus:fixed focus:top-2 focus:left-2 focus:z-50 focus:bg-sheet focus:p-3">
        {t('ui.skip')}
      </a>
      <Outlet />
      <NoticeRegion />
      <ScrollRestoration />
    </>
  );
}
