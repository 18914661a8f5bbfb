import { useSyncExternalStore } from 'react';

/** What lies around the pictures. Mid grey is sRGB 119, near 18 % reflectance (practice after ISO 3664). */
export const SURROUNDS = ['paper', 'grey', 'mid', 'black'] as const;
export type Surround = (typeof SURROUNDS)[number];

/** The sheet is read like paper; a single picture is judged on mid grey. */
const FIRST: Record<'sheet' | 'viewer', Surround> = { sheet: 'paper', viewer: 'mid' };
type Place = keyof typeof FIRST;

const hearers = new Set<() => void>();
const chosen = new Map<Place, Surround>();

function isSurround(value: string | null): value is Surround {
  return (SURROUNDS as readonly (string | null)[]).includes(value);
}

/** What a browser forgets (a private window, a full store) is chosen anew; nothing else depends on it. */
function recall(place: Place): Surround {
  const now = chosen.get(place);
  if (now) return now;
  try {
    const stored = localStorage.getItem(`oriel.surround.${place}`);
    return isSurround(stored) ? stored : FIRST[place];
  } catch {
    return FIRST[place];
  }
}

function choose(place: Place, surround: Surround): void {
  chosen.set(place, surround);
  try {
    localStorage.setItem(`oriel.surround.${place}`, surround);
  } catch {
    // Kept for this page alone.
  }
  hearers.forEach((hear) => hear());
}

function listen(hear: () => void): () => void {
  hearers.add(hear);
  return () => hearers.delete(hear);
}

/** The surround of a place and the way to change it; kept in this browser. */
export function useSurround(place: Place): [Surround, (next: Surround) => void] {
  const surround = useSyncExternalStore(listen, () => recall(place));
  return [surround, (next) => choose(place, next)];
}

/** The one after it, for a key that goes round. */
export function nextSurround(now: Surround): Surround {
  return SURROUNDS[(SURROUNDS.indexOf(now) + 1) % SURROUNDS.length] ?? 'paper';
}
