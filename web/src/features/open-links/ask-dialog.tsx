import { useMutation } from '@tanstack/react-query';
import { useId, type FormEvent } from 'react';
import { useTranslation } from 'react-i18next';
import type { GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import type { AskedToMark, AskToMark } from '../../../../api/contract/open-links.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { TextInput } from '../../ui/text-input.tsx';
import { formProblem } from '../guests/form-problem.ts';
import '../../messages/beyond-sheet.ts';

interface Props {
  sheet: GuestSheet;
  onClose: () => void;
}

/** Somebody who looks gives their name and an address, and reads where the link to confirm it went. */
export default function AskDialog({ sheet, onClose }: Props) {
  const { t } = useTranslation();
  const form = useId();
  const ask = useMutation({
    mutationFn: (who: AskToMark) => api.post<AskedToMark>(`/api/guest/sheets/${sheet.id}/ask-to-mark`, who),
  });
  const { at, general } = formProblem(ask.error);

  const onSubmit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const fields = new FormData(event.currentTarget);
    const text = (name: string) => String(fields.get(name) ?? '').trim();
    if (!ask.isPending) ask.mutate({ name: text('name'), email: text('email') });
  };

  if (ask.isSuccess) {
    return (
      <Dialog open onClose={onClose} title={t('looking.sentTitle')} actions={<Button onClick={onClose}>{t('looking.goOn')}</Button>}>
        <p role="status">{ask.data.says}</p>
        <p className="mt-3 text-mute">{t('looking.sentWhat')}</p>
      </Dialog>
    );
  }
  return (
    <Dialog
      open
      onClose={onClose}
      title={t('looking.title')}
      actions={
        <>
          <Button onClick={onClose}>{t('ui.cancel')}</Button>
          <Button tone="first" type="submit" form={form} busy={ask.isPending}>
            {t('looking.send')}
          </Button>
        </>
      }
    >
      <form id={form} noValidate onSubmit={onSubmit} className="grid gap-4">
        <p>{t('looking.why', { studio: sheet.studio.name })}</p>
        <Field label={t('looking.name')} hint={t('looking.nameHint')} error={at('name')}>
          {(control) => <TextInput {...control} name="name" autoComplete="name" maxLength={120} />}
        </Field>
        <Field label={t('looking.email')} error={at('email')}>
          {(control) => <TextInput {...control} name="email" type="email" autoComplete="email" maxLength={254} />}
        </Field>
        {general ? (
          <p role="alert" className="font-bold text-copper">
            {general}
          </p>
        ) : null}
      </form>
    </Dialog>
  );
}
