import type { DeliveryState } from '../../domain/delivery-state.ts';

export interface DeliveryCan {
  withdraw: boolean;
  restore: boolean;
  extend: boolean;
  invite: boolean;
  retry: boolean;
}

/** What the studio may do to a delivery in its state. Owner and assistant may the same. */
export function deliveryCan(state: DeliveryState): DeliveryCan {
  const live = state !== 'Withdrawn';
  return {
    withdraw: live,
    restore: !live,
    extend: live,
    invite: live && state !== 'Ended',
    retry: state === 'Failed',
  };
}
