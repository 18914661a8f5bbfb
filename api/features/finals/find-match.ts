import { matchFinal, type Doubt } from '../../domain/match-finals.ts';
import type { CurrentPick } from './current-picks.ts';

/** What to do with a finished file: hang it to a pick, or ask. */
export interface FoundMatch {
  match: 'by-name' | 'ask';
  frameId: string | null;
  /** Frames that come into consideration, likeliest first. */
  candidates: string[];
  /** Null where there is no pick to ask about yet; the question is put once there is one. */
  doubt: Doubt | null;
}

/** Finds the pick of a finished file by name and time. */
export function findMatch(file: { originalName: string; takenLocal: string | null }, picks: readonly CurrentPick[]): FoundMatch {
  if (picks.length === 0) return { match: 'ask', frameId: null, candidates: [], doubt: null };
  const found = matchFinal(
    { name: file.originalName, taken: file.takenLocal },
    // A merged file may bear the name of any frame of its bracket.
    picks.map(({ frameId, frames }) => ({
      id: frameId,
      names: frames.map(({ name }) => name),
      taken: frames.flatMap(({ takenLocal }) => takenLocal ?? []),
    })),
  );
  return found.kind === 'matched'
    ? { match: 'by-name', frameId: found.pickId, candidates: [], doubt: null }
    : { match: 'ask', frameId: null, candidates: found.candidates, doubt: found.doubt };
}
