import { queryOptions } from '@tanstack/react-query';
import type { StudioChecks } from '../../../../api/contract/studios.ts';
import { api } from '../../lib/api.ts';

export const checksKey = ['studio', 'checks'] as const;

/** From where on the studio's frames are pointed out. */
export const checksQuery = queryOptions({
  queryKey: checksKey,
  queryFn: ({ signal }) => api.get<StudioChecks>('/api/studio/checks', { signal }),
});
