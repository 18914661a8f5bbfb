import currencies from 'currency-codes';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';

/** Prices are the owner's; a currency must be one of ISO 4217. @throws Problem 403, 422 */
export function checkPrice(actor: StaffActor, { extraPrice, currency }: { extraPrice?: number; currency?: string }): void {
  if (extraPrice === undefined && currency === undefined) return;
  if (actor.role !== 'owner') throw problem(403, 'Only the owner of the studio sets the price of an extra and the currency.');
  if (currency !== undefined && !currencies.code(currency)) {
    throw invalid([{ path: 'currency', message: `${currency} is no currency of ISO 4217.` }]);
  }
}
