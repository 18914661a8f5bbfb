import type { BracketCandidate, FoundBracket } from './brackets/candidate.ts';
import { completeRow } from './brackets/complete-row.ts';
import { rowsOf } from './brackets/row.ts';
import { describeBracket } from './brackets/say-bracket.ts';
import { splitRow } from './brackets/split-row.ts';

export type { BracketCandidate, FoundBracket } from './brackets/candidate.ts';

/**
 * Finds the brackets among frames: one body, lens, focal length and size, each exposure begun within two seconds of the end of the one before,
 * all at least a third of a stop apart, the camera's own marks not against it, and the pictures alike once brightness is taken out. The answer
 * depends on the set of frames alone, not on their order, and comes in the order the brackets were taken.
 */
export function groupBrackets(frames: readonly BracketCandidate[]): FoundBracket[] {
  const steps = groupInSteps(frames);
  let step = steps.next();
  while (!step.done) step = steps.next();
  return step.value;
}

/** The same, in steps between which others may have their turn: ten thousand frames, one a second, take many seconds. */
export function* groupInSteps(frames: readonly BracketCandidate[]): Generator<void, FoundBracket[]> {
  const found: FoundBracket[] = [];
  for (const row of rowsOf(frames)) found.push(...(yield* splitRow(completeRow(row))).map(describeBracket));
  return found;
}
