import type { BracketCandidate } from './candidate.ts';
import type { Exposure, Row } from './row.ts';
import { brightness } from './stops.ts';

/** What the frame before this one had, else the next one after it that has something. */
function fromNeighbours<T>(values: readonly (T | null)[], at: number): T | null {
  const before = values.slice(0, at).findLast((value) => value !== null);
  return before ?? values.slice(at + 1).find((value) => value !== null) ?? null;
}

/**
 * Lends a frame whose f-number or sensitivity was lost that of its neighbour in the row. Where no frame has one, as with a lens without contacts,
 * it stays unknown, and makes no difference between them.
 */
export function completeRow(row: Row): Row {
  const fNumbers = row.map(({ frame }) => frame.fNumber);
  const sensitivities = row.map(({ frame }) => frame.iso);
  return row.map((exposure, at): Exposure => {
    if (fNumbers[at] !== null && sensitivities[at] !== null) return exposure;
    const frame: BracketCandidate = {
      ...exposure.frame,
      fNumber: fNumbers[at] ?? fromNeighbours(fNumbers, at),
      iso: sensitivities[at] ?? fromNeighbours(sensitivities, at),
    };
    return { ...exposure, frame, stops: brightness(frame) };
  });
}
