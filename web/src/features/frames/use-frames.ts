import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { useDeferredValue, useEffect, useMemo } from 'react';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { arrange, type FrameWish } from './frame-order.ts';
import { viewsQuery } from '../commissions/queries.ts';
import { deletedFramesQuery, framesQuery } from './queries.ts';

/** All frames of a commission, page after page, and those among them that are wished for, in the order wished for. */
export function useFrames(commissionId: string, wish: FrameWish) {
  const query = useInfiniteQuery(wish.shown === 'deleted' ? deletedFramesQuery(commissionId) : framesQuery(commissionId));
  const { hasNextPage, isFetching, isError, fetchNextPage } = query;
  useEffect(() => {
    if (hasNextPage && !isFetching && !isError) void fetchNextPage();
  }, [hasNextPage, isFetching, isError, fetchNextPage]);
  const all = useMemo<FrameItem[]>(() => query.data?.pages.flatMap((page) => page.items) ?? [], [query.data]);
  // Typing stays fluent over ten thousand frames: the grid may follow a moment later.
  const calm = useDeferredValue(wish);
  const found = useMemo(() => arrange(all, calm), [all, calm]);
  return { query, all, found };
}

/** The views of the brief by their ids, with their numbers, in order. */
export function useViewTitles(commissionId: string): ReadonlyMap<string, { title: string; number: number }> {
  const { data } = useQuery(viewsQuery(commissionId));
  return useMemo(() => new Map(data?.items.map(({ id, title }, at) => [id, { title, number: at + 1 }]) ?? []), [data]);
}
