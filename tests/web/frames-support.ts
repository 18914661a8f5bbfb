import type { Bracket } from '../../api/contract/brackets.ts';
import type { FrameItem } from '../../api/contract/frames.ts';

/** A frame as the list has it; its id is its name. */
export function frame(name: string, more: Partial<FrameItem> = {}): FrameItem {
  return {
    id: name,
    name: `${name}.jpg`,
    state: 'ready',
    problem: null,
    width: 6000,
    height: 4000,
    placeholder: null,
    pictures: null,
    viewId: null,
    hidden: false,
    takenLocal: null,
    fNumber: null,
    exposureTime: null,
    iso: null,
    focalLength: null,
    bracketId: null,
    checks: [],
    alike: null,
    ...more,
  };
}

/** A bracket of frames two stops apart, the middle one its lead. */
export function bracket(id: string, frameIds: string[], more: Partial<Bracket> = {}): Bracket {
  const middle = Math.floor((frameIds.length - 1) / 2);
  return {
    id,
    leadFrameId: frameIds[middle] ?? '',
    frameIds,
    steps: frameIds.map((_, at) => (at - middle) * 2),
    says: `${frameIds.length} frames, 2 stops apart, f/11, ISO 100`,
    byHand: false,
    shows: 'merged',
    merged: { state: 'ready', width: 6000, height: 4000, placeholder: null, pictures: null, leftOut: [], problem: null },
    takenLocal: '2026-10-28T17:06:12.34',
    viewId: null,
    can: { regroup: true, change: true, why: null },
    ...more,
  };
}

/** Frames of one bracket. */
export function membersOf(id: string, names: string[], more: Partial<FrameItem> = {}): FrameItem[] {
  return names.map((name) => frame(name, { bracketId: id, ...more }));
}
