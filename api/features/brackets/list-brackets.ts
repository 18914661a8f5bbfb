import type { Bracket as BracketAnswer } from '../../contract/brackets.ts';
import type { Context } from '../../context.ts';
import type { StudioScope } from '../../db/scope.ts';
import { Bracket } from '../../models/Bracket.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { framesOfBrackets } from './bracket-frames.ts';
import { findBracket } from './find-bracket.ts';
import { presentBracket } from './presenter.ts';
import { shownFrames } from './shown-frames.ts';

async function presentAll(ctx: Context, scope: StudioScope, commissionId: string, brackets: Bracket[]): Promise<BracketAnswer[]> {
  const commission = await findCommission(scope, commissionId);
  const [frames, shown] = await Promise.all([
    framesOfBrackets(scope, brackets),
    shownFrames(ctx.knex, { studioId: scope.studioId, commissionId }),
  ]);
  const nothing = { frames: [], steps: [], says: '' };
  return Promise.all(
    brackets.map((bracket) => presentBracket(ctx, commission, bracket, frames.get(bracket.id) ?? nothing, shown.get(bracket.leadFrameId))),
  );
}

/** The brackets of a commission in the order they were taken. @throws Problem 404 */
export async function listBrackets(ctx: Context, scope: StudioScope, commissionId: string): Promise<BracketAnswer[]> {
  await findCommission(scope, commissionId);
  const brackets = await presentAll(ctx, scope, commissionId, await Bracket.within(scope).where({ commissionId }));
  return brackets.sort((a, b) => (a.takenLocal ?? '9').localeCompare(b.takenLocal ?? '9') || a.id.localeCompare(b.id));
}

/** One bracket. @throws Problem 404 */
export async function readBracket(ctx: Context, scope: StudioScope, bracketId: string): Promise<BracketAnswer> {
  const bracket = await findBracket(scope, bracketId);
  const [presented] = await presentAll(ctx, scope, bracket.commissionId, [bracket]);
  return presented as BracketAnswer;
}
