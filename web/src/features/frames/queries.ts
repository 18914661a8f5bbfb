import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { BracketList } from '../../../../api/contract/brackets.ts';
import type { Frame, FrameList, FrameQuery, FrameSummary } from '../../../../api/contract/frames.ts';
import { api } from '../../lib/api.ts';

/** The first page is small, so that something is seen soon; the rest comes in large ones. */
const FIRST_PAGE = 200;
const PAGE = 1000;

export const frameKeys = {
  all: (commissionId: string) => ['commissions', commissionId, 'frames'] as const,
  list: (commissionId: string) => ['commissions', commissionId, 'frames', 'list'] as const,
  deleted: (commissionId: string) => ['commissions', commissionId, 'frames', 'deleted'] as const,
  one: (frameId: string) => ['frames', frameId] as const,
  brackets: (commissionId: string) => ['commissions', commissionId, 'brackets'] as const,
};

/**
 * All frames of a commission, a page after the other, hidden and failed ones included: a page of ten thousand tiles sorts,
 * filters and selects without asking again. They arrive in the order in which they are shown first, by time taken.
 */
export function framesQuery(commissionId: string) {
  // Live changes are written into the pages; all of them are asked for anew only when something was missed.
  return pagesOf(commissionId, frameKeys.list(commissionId), {}, 5 * 60_000);
}

/** Frames that were deleted and can still be brought back, in the same way. */
export function deletedFramesQuery(commissionId: string) {
  return pagesOf(commissionId, frameKeys.deleted(commissionId), { deleted: 'only' }, 0);
}

function pagesOf(commissionId: string, queryKey: readonly string[], more: Pick<FrameQuery, 'deleted'>, staleTime: number) {
  return infiniteQueryOptions({
    queryKey,
    queryFn: ({ pageParam, signal }) =>
      api.get<FrameList>(`/api/commissions/${commissionId}/frames`, {
        query: { sort: 'taken', after: pageParam, limit: pageParam === null ? FIRST_PAGE : PAGE, ...more },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (last) => last.next,
    staleTime,
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

/** The brackets of a commission, all at once, in the order they were taken. */
export function bracketsQuery(commissionId: string) {
  return queryOptions({
    queryKey: frameKeys.brackets(commissionId),
    queryFn: ({ signal }) => api.get<BracketList>(`/api/commissions/${commissionId}/brackets`, { signal }),
  });
}
