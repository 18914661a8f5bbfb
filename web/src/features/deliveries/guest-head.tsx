import { useTranslation } from 'react-i18next';
import type { GuestDelivery } from '../../../../api/contract/deliveries.ts';
import { formatDay } from '../../lib/dates.ts';
import { PageTitle } from '../../ui/page-title.tsx';
import { TitleBlock } from '../../ui/title-block.tsx';

/** The title block of a delivery. The page's heading is the commission in it. */
export function GuestHead({ delivery }: { delivery: GuestDelivery }) {
  const { t } = useTranslation();
  const title = (
    <PageTitle title={delivery.commission} where={delivery.studio.name} className="text-15">
      {delivery.commission}
    </PageTitle>
  );
  return (
    <TitleBlock
      cells={[
        { label: t('sheet.commission'), value: title, share: 2.2 },
        { label: t('sheet.client'), value: delivery.client, share: 1.6 },
        { label: t('delivery.number'), value: delivery.number },
        { label: t('delivery.delivered'), value: formatDay(delivery.sentAt, delivery.studio.timeZone) },
        { label: t('delivery.fetchBy'), value: formatDay(delivery.fetchBy) },
      ]}
    />
  );
}
