import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { GuestProof, SentPickList } from '../../../../api/contract/guest-sheets.ts';
import { api } from '../../lib/api.ts';
import { pickListsAddress, sheetKeys } from '../sheets-guest/queries.ts';

export interface Sending {
  /** The picks as they were seen when the button was pressed. */
  proofs: readonly GuestProof[];
  words: string;
}

/**
 * Sends the picks. Whatever comes back, the sheet is read again before the mutation settles: an answer that was lost on its
 * way has still sent the list, and the sheet then says so.
 */
export function useSend(sheetId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ proofs, words }: Sending) =>
      api.post<SentPickList>(pickListsAddress(sheetId), { proofIds: proofs.map((proof) => proof.id), words }),
    onSettled: () =>
      Promise.all(
        [sheetKeys.sheet, sheetKeys.marks, sheetKeys.pickLists].map((key) => queryClient.invalidateQueries({ queryKey: key(sheetId) })),
      ),
  });
}
