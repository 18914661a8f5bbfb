import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import type { Bracket } from '../../../../api/contract/brackets.ts';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import type { FrameWish } from './frame-order.ts';
import { bracketsQuery } from './queries.ts';
import { sectionsOf, type Section } from './sections.ts';

const NONE: ReadonlyMap<string, Bracket> = new Map();

/** The brackets of a commission by their ids; `pending` until they are known or cannot be loaded. */
export function useBrackets(commissionId: string): { brackets: ReadonlyMap<string, Bracket>; pending: boolean } {
  const { data, isPending } = useQuery(bracketsQuery(commissionId));
  const brackets = useMemo(() => (data ? new Map(data.items.map((bracket) => [bracket.id, bracket])) : NONE), [data]);
  return { brackets, pending: isPending };
}

/** The frames found in the sections they are shown in, and all of them in that order. What is hidden, failed or deleted has no sections. */
export function useSections(
  found: readonly FrameItem[],
  brackets: ReadonlyMap<string, Bracket>,
  { shown, group }: Pick<FrameWish, 'shown' | 'group'>,
): { sections: Section[]; shown: FrameItem[] } {
  return useMemo(() => {
    const plain = shown !== 'visible';
    const sections = sectionsOf(found, plain ? NONE : brackets, plain ? 'all' : group);
    return { sections, shown: sections.flatMap((section) => section.frames) };
  }, [found, brackets, shown, group]);
}
