import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { Guest, MinePage } from '../../../../api/contract/guests.ts';
import { api } from '../../lib/api.ts';

/** Who is a guest at this browser. */
export const guestQuery = queryOptions({
  queryKey: ['guest'],
  queryFn: ({ signal }) => api.get<Guest>('/api/guest', { signal }),
});

/** Everything this guest was ever invited to, newest first. */
export const mineQuery = infiniteQueryOptions({
  queryKey: ['mine'],
  queryFn: ({ signal, pageParam }) => api.get<MinePage>('/api/mine', { signal, query: { after: pageParam } }),
  initialPageParam: undefined as string | undefined,
  getNextPageParam: (page) => page.next ?? undefined,
});
