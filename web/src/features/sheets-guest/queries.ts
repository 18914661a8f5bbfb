import { queryOptions, type QueryClient } from '@tanstack/react-query';
import type { LoaderFunctionArgs } from 'react-router-dom';
import type { GuestProofs, GuestSheet, SentPickList, SheetMarks } from '../../../../api/contract/guest-sheets.ts';
import { api } from '../../lib/api.ts';

const address = (sheetId: string) => `/api/guest/sheets/${encodeURIComponent(sheetId)}`;

export const sheetKeys = {
  all: (sheetId: string) => ['guest-sheet', sheetId] as const,
  sheet: (sheetId: string) => ['guest-sheet', sheetId, 'sheet'] as const,
  proofs: (sheetId: string) => ['guest-sheet', sheetId, 'proofs'] as const,
  marks: (sheetId: string) => ['guest-sheet', sheetId, 'marks'] as const,
  pickLists: (sheetId: string) => ['guest-sheet', sheetId, 'pick-lists'] as const,
};

/** The sheet without its pictures: names, dates, allowance, people. */
export function sheetQuery(sheetId: string) {
  return queryOptions({
    queryKey: sheetKeys.sheet(sheetId),
    queryFn: ({ signal }) => api.get<GuestSheet>(address(sheetId), { signal }),
  });
}

/** The proofs change seldom: they are asked for again when the sheet's revision says so, or their addresses have run out. */
export function proofsQuery(sheetId: string) {
  return queryOptions({
    queryKey: sheetKeys.proofs(sheetId),
    queryFn: ({ signal }) => api.get<GuestProofs>(`${address(sheetId)}/proofs`, { signal }),
    staleTime: Infinity,
  });
}

export function marksQuery(sheetId: string) {
  return queryOptions({
    queryKey: sheetKeys.marks(sheetId),
    queryFn: ({ signal }) => api.get<SheetMarks>(`${address(sheetId)}/marks`, { signal }),
  });
}

export function pickListsQuery(sheetId: string) {
  return queryOptions({
    queryKey: sheetKeys.pickLists(sheetId),
    queryFn: ({ signal }) => api.get<{ items: SentPickList[] }>(`${address(sheetId)}/pick-lists`, { signal }),
  });
}

export const eventsAddress = (sheetId: string) => `${address(sheetId)}/events`;
export const markAddress = (sheetId: string, proofId: string) => `${address(sheetId)}/proofs/${proofId}/mark`;
export const pickListsAddress = (sheetId: string) => `${address(sheetId)}/pick-lists`;
export const guestsAddress = (sheetId: string) => `${address(sheetId)}/guests`;

/** Asks for everything a sheet needs at once, while the page's own code is still on its way. */
export function sheetLoader(queryClient: QueryClient) {
  return ({ params }: LoaderFunctionArgs) => {
    const { sheetId = '' } = params;
    void queryClient.prefetchQuery(sheetQuery(sheetId));
    void queryClient.prefetchQuery(proofsQuery(sheetId));
    void queryClient.prefetchQuery(marksQuery(sheetId));
    return null;
  };
}
