import { queryOptions } from '@tanstack/react-query';
import type { StudioUses } from '../../../../api/contract/studios.ts';
import { api } from '../../lib/api.ts';

export const usesKey = ['studio', 'uses'] as const;

/** What the studio's pictures are wanted for. It changes seldom and is asked on every frame that is looked at. */
export const usesQuery = queryOptions({
  queryKey: usesKey,
  queryFn: ({ signal }) => api.get<StudioUses>('/api/studio/uses', { signal }),
  staleTime: 5 * 60_000,
});
