import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { FormEvent } from 'react';
import { useTranslation } from 'react-i18next';
import { useNavigate, useParams } from 'react-router-dom';
import type { LookAnswer } from '../../../../api/contract/open-links.ts';
import { useHandOver } from '../../features/guests/use-hand-over.ts';
import { RefusedLink } from '../../features/open-links/refused-link.tsx';
import { api, ApiProblem } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { Field } from '../../ui/field.tsx';
import { GuestShell } from '../../ui/guest-shell.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { Pending } from '../../ui/pending.tsx';
import { TextInput } from '../../ui/text-input.tsx';
import '../../messages/beyond-sheet.ts';

/** Where the open link of a sheet leads: straight on to the sheet, or first to the question for its passphrase. */
export function Component() {
  const { token = '' } = useParams();
  const { t } = useTranslation();
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const open = (passphrase?: string) => api.post<LookAnswer>('/api/look', { token, passphrase });
  const onSuccess = ({ goTo }: LookAnswer) => {
    if (!goTo) return;
    queryClient.clear();
    void navigate(goTo, { replace: true });
  };
  const look = useMutation({ mutationFn: () => open(), onSuccess });
  const answer = useMutation({ mutationFn: open, onSuccess });
  const { mutate } = look;
  useHandOver(token, mutate);

  if (look.isError) return <RefusedLink error={look.error} onRetry={() => mutate()} />;
  if (!look.isSuccess || look.data.goTo) return <Pending what={t('open.opening')} />;
  const gone = answer.error instanceof ApiProblem && [404, 410].includes(answer.error.status);
  if (answer.error && gone) return <RefusedLink error={answer.error} onRetry={() => mutate()} />;
  return <AskPassphrase studio={look.data.studio} error={answer.error} busy={answer.isPending} onGive={(words) => answer.mutate(words)} />;
}

interface Props {
  studio: string;
  error: Error | null;
  busy: boolean;
  onGive: (passphrase: string) => void;
}

/** Shown as it is typed: it is shared by many, read from a mail and typed on telephones. */
function AskPassphrase({ studio, error, busy, onGive }: Props) {
  const { t } = useTranslation();
  const onSubmit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const passphrase = String(new FormData(event.currentTarget).get('passphrase') ?? '');
    if (passphrase && !busy) onGive(passphrase);
  };
  return (
    <GuestShell studio={studio}>
      <form className="grid max-w-md gap-5 py-8" noValidate onSubmit={onSubmit}>
        <PageTitle title={t('lookLink.title')} />
        <p>{t('lookLink.asks')}</p>
        <Field label={t('lookLink.passphrase')} error={error?.message}>
          {(control) => (
            <TextInput
              {...control}
              name="passphrase"
              autoComplete="off"
              autoCapitalize="none"
              autoCorrect="off"
              spellCheck={false}
              maxLength={200}
            />
          )}
        </Field>
        <Button tone="first" type="submit" busy={busy} className="justify-self-start">
          {t('lookLink.open')}
        </Button>
      </form>
    </GuestShell>
  );
}
