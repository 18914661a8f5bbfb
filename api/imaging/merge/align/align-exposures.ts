import { alignPair, type Findable } from './align-pair.ts';
import type { Shift } from './threshold-bitmaps.ts';

/** A frame, and where it stands among the exposures. */
export interface GreyExposure extends Findable {
  index: number;
  ev: number;
}

/** Frames already laid over the lead frame, the last one next in exposure. */
interface Laid {
  frame: Findable;
  shift: Shift;
}

/** Lays a frame over the nearest one that has something to say about it. */
function layOver(laid: Laid[], frame: Findable): Shift | null {
  let moved = false;
  for (const reference of [...laid].reverse()) {
    const verdict = alignPair(reference.frame, frame);
    if (verdict.is === 'aligned') return { x: reference.shift.x + verdict.shift.x, y: reference.shift.y + verdict.shift.y };
    moved ||= verdict.is === 'moved';
  }
  // Where nothing shows that it moved, it did as its neighbour did.
  return moved ? null : (laid.at(-1)?.shift ?? null);
}

/**
 * Aligns exposures by translation: from the lead frame outwards each is laid over its neighbour in exposure and the shifts are added up, as frames next
 * to each other show most in common.
 * @returns Shifts against the lead frame in pixels of the greys, by index; none for a frame that cannot be laid over the others.
 */
export function alignExposures(exposures: GreyExposure[], lead: GreyExposure): Map<number, Shift | null> {
  const shifts = new Map<number, Shift | null>([[lead.index, { x: 0, y: 0 }]]);
  const others = exposures.filter(({ index }) => index !== lead.index);
  const darker = others.filter(({ ev }) => ev <= lead.ev).sort((a, b) => b.ev - a.ev);
  const brighter = others.filter(({ ev }) => ev > lead.ev).sort((a, b) => a.ev - b.ev);
  for (const side of [darker, brighter]) {
    const laid: Laid[] = [{ frame: lead, shift: { x: 0, y: 0 } }];
    for (const frame of side) {
      const shift = layOver(laid, frame);
      if (shift) laid.push({ frame, shift });
      shifts.set(frame.index, shift);
    }
  }
  return shifts;
}
