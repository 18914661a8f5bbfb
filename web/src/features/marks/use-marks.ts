import { useQueryClient, type QueryClient } from '@tanstack/react-query';
import i18next from 'i18next';
import { useSyncExternalStore } from 'react';
import type { GuestProof, GuestProofs, GuestSheet, SheetMarks } from '../../../../api/contract/guest-sheets.ts';
import { api, ApiProblem } from '../../lib/api.ts';
import { showNotice } from '../../ui/notices.tsx';
import { markAddress, sheetKeys } from '../sheets-guest/queries.ts';
import { MarkKeeper, withMark, withWishes } from './mark-keeper.ts';

/** One keeper a sheet and person, so that marks under way survive a change of page. */
const keepers = new Map<string, MarkKeeper>();

function sayRefused(queryClient: QueryClient, sheetId: string, proofId: string, marked: boolean, error: unknown): void {
  const proofs = queryClient.getQueryData<GuestProofs>(sheetKeys.proofs(sheetId))?.proofs ?? [];
  const number = proofs.find((proof) => proof.id === proofId)?.number ?? '';
  const reason = error instanceof ApiProblem ? error.detail : '';
  showNotice(i18next.t(marked ? 'marks.notMarked' : 'marks.notTaken', { number, reason }), { tone: 'problem' });
}

function keeperOf(queryClient: QueryClient, sheetId: string, me: string): MarkKeeper {
  const name = `${sheetId}/${me}`;
  const known = keepers.get(name);
  if (known) return known;
  const marksKey = sheetKeys.marks(sheetId);
  const keeper = new MarkKeeper({
    send: (proofId, marked) => (marked ? api.put(markAddress(sheetId, proofId)) : api.delete(markAddress(sheetId, proofId))),
    onSaved: async (proofId, marked) => {
      queryClient.setQueryData<SheetMarks>(marksKey, (now) => now && { marks: withMark(now.marks, proofId, me, marked) });
      // An answer read before this mark was written may be under way; asking anew puts it aside.
      await queryClient.invalidateQueries({ queryKey: marksKey });
    },
    onRefused: (proofId, marked, error) => {
      sayRefused(queryClient, sheetId, proofId, marked, error);
      void queryClient.invalidateQueries({ queryKey: marksKey });
      void queryClient.invalidateQueries({ queryKey: sheetKeys.sheet(sheetId) });
    },
  });
  keepers.set(name, keeper);
  return keeper;
}

/** The marks as this guest should see them, their own wishes included, and the way to change one's own. */
export function useMarks(sheet: GuestSheet, marks: SheetMarks['marks']) {
  const me = sheet.me.accountId;
  const queryClient = useQueryClient();
  const keeper = keeperOf(queryClient, sheet.id, me);
  const wishes = useSyncExternalStore(keeper.listen, keeper.wishes);
  const mark = (proof: GuestProof, wanted: boolean) => {
    // Read from the cache: an Undo is pressed long after the page that offered it was drawn.
    const now = queryClient.getQueryData<SheetMarks>(sheetKeys.marks(sheet.id))?.marks ?? marks;
    const has = now.some((one) => one.proofId === proof.id && one.accountId === me);
    keeper.want(proof.id, wanted, has);
  };
  return { marks: withWishes(marks, wishes, me), mark };
}
