import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useId, type FormEvent } from 'react';
import { useTranslation } from 'react-i18next';
import type { GuestSheet, InviteReviewer } from '../../../../api/contract/guest-sheets.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Dialog } from '../../ui/dialog.tsx';
import { Field } from '../../ui/field.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { TextArea, TextInput } from '../../ui/text-input.tsx';
import { guestsAddress, sheetKeys } from '../sheets-guest/queries.ts';
import { formProblem } from './form-problem.ts';
import '../../messages/beyond-sheet.ts';

interface Props {
  sheet: GuestSheet;
  onClose: () => void;
}

/** The lead invites a reviewer: a name, an address, words of one's own. The server says what is wrong, field by field. */
export default function InviteDialog({ sheet, onClose }: Props) {
  const { t } = useTranslation();
  const form = useId();
  const queryClient = useQueryClient();
  const invite = useMutation({
    mutationFn: (who: InviteReviewer) => api.post<GuestSheet>(guestsAddress(sheet.id), who),
    onSuccess: (_answer, who) => {
      void queryClient.invalidateQueries({ queryKey: sheetKeys.sheet(sheet.id) });
      showNotice(t('invite.invited', { name: who.name, email: who.email }));
      onClose();
    },
  });
  const { at, general } = formProblem(invite.error);

  const onSubmit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const fields = new FormData(event.currentTarget);
    const text = (name: string) => String(fields.get(name) ?? '').trim();
    if (!invite.isPending) invite.mutate({ name: text('name'), email: text('email'), words: text('words') });
  };

  return (
    <Dialog
      open
      onClose={onClose}
      title={t('invite.title')}
      actions={
        <>
          <Button onClick={onClose}>{t('ui.cancel')}</Button>
          <Button tone="first" type="submit" form={form} busy={invite.isPending}>
            {t('invite.send')}
          </Button>
        </>
      }
    >
      <form id={form} noValidate onSubmit={onSubmit} className="grid gap-4">
        <p>{t('invite.words')}</p>
        <Field label={t('invite.name')} error={at('name')}>
          {(control) => <TextInput {...control} name="name" autoComplete="off" maxLength={120} />}
        </Field>
        <Field label={t('invite.email')} error={at('email')}>
          {(control) => <TextInput {...control} name="email" type="email" autoComplete="off" />}
        </Field>
        <Field label={t('invite.message')} optional={t('ui.optional')} error={at('words')}>
          {(control) => <TextArea {...control} name="words" maxLength={4000} />}
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
