import { queryOptions } from '@tanstack/react-query';
import type { CommissionDetail } from '../../../../api/contract/commissions.ts';
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
