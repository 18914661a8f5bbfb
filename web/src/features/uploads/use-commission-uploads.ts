import { useMemo } from 'react';
import { uploadQueueFor } from '../../lib/uploads/browser-queue.ts';
import type { UploadPurpose } from '../../lib/uploads/http-transport.ts';
import type { UploadQueue } from '../../lib/uploads/upload-queue.ts';
import { useCommissionChanges } from '../commissions/live.ts';

/** The upload queue of a commission, which hears from the server how its checks end. */
export function useCommissionUploads(commissionId: string, purpose: UploadPurpose): UploadQueue {
  const queue = useMemo(() => uploadQueueFor(commissionId, purpose), [commissionId, purpose]);
  useCommissionChanges(commissionId, (change) => {
    if (!('what' in change) || typeof change.uploadId !== 'string') return;
    const { uploadId } = change;
    if (change.what === 'upload-done') queue.heard({ uploadId, state: 'done' });
    if (change.what === 'upload-failed') queue.heard({ uploadId, state: 'failed', problem: String(change.problem) });
  });
  return queue;
}
