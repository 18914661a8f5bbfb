import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import type { GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import { api } from '../../lib/api.ts';
import { Checkbox } from '../../ui/checkbox.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { sheetKeys } from '../sheets-guest/queries.ts';

interface Props {
  sheet: GuestSheet;
  open: boolean;
  onClose: () => void;
}

const KEYS = ['arrows', 'space', 'escape', 'plus', 'minus', 's', 'g', 'help'] as const;

/** Lists the keys of the viewer, and switches those that are single characters off (WCAG 2.1.4); kept with the account. */
export function KeysDialog({ sheet, open, onClose }: Props) {
  const { t } = useTranslation();
  const queryClient = useQueryClient();
  const change = useMutation({
    mutationFn: (shortcuts: boolean) => api.patch('/api/guest', { shortcuts }),
    onSuccess: (_answer, shortcuts) =>
      queryClient.setQueryData<GuestSheet>(sheetKeys.sheet(sheet.id), (now) => now && { ...now, me: { ...now.me, shortcuts } }),
  });
  return (
    <Dialog open={open} onClose={onClose} title={t('keys.title')}>
      <dl className="grid grid-cols-[auto_1fr] gap-x-6 gap-y-1.5">
        {KEYS.map((key) => (
          <div key={key} className="contents">
            <dt>
              <kbd className="border border-grey px-1.5 font-sans text-13 font-bold">{t(`keys.${key}.key`)}</kbd>
            </dt>
            <dd>{t(`keys.${key}.does`)}</dd>
          </div>
        ))}
      </dl>
      <Checkbox
        className="mt-4 border-t border-hair pt-3"
        label={t('keys.single')}
        hint={t('keys.singleHint')}
        checked={change.isPending ? change.variables : sheet.me.shortcuts}
        onChange={(event) => change.mutate(event.target.checked)}
      />
      {change.isError ? (
        <p role="alert" className="mt-2 text-copper">
          {change.error.message}
        </p>
      ) : null}
    </Dialog>
  );
}
