import { queryOptions } from '@tanstack/react-query';
import type { SheetPreview } from '../../../../api/contract/guest-sheets.ts';
import type { SheetSummary, StudioSheet } from '../../../../api/contract/sheets.ts';
import { api } from '../../lib/api.ts';

export const sheetKeys = {
  lists: (commissionId: string) => ['sheets', 'of', commissionId] as const,
  one: (sheetId: string) => ['sheets', sheetId] as const,
  preview: (sheetId: string) => ['sheets', sheetId, 'preview'] as const,
};

/** The proof sheets of a commission in their order. */
export function sheetsQuery(commissionId: string) {
  return queryOptions({
    queryKey: sheetKeys.lists(commissionId),
    queryFn: ({ signal }) => api.get<{ items: SheetSummary[] }>(`/api/commissions/${commissionId}/sheets`, { signal }),
  });
}

/** One sheet with its proofs and guests, as the studio works on it. */
export function sheetQuery(sheetId: string) {
  return queryOptions({
    queryKey: sheetKeys.one(sheetId),
    queryFn: ({ signal }) => api.get<StudioSheet>(`/api/sheets/${sheetId}`, { signal }),
  });
}

/** The sheet as its guests see it. */
export function previewQuery(sheetId: string) {
  return queryOptions({
    queryKey: sheetKeys.preview(sheetId),
    queryFn: ({ signal }) => api.get<SheetPreview>(`/api/sheets/${sheetId}/preview`, { signal }),
  });
}
