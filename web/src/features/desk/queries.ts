import { queryOptions } from '@tanstack/react-query';
import type { Desk } from '../../../../api/contract/desk.ts';
import { api } from '../../lib/api.ts';

/** The desk asks again every half minute and whenever one comes back to it: it is the page that lies open all day. */
export const deskQuery = queryOptions({
  queryKey: ['desk'],
  queryFn: ({ signal }) => api.get<Desk>('/api/desk', { signal }),
  refetchInterval: 30_000,
  refetchOnWindowFocus: 'always',
  refetchOnMount: 'always',
});
