import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Link, useParams } from 'react-router-dom';
import type { GuestDelivery } from '../../../../api/contract/deliveries.ts';
import { EverythingBox } from '../../features/deliveries/everything-box.tsx';
import { CAPTION_HEIGHT, GuestFileTile } from '../../features/deliveries/guest-file.tsx';
import { GuestHead } from '../../features/deliveries/guest-head.tsx';
import { GuestLook } from '../../features/deliveries/guest-look.tsx';
import { guestDeliveryQuery } from '../../features/deliveries/guest-queries.ts';
import { GuestRefused } from '../../features/sheets-guest/guest-refused.tsx';
import { formatTimeWithZone } from '../../lib/dates.ts';
import { GuestShell } from '../../ui/guest-shell.tsx';
import { JustifiedRows } from '../../ui/justified-rows.tsx';
import { Pending } from '../../ui/pending.tsx';
import '../../messages/beyond-sheet.ts';

/** A delivery as its recipient sees it: the pictures without watermark, and everything to download. */
export function Component() {
  const { deliveryId = '' } = useParams();
  const query = useQuery(guestDeliveryQuery(deliveryId));
  if (query.data) return <DeliveryView delivery={query.data} onPictureFailed={() => void query.refetch()} />;
  if (query.error) return <GuestRefused error={query.error} onRetry={() => void query.refetch()} />;
  return <Pending />;
}

function DeliveryView({ delivery, onPictureFailed }: { delivery: GuestDelivery; onPictureFailed: () => void }) {
  const { t } = useTranslation();
  const aside = (
    <Link to="/mine" className="target flex min-w-0 items-center underline-offset-4 hover:underline">
      <span className="truncate">{t('delivery.for', { name: delivery.recipient })}</span>
    </Link>
  );
  return (
    <GuestShell studio={delivery.studio.name} aside={aside}>
      <GuestHead delivery={delivery} />
      {delivery.state === 'Ended' ? <Ended delivery={delivery} /> : <Content delivery={delivery} onPictureFailed={onPictureFailed} />}
    </GuestShell>
  );
}

/** After the last date: no pictures, only whom to ask. */
function Ended({ delivery }: { delivery: GuestDelivery }) {
  const { t } = useTranslation();
  const { name, replyTo, timeZone } = delivery.studio;
  const subject = encodeURIComponent(t('delivery.askSubject', { number: delivery.number, title: delivery.commission }));
  return (
    <section aria-labelledby="ended" className="mt-5 max-w-2xl border border-ink bg-sheet px-5 py-6">
      <h2 id="ended" className="text-22">
        {t('delivery.endedTitle')}
      </h2>
      <p className="mt-2">{t('delivery.ended', { when: formatTimeWithZone(delivery.endsAt, timeZone), studio: name })}</p>
      <p className="mt-4">
        <a
          className="target inline-block font-bold wrap-anywhere underline underline-offset-4"
          href={`mailto:${replyTo}?subject=${subject}`}
        >
          {t('delivery.ask', { studio: name, address: replyTo })}
        </a>
      </p>
    </section>
  );
}

/** Pictures of a row on a desktop are as high as this; on a phone each has a row of its own. */
const ROW_HEIGHT = 260;
const STACK_BELOW = 560;

function Content({ delivery, onPictureFailed }: { delivery: GuestDelivery; onPictureFailed: () => void }) {
  const { t } = useTranslation();
  const [looking, setLooking] = useState<number | null>(null);
  return (
    <div className="mt-5 grid gap-6 pb-10 lg:grid-cols-[minmax(0,1fr)_340px] lg:gap-8">
      <div className="grid content-start gap-5 lg:order-last">
        {delivery.words ? (
          <blockquote className="border-l-2 border-ink pl-3 whitespace-pre-wrap">
            {delivery.words}
            <footer className="text-mute">{delivery.studio.name}</footer>
          </blockquote>
        ) : null}
        <EverythingBox delivery={delivery} />
      </div>
      <section aria-label={t('delivery.pictures')} className="min-w-0">
        <JustifiedRows
          pictures={delivery.files}
          keyOf={(file) => file.id}
          rowHeight={ROW_HEIGHT}
          captionHeight={CAPTION_HEIGHT}
          stackBelow={STACK_BELOW}
        >
          {(file, index, box) => (
            <GuestFileTile file={file} box={box} first={index < 3} onLook={() => setLooking(index)} onFailed={onPictureFailed} />
          )}
        </JustifiedRows>
      </section>
      {looking === null ? null : (
        <GuestLook files={delivery.files} uses={delivery.uses} at={looking} onMove={setLooking} onClose={() => setLooking(null)} />
      )}
    </div>
  );
}
