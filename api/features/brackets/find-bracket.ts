import type { Transaction } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Bracket } from '../../models/Bracket.ts';
import type { Commission } from '../../models/Commission.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { holdForGrouping } from './hold-commission.ts';
import { type Shown, shownFrames } from './shown-frames.ts';

/** A bracket of the studio, in a commission that is there. @throws Problem 404 */
export async function findBracket(scope: StudioScope, bracketId: string, trx?: Transaction): Promise<Bracket> {
  const bracket = await Bracket.within(scope, trx).findById(bracketId);
  if (!bracket) throw problem(404);
  await findCommission(scope, bracket.commissionId, trx);
  return bracket;
}

/** A bracket that is held with its commission, and what a client has seen of it. */
export interface HeldBracket {
  bracket: Bracket;
  commission: Commission;
  shown: Shown | undefined;
}

/** The same, held with its commission until the transaction ends. @throws Problem 404, 409 where the commission is closed */
export async function holdBracket(scope: StudioScope, bracketId: string, trx: Transaction): Promise<HeldBracket> {
  const { commissionId } = await findBracket(scope, bracketId, trx);
  const commission = await holdForGrouping(scope, commissionId, trx);
  // It may have gone while others held the commission.
  const bracket = await findBracket(scope, bracketId, trx);
  const shown = await shownFrames(trx, bracket);
  return { bracket, commission, shown: shown.get(bracket.leadFrameId) };
}
