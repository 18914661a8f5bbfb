import type { BracketCandidate } from './candidate.ts';
import { sayBracket } from './say-bracket.ts';
import { brightness, inThirds } from './stops.ts';

/** A frame as far as its place in a bracket depends on it. */
export type Exposed = Pick<BracketCandidate, 'id' | 'name' | 'takenLocal' | 'exposureTime' | 'fNumber' | 'iso'>;

/** A bracket whose frames are known already. */
export interface ArrangedBracket<Frame> {
  /** Darkest first; what the camera told nothing of stands last, by time and name. */
  frames: Frame[];
  /** Stops brighter than the lead, in the same order; null where that is unknown. */
  steps: (number | null)[];
  /** "5 frames, 2 stops apart, f/11, ISO 100". */
  says: string;
}

function asTaken(one: Exposed, two: Exposed): number {
  return (one.takenLocal ?? '9').localeCompare(two.takenLocal ?? '9') || one.name.localeCompare(two.name) || one.id.localeCompare(two.id);
}

function darkestFirst(one: Exposed, two: Exposed): number {
  const [a, b] = [brightness(one) ?? Infinity, brightness(two) ?? Infinity];
  return a === b ? asTaken(one, two) : a - b;
}

/** Puts the frames of a bracket in order and says what they are, whoever grouped them. */
export function arrangeBracket<Frame extends Exposed>(frames: readonly Frame[], leadId: string): ArrangedBracket<Frame> {
  const ordered = [...frames].sort(darkestFirst);
  const stops = ordered.map((frame) => brightness(frame));
  const lead = stops[ordered.findIndex(({ id }) => id === leadId)] ?? null;
  const known = stops.filter((value) => value !== null);
  const apart = known.slice(1).map((value, index) => value - (known[index] ?? 0));
  return {
    frames: ordered,
    steps: stops.map((value) => (value === null || lead === null ? null : inThirds(value - lead))),
    says: sayBracket(ordered, apart),
  };
}

/** The frame in the middle of the exposures, of two the one that was taken first. @throws Error where there is no frame */
export function middleFrame<Frame extends Exposed>(frames: readonly Frame[]): Frame {
  const ordered = [...frames].sort(darkestFirst);
  const half = (ordered.length - 1) / 2;
  const [middle] = ordered.slice(Math.floor(half), Math.ceil(half) + 1).sort(asTaken);
  if (!middle) throw new Error('A bracket without frames has no middle.');
  return middle;
}
