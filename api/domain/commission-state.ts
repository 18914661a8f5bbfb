import type { SheetState } from './sheet-state.ts';

/** The states of a commission, derived from its data and never stored. */
export type CommissionState = 'Preparing' | 'With client' | 'Picks in' | 'Finishing' | 'Ready' | 'Delivered' | 'Closed';

/** In the order of the work, for filters and sorting. */
export const COMMISSION_STATES: readonly CommissionState[] = [
  'Preparing',
  'With client',
  'Picks in',
  'Finishing',
  'Ready',
  'Delivered',
  'Closed',
];

/** What decides the state. Picks are those of each sheet's latest pick list; a final counts once, whatever its versions. */
export interface CommissionFacts {
  closed: boolean;
  sheets: readonly SheetState[];
  picks: number;
  picksWithFinal: number;
  /** All finals, further ones without a pick included. */
  finals: number;
  /** Finals of which some version is in a delivery that was sent and not withdrawn. */
  finalsDelivered: number;
}

/**
 * The state of a commission. An open sheet wins over everything behind it (a reopened sheet is with the client again, a
 * second sheet puts the whole commission back there). Without a pick list finals alone make it Ready: a studio can
 * deliver without proofing. It is Delivered only when every final has gone out.
 */
export function commissionState(facts: CommissionFacts): CommissionState {
  if (facts.closed) return 'Closed';
  if (facts.sheets.includes('Open')) return 'With client';
  if (facts.picks > 0 && facts.finals === 0) return 'Picks in';
  if (facts.picks > facts.picksWithFinal) return 'Finishing';
  if (facts.finals > 0) return facts.finalsDelivered >= facts.finals ? 'Delivered' : 'Ready';
  // The last date passed and nothing was sent: it is still the client's answer that is missing.
  return facts.sheets.includes('Ended') ? 'With client' : 'Preparing';
}
