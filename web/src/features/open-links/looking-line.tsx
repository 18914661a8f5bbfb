import { useTranslation } from 'react-i18next';
import type { GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import { Button } from '../../ui/button.tsx';
import '../../messages/beyond-sheet.ts';

/** Tells somebody who looks by the open link that they do, and how to come to mark. */
export default function LookingLine({ sheet, onAsk }: { sheet: GuestSheet; onAsk: () => void }) {
  const { t } = useTranslation();
  return (
    <div className="mt-4 flex flex-wrap items-center justify-between gap-x-6 gap-y-2 border border-ink bg-sheet px-4 py-2.5">
      <p>
        {t('looking.looking')} {t(sheet.can.ask ? 'looking.toMark' : 'looking.over')}
      </p>
      {sheet.can.ask ? (
        <Button size="small" onClick={onAsk}>
          {t('looking.give')}
        </Button>
      ) : null}
    </div>
  );
}
