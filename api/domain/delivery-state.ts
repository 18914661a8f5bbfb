/** The states of a delivery, derived from its moments and archives and never stored. */
export type DeliveryState = 'Preparing' | 'Failed' | 'Sent' | 'Ended' | 'Withdrawn';

/** What decides the state of a delivery; any form a Date accepts. */
export interface DeliveryFacts {
  sentAt: Date | string | null;
  endsAt: Date | string;
  withdrawnAt: Date | string | null;
  archives: readonly ('building' | 'ready' | 'failed')[];
}

/** The state of a delivery at a moment. It is Preparing until its archives are built and its mails queued. */
export function deliveryState(delivery: DeliveryFacts, now: Date): DeliveryState {
  if (delivery.withdrawnAt) return 'Withdrawn';
  if (delivery.sentAt) return new Date(delivery.endsAt) <= now ? 'Ended' : 'Sent';
  return delivery.archives.includes('failed') ? 'Failed' : 'Preparing';
}
