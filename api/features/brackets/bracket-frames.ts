import type { TransactionOrKnex } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import { arrangeBracket, type ArrangedBracket } from '../../domain/brackets/arrange.ts';
import type { Bracket } from '../../models/Bracket.ts';
import { Frame } from '../../models/Frame.ts';

/** The frames of brackets, in the order that makes each of them a bracket: darkest first. */
export async function framesOfBrackets(
  scope: StudioScope,
  brackets: readonly Pick<Bracket, 'id' | 'leadFrameId'>[],
  db?: TransactionOrKnex,
): Promise<Map<string, ArrangedBracket<Frame>>> {
  const frames = await Frame.within(scope, db)
    .whereIn(
      'bracketId',
      brackets.map(({ id }) => id),
    )
    .whereNull('deletedAt');
  const grouped = new Map(brackets.map(({ id }) => [id, [] as Frame[]]));
  for (const frame of frames) grouped.get(frame.bracketId ?? '')?.push(frame);
  return new Map(brackets.map(({ id, leadFrameId }) => [id, arrangeBracket(grouped.get(id) ?? [], leadFrameId)]));
}
