import type { InfiniteData, QueryClient } from '@tanstack/react-query';
import type { FrameItem, FrameList } from '../../../../api/contract/frames.ts';
import { frameKeys } from './queries.ts';

type Pages = InfiniteData<FrameList, string | null>;

/** Writes frames into the loaded pages: those that are there are replaced, new ones come at the end. */
export function writeFrames(queries: QueryClient, commissionId: string, frames: readonly FrameItem[]): void {
  changePages(queries, commissionId, (pages) => {
    const fresh = new Map(frames.map((frame) => [frame.id, frame]));
    const written = pages.map((page) => replaceIn(page, fresh));
    const last = written.at(-1);
    if (last && fresh.size > 0) written[written.length - 1] = { ...last, items: [...last.items, ...fresh.values()] };
    return written;
  });
}

/** Takes each frame out of `fresh` that it puts in; pages without one stay the same object. */
function replaceIn(page: FrameList, fresh: Map<string, FrameItem>): FrameList {
  if (!page.items.some((item) => fresh.has(item.id))) return page;
  return {
    ...page,
    items: page.items.map((item) => {
      const found = fresh.get(item.id) ?? item;
      fresh.delete(item.id);
      return found;
    }),
  };
}

/** Changes some frames in the loaded pages. */
export function changeFrames(queries: QueryClient, commissionId: string, ids: readonly string[], change: Partial<FrameItem>): void {
  const wanted = new Set(ids);
  changePages(queries, commissionId, (pages) =>
    pages.map((page) => ({ ...page, items: page.items.map((item) => (wanted.has(item.id) ? { ...item, ...change } : item)) })),
  );
}

/** Takes frames out of the loaded pages. */
export function removeFrames(queries: QueryClient, commissionId: string, ids: readonly string[]): void {
  const gone = new Set(ids);
  changePages(queries, commissionId, (pages) => pages.map((page) => ({ ...page, items: page.items.filter((item) => !gone.has(item.id)) })));
}

/** The loaded frames with these ids, as they are now. */
export function loadedFrames(queries: QueryClient, commissionId: string, ids: readonly string[]): FrameItem[] {
  const wanted = new Set(ids);
  const pages = queries.getQueryData<Pages>(frameKeys.list(commissionId))?.pages ?? [];
  return pages.flatMap((page) => page.items.filter((item) => wanted.has(item.id)));
}

function changePages(queries: QueryClient, commissionId: string, change: (pages: FrameList[]) => FrameList[]): void {
  queries.setQueryData<Pages>(frameKeys.list(commissionId), (data) => data && { ...data, pages: change(data.pages) });
}
