import { keptChoice, nextOf, useKept } from '../../lib/kept-choice.ts';

/** Lines over a picture, to judge how it is composed. */
export const GUIDES = ['none', 'thirds', 'centre', 'diagonals'] as const;
export type Guides = (typeof GUIDES)[number];

/** From one point to another, in hundredths of the picture's width and height. */
export type GuideLine = readonly [x1: number, y1: number, x2: number, y2: number];

const THIRD = 100 / 3;

/** The lines of each: thirds and centre lines go from edge to edge, diagonals from corner to corner. */
export const GUIDE_LINES: Record<Guides, readonly GuideLine[]> = {
  none: [],
  thirds: [
    [THIRD, 0, THIRD, 100],
    [2 * THIRD, 0, 2 * THIRD, 100],
    [0, THIRD, 100, THIRD],
    [0, 2 * THIRD, 100, 2 * THIRD],
  ],
  centre: [
    [50, 0, 50, 100],
    [0, 50, 100, 50],
  ],
  diagonals: [
    [0, 0, 100, 100],
    [0, 100, 100, 0],
  ],
};

const KEPT = keptChoice<Guides>('oriel.guides', GUIDES, 'none');

/** The guides chosen now and the way to choose others; kept in this browser. */
export function useGuides(): [Guides, (next: Guides) => void] {
  return useKept(KEPT);
}

/** Those after them, for a key that goes round. */
export function nextGuides(now: Guides): Guides {
  return nextOf(GUIDES, now);
}
