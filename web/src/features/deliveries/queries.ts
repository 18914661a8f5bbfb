import { queryOptions } from '@tanstack/react-query';
import type { DeliveryList } from '../../../../api/contract/deliveries.ts';
import { api } from '../../lib/api.ts';

export const deliveryKeys = { list: (commissionId: string) => ['deliveries', commissionId] as const };

/** The deliveries of a commission and the people who may be meant. */
export const deliveriesQuery = (commissionId: string) =>
  queryOptions({
    queryKey: deliveryKeys.list(commissionId),
    queryFn: ({ signal }) => api.get<DeliveryList>(`/api/commissions/${commissionId}/deliveries`, { signal }),
  });
