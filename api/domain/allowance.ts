import { timesMoney } from './money.ts';

/** What was agreed: so many picks are included, each further one costs `extraPrice` minor units. */
export interface Allowance {
  included: number;
  extraPrice: number;
}

/** Where a number of picks stands against the allowance. */
export interface AllowanceState {
  picks: number;
  included: number;
  /** Included picks still free. */
  left: number;
  /** Picks beyond the allowance. */
  extras: number;
  /** Price of the extras in minor units. */
  cost: number;
}

/** Counts picks against the allowance. `included` 0 makes every pick an extra. */
export function allowanceState(picks: number, { included, extraPrice }: Allowance): AllowanceState {
  const extras = Math.max(0, picks - included);
  return { picks, included, left: Math.max(0, included - picks), extras, cost: timesMoney(extraPrice, extras) };
}

/** A pick with its place: number from 1, and whether it is beyond the allowance. */
export interface PlacedPick<T> {
  pick: T;
  number: number;
  extra: boolean;
}

/**
 * Numbers picks in the order of the sheet and says which are extras: the last ones beyond the included number. The order
 * decides, not the moment of marking, so the same picks always give the same extras, whoever marked first.
 */
export function placePicks<T>(picks: readonly T[], included: number): PlacedPick<T>[] {
  return picks.map((pick, index) => ({ pick, number: index + 1, extra: index >= included }));
}
