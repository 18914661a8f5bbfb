import { useCallback, useSyncExternalStore } from 'react';
import type { UploadTotals } from '../../lib/uploads/totals.ts';
import type { UploadView } from '../../lib/uploads/upload-item.ts';
import type { UploadQueue } from '../../lib/uploads/upload-queue.ts';

/** The set as a whole; a new object at most four times a second. */
export function useUploadTotals(queue: UploadQueue): UploadTotals {
  return useSyncExternalStore(queue.store.subscribe, queue.store.totals);
}

/** The ids of all files in the list; the same array until a file came or went. */
export function useUploadIds(queue: UploadQueue): readonly string[] {
  return useSyncExternalStore(queue.store.subscribe, queue.store.ids);
}

/** One file of the list; only its own changes draw it again. */
export function useUpload(queue: UploadQueue, id: string): UploadView | undefined {
  const read = useCallback(() => queue.store.view(id), [queue, id]);
  return useSyncExternalStore(queue.store.subscribe, read);
}
