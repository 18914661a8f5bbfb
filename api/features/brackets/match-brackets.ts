import type { FoundBracket } from '../../domain/brackets.ts';
import type { Bracket } from '../../models/Bracket.ts';

export interface MatchedBrackets {
  /** Every bracket that was found, with the one that is there already and goes on as it. */
  kept: [FoundBracket, Bracket | undefined][];
  /** Those that are no brackets any more. */
  gone: Bracket[];
}

/**
 * Says which of the brackets that are there goes on as which of those found: the one that shares most frames with it. Where somebody named the
 * lead of a bracket it stays, even if nothing was found in its place.
 */
export function matchBrackets(
  found: readonly FoundBracket[],
  there: readonly Bracket[],
  frames: readonly { id: string; bracketId: string | null }[],
): MatchedBrackets {
  const byId = new Map(there.map((bracket) => [bracket.id, bracket]));
  const bracketOf = new Map(frames.map(({ id, bracketId }) => [id, byId.get(bracketId ?? '')]));
  const shared = found.flatMap((one) => {
    const theirs = one.frameIds.flatMap((id) => bracketOf.get(id) ?? []);
    return [...new Set(theirs)].map((bracket) => ({ one, bracket, count: theirs.filter((each) => each === bracket).length }));
  });
  const partner = new Map<FoundBracket, Bracket>();
  const used = new Set<Bracket>();
  for (const { one, bracket } of shared.sort((a, b) => b.count - a.count)) {
    if (partner.has(one) || used.has(bracket)) continue;
    partner.set(one, bracket);
    used.add(bracket);
  }
  return {
    kept: found.map((one) => [one, partner.get(one)]),
    gone: there.filter((bracket) => !used.has(bracket) && !bracket.leadByHand),
  };
}
