import { useEffect, useState } from 'react';
import { useTranslation } from 'react-i18next';

/** Says "Loading" after a third of a second; what comes sooner should not flicker. */
export function Pending({ what }: { what?: string }) {
  const { t } = useTranslation();
  const [shown, setShown] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setShown(true), 300);
    return () => clearTimeout(timer);
  }, []);
  return (
    <div role="status" className="min-h-24 p-6 text-mute">
      {shown ? (what ?? t('ui.loading')) : ''}
    </div>
  );
}
