import { infiniteQueryOptions } from '@tanstack/react-query';
import type { RecordNoun, RecordPage } from '../../../../api/contract/record.ts';
import { api } from '../../lib/api.ts';

/** The record of a commission, page by page, newest first. */
export function recordQuery(commissionId: string, noun: RecordNoun | undefined) {
  return infiniteQueryOptions({
    queryKey: ['commissions', commissionId, 'record', noun ?? 'all'],
    queryFn: ({ signal, pageParam }) =>
      api.get<RecordPage>(`/api/commissions/${commissionId}/record`, { signal, query: { noun, after: pageParam } }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.next ?? undefined,
  });
}
