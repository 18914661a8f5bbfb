import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { Views } from '../../../../api/contract/commissions.ts';
import type { Frame, FrameList, FrameSummary } from '../../../../api/contract/frames.ts';
import type { SheetSummary } from '../../../../api/contract/sheets.ts';
import { api } from '../../lib/api.ts';

/** The first page is small, so that something is seen soon; the rest comes in large ones. */
const FIRST_PAGE = 200;
const PAGE = 1000;

export const frameKeys = {
  all: (commissionId: string) => ['commissions', commissionId, 'frames'] as const,
  list: (commissionId: string) => ['commissions', commissionId, 'frames', 'list'] as const,
  one: (frameId: string) => ['frames', frameId] as const,
};

/**
 * All frames of a commission, a page after the other, hidden and failed ones included: a page of ten thousand tiles sorts,
 * filters and selects without asking again. They arrive in the order in which they are shown first, by time taken.
 */
export function framesQuery(commissionId: string) {
  return infiniteQueryOptions({
    queryKey: frameKeys.list(commissionId),
    queryFn: ({ pageParam, signal }) =>
      api.get<FrameList>(`/api/commissions/${commissionId}/frames`, {
        query: { sort: 'taken', after: pageParam, limit: pageParam === null ? FIRST_PAGE : PAGE },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (last) => last.next,
    // Live changes are written into the pages; all of them are asked for anew only when something was missed.
    staleTime: 5 * 60_000,
  });
}

export function frameSummaryQuery(commissionId: string) {
  return queryOptions({
    queryKey: [...frameKeys.all(commissionId), 'summary'],
    queryFn: ({ signal }) => api.get<FrameSummary>(`/api/commissions/${commissionId}/frames/summary`, { signal }),
  });
}

/** One frame with everything that is known of it. */
export function frameQuery(frameId: string) {
  return queryOptions({
    queryKey: frameKeys.one(frameId),
    queryFn: ({ signal }) => api.get<Frame>(`/api/frames/${frameId}`, { signal }),
  });
}

/** The views under which frames can be hung, in the order of the brief. */
export function viewTitlesQuery(commissionId: string) {
  return queryOptions({
    queryKey: ['commissions', commissionId, 'views'],
    queryFn: ({ signal }) => api.get<Views>(`/api/commissions/${commissionId}/views`, { signal }),
  });
}

/** The sheets on which frames can be put. */
export function sheetChoicesQuery(commissionId: string) {
  return queryOptions({
    queryKey: [...frameKeys.all(commissionId), 'sheets'],
    queryFn: ({ signal }) => api.get<{ items: SheetSummary[] }>(`/api/commissions/${commissionId}/sheets`, { signal }),
  });
}
