import { queryOptions } from '@tanstack/react-query';
import type { FinalList } from '../../../../api/contract/finals.ts';
import { api } from '../../lib/api.ts';

export const finalKeys = { list: (commissionId: string) => ['finals', commissionId] as const };

/** The finals of a commission and the picks they belong to. */
export const finalsQuery = (commissionId: string) =>
  queryOptions({
    queryKey: finalKeys.list(commissionId),
    queryFn: ({ signal }) => api.get<FinalList>(`/api/commissions/${commissionId}/finals`, { signal }),
  });
