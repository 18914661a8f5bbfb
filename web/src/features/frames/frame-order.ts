import type { FrameItem } from '../../../../api/contract/frames.ts';
import { formatAperture, formatFocalLength, formatIso, formatShutter } from '../../../../api/domain/photo-notation.ts';
import { formatLocalDay } from './local-time.ts';
import type { Group } from './sections.ts';

export type SortBy = 'taken' | 'name' | 'f-number' | 'exposure-time' | 'iso' | 'focal-length';
/** Which frames are shown: those that are not hidden, the hidden ones, those that could not be read, or those that were deleted. */
export type Shown = 'visible' | 'hidden' | 'failed' | 'deleted';

/** How the Frames page shows the frames of a commission. */
export interface FrameWish {
  sort: SortBy;
  descending: boolean;
  shown: Shown;
  /** Which of the visible frames. */
  group: Group;
  /** A view's id, `none` for frames under no view, or empty for all. */
  view: string;
  text: string;
}

const byName = new Intl.Collator('en', { numeric: true, sensitivity: 'base' });

const VALUES: Record<Exclude<SortBy, 'name'>, (frame: FrameItem) => number | string | null> = {
  taken: (frame) => frame.takenLocal,
  'f-number': (frame) => frame.fNumber,
  'exposure-time': (frame) => frame.exposureTime,
  iso: (frame) => frame.iso,
  'focal-length': (frame) => frame.focalLength,
};

/** The frames wished for, in the order wished for. What is unknown stands last, whatever the direction. */
export function arrange(frames: readonly FrameItem[], wish: FrameWish): FrameItem[] {
  const words = wish.text.toLowerCase().split(/\s+/).filter(Boolean);
  const found = frames.filter(
    (frame) => isShown(frame, wish.shown) && isUnder(frame, wish.view) && words.every((word) => speaksOf(frame, word)),
  );
  return found.sort((one, other) => compare(one, other, wish));
}

function compare(one: FrameItem, other: FrameItem, { sort, descending }: FrameWish): number {
  const turn = descending ? -1 : 1;
  const names = byName.compare(one.name, other.name) || (one.id < other.id ? -1 : 1);
  if (sort === 'name') return names * turn;
  const [a, b] = [VALUES[sort](one), VALUES[sort](other)];
  if (a === b) return names;
  if (a === null) return 1;
  if (b === null) return -1;
  return (a < b ? -1 : 1) * turn;
}

function isShown(frame: FrameItem, shown: Shown): boolean {
  // Deleted frames come in a list of their own.
  if (shown === 'deleted') return true;
  if (shown === 'failed') return frame.state === 'failed';
  return frame.hidden === (shown === 'hidden');
}

function isUnder(frame: FrameItem, view: string): boolean {
  if (view === '') return true;
  return view === 'none' ? frame.viewId === null : frame.viewId === view;
}

/** A word is part of the name, or one of the settings as they are written: f/8, 1/125, ISO, 100, 35mm, 28, Oct, 17:06. */
function speaksOf(frame: FrameItem, word: string): boolean {
  if (frame.name.toLowerCase().includes(word)) return true;
  return settingsWords(frame).some((one) => one === word || (word.includes(':') && one.startsWith(word)));
}

function settingsWords(frame: FrameItem): string[] {
  const written = [
    formatAperture(frame.fNumber),
    formatShutter(frame.exposureTime),
    formatIso(frame.iso),
    formatFocalLength(frame.focalLength),
    frame.takenLocal && `${formatLocalDay(frame.takenLocal)} ${frame.takenLocal.replace('T', ' ')}`,
  ];
  return written.flatMap((words) => (words ? [words.toLowerCase().replace(' ', ''), ...words.toLowerCase().split(' ')] : []));
}
