import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { CommissionContents, CommissionDetail, CommissionPage, ListCommissions, Views } from '../../../../api/contract/commissions.ts';
import type { CommissionState } from '../../../../api/domain/commission-state.ts';
import { api } from '../../lib/api.ts';

/** Keys of everything about commissions: lists below 'list', one commission below its id. */
export const commissionKeys = {
  all: ['commissions'] as const,
  lists: ['commissions', 'list'] as const,
  one: (id: string) => ['commissions', id] as const,
};

/** A commission with the figures of its steps, for the title block. */
export function commissionQuery(id: string) {
  return queryOptions({
    queryKey: [...commissionKeys.one(id), 'header'],
    queryFn: ({ signal }) => api.get<CommissionDetail>(`/api/commissions/${id}`, { signal }),
  });
}

/** What the list is narrowed to, and its order. */
export interface CommissionFilter {
  search?: string | undefined;
  state?: CommissionState | undefined;
  clientId?: string | undefined;
  sort?: ListCommissions['sort'] | undefined;
  deleted?: 'true' | undefined;
}

/** The studio's commissions, page by page. */
export function commissionsQuery(filter: CommissionFilter) {
  return infiniteQueryOptions({
    queryKey: [...commissionKeys.lists, filter],
    queryFn: ({ signal, pageParam }) => api.get<CommissionPage>('/api/commissions', { signal, query: { ...filter, after: pageParam } }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.next ?? undefined,
  });
}

/** The views of the brief, in order. */
export function viewsQuery(commissionId: string) {
  return queryOptions({
    queryKey: [...commissionKeys.one(commissionId), 'views'],
    queryFn: ({ signal }) => api.get<Views>(`/api/commissions/${commissionId}/views`, { signal }),
  });
}

/** What goes when the commission is deleted; asked for right before. */
export function contentsQuery(commissionId: string) {
  return queryOptions({
    queryKey: [...commissionKeys.one(commissionId), 'contents'],
    queryFn: ({ signal }) => api.get<CommissionContents>(`/api/commissions/${commissionId}/contents`, { signal }),
    gcTime: 0,
  });
}
