import type { Bracket } from '../../../../api/contract/brackets.ts';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { stepOf } from './bracket-words.ts';
import { stem } from './frame-words.ts';

/** A bracket that is looked at, with those of its frames that are loaded, darkest first. */
export interface BracketSet {
  bracket: Bracket;
  frames: FrameItem[];
}

/** One of the pictures of a bracket that are stepped through in place. */
export interface BracketPlace {
  frameId: string;
  merged: boolean;
  /** "Merged", "−4" */
  short: string;
  name: string;
}

/** The set that a frame belongs to; null for a single frame. */
export function bracketSetOf(frame: FrameItem, all: readonly FrameItem[], brackets: ReadonlyMap<string, Bracket>): BracketSet | null {
  const bracket = frame.bracketId === null ? undefined : brackets.get(frame.bracketId);
  if (!bracket) return null;
  const known = new Map(all.map((one) => [one.id, one]));
  return { bracket, frames: bracket.frameIds.flatMap((id) => known.get(id) ?? []) };
}

/** The merged picture where there is one, and the frames after it. */
export function placesOf({ bracket, frames }: BracketSet): BracketPlace[] {
  const merged = { frameId: bracket.leadFrameId, merged: true, short: 'Merged', name: 'Merged proof' };
  const single = frames.map(({ id, name }) => ({ frameId: id, merged: false, short: stepOf(bracket, id), name: stem(name) }));
  return bracket.merged.state === 'ready' ? [merged, ...single] : single;
}

/** The place `by` steps from what is shown; undefined beyond either end. */
export function stepIn(places: readonly BracketPlace[], frameId: string, merged: boolean, by: 1 | -1): BracketPlace | undefined {
  const at = places.findIndex((place) => place.merged === merged && (merged || place.frameId === frameId));
  return at === -1 ? undefined : places[at + by];
}
