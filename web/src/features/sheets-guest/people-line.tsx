import { lazy, Suspense, useState } from 'react';
import { useTranslation } from 'react-i18next';
import type { GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import { Button } from '../../ui/button.tsx';

const InviteDialog = lazy(() => import('../guests/invite-dialog.tsx'));

/** As many names as are read at a glance; the rest is counted. */
const NAMED = 6;

/** Who chooses on this sheet, and the lead's way to let somebody else look. */
export function PeopleLine({ sheet }: { sheet: GuestSheet }) {
  const { t } = useTranslation();
  const [inviting, setInviting] = useState(false);
  const rest = sheet.people.length - NAMED;
  const names = sheet.people
    .slice(0, NAMED)
    .map(({ name, role }) => (role === 'lead' ? t('people.lead', { name }) : name))
    .join(', ');
  return (
    <div className="mt-1 flex flex-wrap items-center gap-x-3 text-13 text-mute">
      <p>
        {t('people.choosing', { names })}
        {rest > 0 ? ` ${t('people.more', { count: rest })}` : ''}
      </p>
      {sheet.can.invite ? (
        <Button size="small" tone="quiet" className="-ml-2" onClick={() => setInviting(true)}>
          {t('people.invite')}
        </Button>
      ) : null}
      {inviting ? (
        <Suspense>
          <InviteDialog sheet={sheet} onClose={() => setInviting(false)} />
        </Suspense>
      ) : null}
    </div>
  );
}
