import { useCallback, useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { FrameWish, Shown, SortBy } from './frame-order.ts';
import type { Group } from './sections.ts';

const SORTS: SortBy[] = ['taken', 'name', 'f-number', 'exposure-time', 'iso', 'focal-length'];
const SHOWN: Shown[] = ['visible', 'hidden', 'failed', 'deleted'];
const GROUPS: Group[] = ['all', 'brackets', 'single', 'to-check', 'alike'];

/** What is shown and how it is sorted stands in the address, so that it survives a reload and the large view shares it. */
export function useFrameWish(): [FrameWish, (change: Partial<FrameWish>) => void, string] {
  const [search, setSearch] = useSearchParams();
  const wish = useMemo<FrameWish>(
    () => ({
      sort: SORTS.find((one) => one === search.get('sort')) ?? 'taken',
      descending: search.get('order') === 'desc',
      shown: SHOWN.find((one) => one === search.get('show')) ?? 'visible',
      group: GROUPS.find((one) => one === search.get('only')) ?? 'all',
      view: search.get('view') ?? '',
      text: search.get('text') ?? '',
    }),
    [search],
  );
  const change = useCallback(
    (part: Partial<FrameWish>) => setSearch((before) => written({ ...readBack(before), ...named(part) }), { replace: true }),
    [setSearch],
  );
  return [wish, change, search.toString()];
}

function named({ sort, descending, shown, group, view, text }: Partial<FrameWish>): Record<string, string> {
  return {
    ...(sort !== undefined && { sort: sort === 'taken' ? '' : sort }),
    ...(descending !== undefined && { order: descending ? 'desc' : '' }),
    ...(shown !== undefined && { show: shown === 'visible' ? '' : shown }),
    ...(group !== undefined && { only: group === 'all' ? '' : group }),
    ...(view !== undefined && { view }),
    ...(text !== undefined && { text }),
  };
}

function readBack(search: URLSearchParams): Record<string, string> {
  return Object.fromEntries(search);
}

function written(values: Record<string, string>): URLSearchParams {
  return new URLSearchParams(Object.entries(values).filter(([, value]) => value !== ''));
}
