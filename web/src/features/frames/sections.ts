import type { Bracket } from '../../../../api/contract/brackets.ts';
import type { FrameItem } from '../../../../api/contract/frames.ts';

/** Which frames of those shown: all, those in brackets, those in none, those that somebody should look at, near-doubles. */
export type Group = 'all' | 'brackets' | 'single' | 'to-check' | 'alike';

/** Frames that stand together below one heading. */
export type Section =
  | { kind: 'bracket'; key: string; frames: FrameItem[]; bracket: Bracket }
  | { kind: 'alike'; key: string; frames: FrameItem[]; sharpest: FrameItem | null; softest: FrameItem | null }
  /** Each with the sentences of what to look at. */
  | { kind: 'to-check'; key: string; frames: FrameItem[] }
  /** A heading only where other sections stand beside it. */
  | { kind: 'single'; key: string; frames: FrameItem[]; headed: boolean };

/**
 * Puts the frames shown into sections, in their order: a bracket stands where the first of its frames would, all brackets before the
 * single frames. Frames of a bracket that is not known (yet) are single frames.
 */
export function sectionsOf(shown: readonly FrameItem[], brackets: ReadonlyMap<string, Bracket>, group: Group): Section[] {
  if (group === 'to-check') return filled({ kind: 'to-check', key: 'to-check', frames: shown.filter(isToCheck) });
  if (group === 'alike') return alikeSections(shown);
  const found = bracketSections(shown, brackets);
  if (group === 'brackets') return found;
  const single = shown.filter((frame) => !bracketOf(frame, brackets));
  const rest = filled({ kind: 'single', key: 'single', frames: single, headed: group === 'all' && found.length > 0 });
  return group === 'single' ? rest : [...found, ...rest];
}

export function isToCheck(frame: FrameItem): boolean {
  return frame.checks.some((check) => check.toCheck);
}

function filled(section: Section): Section[] {
  return section.frames.length > 0 ? [section] : [];
}

function bracketOf(frame: FrameItem, brackets: ReadonlyMap<string, Bracket>): Bracket | undefined {
  return frame.bracketId === null ? undefined : brackets.get(frame.bracketId);
}

function bracketSections(shown: readonly FrameItem[], brackets: ReadonlyMap<string, Bracket>): Section[] {
  const members = grouped(shown, (frame) => bracketOf(frame, brackets)?.id);
  return [...members].flatMap(([id, frames]) => {
    const bracket = brackets.get(id);
    if (!bracket) return [];
    const places = new Map(bracket.frameIds.map((frameId, at) => [frameId, at]));
    const darkestFirst = [...frames].sort((one, other) => (places.get(one.id) ?? 99) - (places.get(other.id) ?? 99));
    return [{ kind: 'bracket' as const, key: id, frames: darkestFirst, bracket }];
  });
}

/** A group of which one picture is left, as a single frame or a bracket, has nothing to decide. */
function alikeSections(shown: readonly FrameItem[]): Section[] {
  const groups = grouped(shown, (frame) => frame.alike?.group);
  return [...groups].flatMap(([key, frames]) => {
    const pictures = new Set(frames.map((frame) => frame.bracketId ?? frame.id));
    if (pictures.size < 2) return [];
    const which = (is: 'sharpest' | 'softest') => frames.find((frame) => frame.alike?.is === is) ?? null;
    return [{ kind: 'alike' as const, key, frames, sharpest: which('sharpest'), softest: which('softest') }];
  });
}

/** How many there are to be seen of each group; frames of brackets are counted by their brackets. */
export type GroupCounts = Record<Exclude<Group, 'all'>, number>;

/** Counts what the visible ones among frames come to. */
export function countGroups(frames: readonly FrameItem[]): GroupCounts {
  const visible = frames.filter((frame) => !frame.hidden);
  return {
    brackets: new Set(visible.flatMap((frame) => frame.bracketId ?? [])).size,
    single: visible.filter((frame) => frame.bracketId === null).length,
    'to-check': visible.filter(isToCheck).length,
    alike: alikeSections(visible).reduce((sum, section) => sum + section.frames.length, 0),
  };
}

/** Of near-doubles the frames that go where `kept` stays: a bracket stays whole. */
export function allBut(frames: readonly FrameItem[], kept: FrameItem): FrameItem[] {
  return frames.filter((frame) => frame.id !== kept.id && (kept.bracketId === null || frame.bracketId !== kept.bracketId));
}

function grouped(frames: readonly FrameItem[], keyOf: (frame: FrameItem) => string | undefined): Map<string, FrameItem[]> {
  const groups = new Map<string, FrameItem[]>();
  for (const frame of frames) {
    const key = keyOf(frame);
    if (key === undefined) continue;
    const group = groups.get(key);
    if (group) group.push(frame);
    else groups.set(key, [frame]);
  }
  return groups;
}
