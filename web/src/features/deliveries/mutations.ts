import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { DeliveryList, MakeDelivery, Recipient, StudioDelivery } from '../../../../api/contract/deliveries.ts';
import { api } from '../../lib/api.ts';
import { commissionQuery } from '../commissions/queries.ts';
import { finalKeys } from '../finals/queries.ts';
import { deliveryKeys } from './queries.ts';

/** What can be done with deliveries. Every answer is the delivery as it then is. */
export type DeliveryDeed =
  | { what: 'make'; input: MakeDelivery }
  | { what: 'extend'; delivery: StudioDelivery; fetchBy: string }
  | { what: 'retry' | 'withdraw' | 'restore'; delivery: StudioDelivery }
  | { what: 'add'; delivery: StudioDelivery; recipients: Recipient[] }
  | { what: 'send-again' | 'withdraw-recipient' | 'restore-recipient'; delivery: StudioDelivery; recipientId: string };

function request(commissionId: string, deed: DeliveryDeed): Promise<StudioDelivery> {
  const many = `/api/commissions/${commissionId}/deliveries`;
  if (deed.what === 'make') return api.post(many, deed.input);
  const one = `${many}/${deed.delivery.id}`;
  switch (deed.what) {
    case 'extend':
      return api.patch(one, { fetchBy: deed.fetchBy }, { version: deed.delivery.version });
    case 'add':
      return api.post(`${one}/recipients`, { recipients: deed.recipients });
    case 'send-again':
      return api.post(`${one}/recipients/${deed.recipientId}/send-again`);
    case 'withdraw-recipient':
      return api.post(`${one}/recipients/${deed.recipientId}/withdraw`);
    case 'restore-recipient':
      return api.post(`${one}/recipients/${deed.recipientId}/restore`);
    default:
      return api.post(`${one}/${deed.what}`);
  }
}

function replaced(list: DeliveryList, changed: StudioDelivery): DeliveryList {
  const known = list.items.some((delivery) => delivery.id === changed.id);
  const items = known ? list.items.map((delivery) => (delivery.id === changed.id ? changed : delivery)) : [changed, ...list.items];
  return { ...list, items };
}

/** Does something with a delivery and shows it as it then is. */
export function useDeliveryDeed(commissionId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (deed: DeliveryDeed) => request(commissionId, deed),
    onSuccess: (changed) => {
      client.setQueryData<DeliveryList>(deliveryKeys.list(commissionId), (list) => list && replaced(list, changed));
      void client.invalidateQueries({ queryKey: finalKeys.list(commissionId) });
      void client.invalidateQueries({ queryKey: commissionQuery(commissionId).queryKey });
    },
    onError: () => void client.invalidateQueries({ queryKey: deliveryKeys.list(commissionId) }),
  });
}
