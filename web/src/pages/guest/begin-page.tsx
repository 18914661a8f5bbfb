import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useNavigate, useParams } from 'react-router-dom';
import type { OpenedLink } from '../../../../api/contract/guests.ts';
import { useHandOver } from '../../features/guests/use-hand-over.ts';
import { RefusedLink } from '../../features/open-links/refused-link.tsx';
import { api, ApiProblem } from '../../lib/api.ts';
import { Pending } from '../../ui/pending.tsx';
import '../../messages/beyond-sheet.ts';

/**
 * Where the mail leads that confirms an address. Where two tabs open it at once one of them comes second: it asks once more, and then finds
 * that the first has signed this browser in.
 */
export function Component() {
  const { token = '' } = useParams();
  const { t } = useTranslation();
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const begin = useMutation({
    mutationFn: () => api.post<OpenedLink>('/api/begin', { token }),
    retry: (failures, error) => failures < 1 && error instanceof ApiProblem && error.code === 'link-used',
    retryDelay: 800,
    onSuccess: ({ goTo }) => {
      queryClient.clear();
      void navigate(goTo, { replace: true });
    },
  });
  const { mutate } = begin;
  useHandOver(token, mutate);

  return begin.isError ? <RefusedLink error={begin.error} onRetry={() => mutate()} /> : <Pending what={t('lookLink.confirming')} />;
}
