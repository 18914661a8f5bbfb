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
  return rowsOf(frames).map(completeRow).flatMap(splitRow).map(describeBracket);
}
