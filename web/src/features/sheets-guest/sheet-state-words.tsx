import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import type { GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import { formatDay, formatTimeWithZone } from '../../lib/dates.ts';

/** What the state of a sheet means for the guest who looks at it; nothing while it is simply open. */
export function SheetStateWords({ sheet }: { sheet: GuestSheet }) {
  const { t } = useTranslation();
  const { studio, lastPickList, reopened } = sheet;
  if (sheet.state === 'Sent' && lastPickList) {
    return (
      <Words settled>
        <b>{t('sheet.sentTitle', { number: lastPickList.number })}</b>{' '}
        {t('sheet.sentWords', {
          by: lastPickList.sentBy,
          day: formatDay(lastPickList.sentAt, studio.timeZone),
          picks: t('counts.picks', { count: lastPickList.picks }),
          studio: studio.name,
        })}{' '}
        <WriteTo sheet={sheet} />
      </Words>
    );
  }
  if (sheet.state === 'Ended') {
    return (
      <Words>
        <b>{t('sheet.endedTitle')}</b>{' '}
        {sheet.endsAt ? t('sheet.endedWords', { moment: formatTimeWithZone(sheet.endsAt, studio.timeZone) }) : t('sheet.takenBack')}{' '}
        <WriteTo sheet={sheet} />
      </Words>
    );
  }
  if (sheet.state === 'Open' && reopened && lastPickList) {
    return (
      <Words>
        <b>{t('sheet.reopenedTitle', { day: formatDay(reopened.at, studio.timeZone) })}</b> “{reopened.reason}”{' '}
        {t('sheet.reopenedWords', { number: lastPickList.number })}
      </Words>
    );
  }
  return null;
}

function Words({ settled, children }: { settled?: boolean; children: ReactNode }) {
  return <div className={`mt-4 border-l-4 bg-sheet px-4 py-2.5 ${settled ? 'border-verdigris' : 'border-copper'}`}>{children}</div>;
}

function WriteTo({ sheet }: { sheet: GuestSheet }) {
  const { t } = useTranslation();
  return (
    <a href={`mailto:${sheet.studio.replyTo}`} className="underline underline-offset-2">
      {t('sheet.writeTo', { studio: sheet.studio.name })}
    </a>
  );
}
