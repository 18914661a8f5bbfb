import { queryOptions } from '@tanstack/react-query';
import type { GuestDelivery } from '../../../../api/contract/deliveries.ts';
import { api } from '../../lib/api.ts';

/** A delivery as its recipient sees it. */
export const guestDeliveryQuery = (deliveryId: string) =>
  queryOptions({
    queryKey: ['guest-delivery', deliveryId],
    queryFn: ({ signal }) => api.get<GuestDelivery>(`/api/deliveries/${encodeURIComponent(deliveryId)}`, { signal }),
  });
