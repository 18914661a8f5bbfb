import type { TFunction } from 'i18next';
import { useTranslation } from 'react-i18next';
import type { GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import { daysLeft, formatDay, formatTimeWithZone } from '../../lib/dates.ts';
import { formatPrice } from '../../lib/money.ts';
import { DimensionLine } from '../../ui/dimension-line.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { TitleBlock } from '../../ui/title-block.tsx';
import { PeopleLine } from './people-line.tsx';

interface Props {
  sheet: GuestSheet;
  picked: number;
  /** False where the page puts the focus on a proof itself. */
  takesFocus: boolean;
}

/** The title block of a sheet and, below it, its allowance as a dimension line and the people who choose. */
export function SheetHead({ sheet, picked, takesFocus }: Props) {
  const { t } = useTranslation();
  const { timeZone, name } = sheet.studio;
  const title = (
    <PageTitle title={sheet.commission.title} where={name} takesFocus={takesFocus} className="text-15">
      {sheet.commission.title}
    </PageTitle>
  );
  return (
    <>
      <TitleBlock
        cells={[
          { label: t('sheet.commission'), value: title, share: 2.2 },
          { label: t('sheet.client'), value: sheet.commission.client, share: 1.6, wideOnly: true },
          { label: t('sheet.sheet'), value: t('sheet.numberOf', { number: sheet.number, of: sheet.of }) },
          { label: t('sheet.issued'), value: sheet.issuedAt ? formatDay(sheet.issuedAt, timeZone) : '–', wideOnly: true },
          { label: t('sheet.chooseBy'), value: <LastDay sheet={sheet} /> },
          { label: t('sheet.proofs'), value: sheet.proofCount.toLocaleString('en-GB') },
        ]}
      />
      <DimensionLine
        className="mt-4"
        picked={picked}
        included={sheet.allowance}
        price={sheet.extraPrice > 0 ? formatPrice(sheet.extraPrice, sheet.currency) : null}
      />
      <PeopleLine sheet={sheet} />
    </>
  );
}

/** How near the end is, in words; nothing while it is further than a week or choosing is over. */
function nearness(t: TFunction, { state, endsAt }: GuestSheet): string {
  if (state !== 'Open' || !endsAt) return '';
  const left = daysLeft(endsAt);
  if (left > 7) return '';
  return left <= 1 ? t('sheet.lastDay') : t('sheet.daysLeft', { count: left });
}

function LastDay({ sheet }: { sheet: GuestSheet }) {
  const { t } = useTranslation();
  if (!sheet.endsAt && !sheet.chooseBy) return t('sheet.noLastDay');
  const near = nearness(t, sheet);
  const moment = sheet.endsAt ? formatTimeWithZone(sheet.endsAt, sheet.studio.timeZone) : undefined;
  return (
    <span title={moment}>
      {formatDay(sheet.chooseBy ?? sheet.endsAt ?? '', sheet.studio.timeZone)}
      {near ? <span className="block text-13 text-copper">{near}</span> : null}
    </span>
  );
}
