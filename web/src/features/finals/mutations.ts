import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { ChangeFinal, FinalItem, FinalList, FinalVersionItem } from '../../../../api/contract/finals.ts';
import { api } from '../../lib/api.ts';
import { showNotice } from '../../ui/notices.tsx';
import { commissionQuery } from '../commissions/queries.ts';
import { finalKeys } from './queries.ts';

/** What can be done to finals. Every answer is the whole list as it then is. */
export type FinalDeed =
  | { what: 'change'; final: Pick<FinalItem, 'id' | 'version'>; input: ChangeFinal }
  | { what: 'detach' | 'remove' | 'restore'; version: Pick<FinalVersionItem, 'id' | 'name'> };

function request(deed: FinalDeed): Promise<FinalList> {
  if (deed.what === 'change') return api.patch(`/api/finals/${deed.final.id}`, deed.input, { version: deed.final.version });
  return api.post(`/api/final-versions/${deed.version.id}/${deed.what}`);
}

/** Does something to a final and shows the list as it then is; what failed is told in a notice, a removal can be undone. */
export function useFinalDeed(commissionId: string) {
  const client = useQueryClient();
  const deeds = useMutation({
    mutationFn: request,
    onSuccess: (list, deed) => {
      client.setQueryData(finalKeys.list(commissionId), list);
      void client.invalidateQueries({ queryKey: commissionQuery(commissionId).queryKey });
      if (deed.what !== 'remove') return;
      showNotice(`“${deed.version.name}” is removed.`, { undo: () => deeds.mutate({ what: 'restore', version: deed.version }) });
    },
    onError: (error) => {
      void client.invalidateQueries({ queryKey: finalKeys.list(commissionId) });
      showNotice(error.message, { tone: 'problem' });
    },
  });
  return deeds;
}
