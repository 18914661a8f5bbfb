import { useTranslation } from 'react-i18next';
import type { GuestDelivery } from '../../../../api/contract/deliveries.ts';
import { formatBytes } from '../../lib/bytes.ts';
import { AnchorButton } from '../../ui/link-button.tsx';

/** Both archives, full resolution first. */
export function EverythingBox({ delivery }: { delivery: GuestDelivery }) {
  const { t } = useTranslation();
  return (
    <section aria-labelledby="everything" className="border border-ink bg-sheet px-4 py-4 md:px-5">
      <h2 id="everything" className="text-17">
        {t('delivery.everything')}
      </h2>
      <ul className="mt-3 grid gap-2">
        {delivery.archives.map((archive) => (
          <li key={archive.kind} className="list-none">
            <AnchorButton href={archive.download} download tone={archive.kind === 'full' ? 'first' : 'plain'} className="w-full">
              <span className="flex w-full justify-between gap-4">
                <span>{t(`delivery.${archive.kind}`, { count: archive.files })}</span> <span>{formatBytes(archive.size)}</span>
              </span>
            </AnchorButton>
            {archive.fetched ? <p className="mt-1 text-13 font-bold text-verdigris">{t('delivery.fetchedArchive')}</p> : null}
          </li>
        ))}
      </ul>
      <p className="mt-3 text-13 text-mute">{t('delivery.goesOn')}</p>
    </section>
  );
}
