import { queryOptions } from '@tanstack/react-query';
import type { ArchiveState } from '../../../../api/contract/deliveries.ts';
import type { PickListDetail, PickListLine } from '../../../../api/contract/pick-lists.ts';
import { api } from '../../lib/api.ts';

export const pickKeys = {
  all: ['pick-lists'] as const,
  lists: (commissionId: string) => ['pick-lists', 'of', commissionId] as const,
  one: (pickListId: string) => ['pick-lists', pickListId] as const,
  archive: (pickListId: string) => ['pick-lists', pickListId, 'archive'] as const,
};

/** The pick lists of a commission, newest first. */
export function pickListsQuery(commissionId: string) {
  return queryOptions({
    queryKey: pickKeys.lists(commissionId),
    queryFn: ({ signal }) => api.get<{ items: PickListLine[] }>(`/api/commissions/${commissionId}/pick-lists`, { signal }),
  });
}

/** One list with its picks. */
export function pickListQuery(pickListId: string) {
  return queryOptions({
    queryKey: pickKeys.one(pickListId),
    queryFn: ({ signal }) => api.get<PickListDetail>(`/api/pick-lists/${pickListId}`, { signal }),
  });
}

/** How far the archive of the picked originals is; asked again every second while it is being built. */
export function archiveQuery(pickListId: string, asked: boolean) {
  return queryOptions({
    queryKey: pickKeys.archive(pickListId),
    queryFn: ({ signal }) => api.get<ArchiveState>(`/api/pick-lists/${pickListId}/archive`, { signal }),
    enabled: asked,
    refetchInterval: (query) => (query.state.data?.state === 'building' ? 1000 : false),
  });
}
