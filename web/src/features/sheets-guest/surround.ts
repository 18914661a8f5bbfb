import { keptChoice, nextOf, useKept } from '../../lib/kept-choice.ts';

/** What lies around the pictures. Mid grey is sRGB 119, near 18% reflectance (practice after ISO 3664). */
export const SURROUNDS = ['paper', 'grey', 'mid', 'black'] as const;
export type Surround = (typeof SURROUNDS)[number];

/** The sheet is read like paper; a single picture is judged on mid grey. */
const KEPT = {
  sheet: keptChoice<Surround>('oriel.surround.sheet', SURROUNDS, 'paper'),
  viewer: keptChoice<Surround>('oriel.surround.viewer', SURROUNDS, 'mid'),
};

/** The surround of a place and the way to change it; kept in this browser. */
export function useSurround(place: keyof typeof KEPT): [Surround, (next: Surround) => void] {
  return useKept(KEPT[place]);
}

/** The one after it, for a key that goes round. */
export function nextSurround(now: Surround): Surround {
  return nextOf(SURROUNDS, now);
}
