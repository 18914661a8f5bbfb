import { DERIVATIVE_SIZES } from '../../imaging/derivative-sizes.ts';
import type { Job } from '../../jobs/job.ts';
import { Frame } from '../../models/Frame.ts';
import { frameKey } from '../../services/storage-keys.ts';
import { RESTORABLE_DAYS } from './restore-frames.ts';

/** A day beyond the promise, so that nobody restores a frame whose files are just going. */
const PURGED_AFTER_DAYS = RESTORABLE_DAYS + 1;
const A_RUN = 500;

/** Deleted frames whose time is over and that no proof or final names any more. */
function overdue() {
  return Frame.query()
    .whereRaw('deleted_at < now() - make_interval(days => ?)', PURGED_AFTER_DAYS)
    .whereRaw('not exists (select from proofs where proofs.frame_id = frames.id)')
    .whereRaw('not exists (select from picks where picks.frame_ids @> array[frames.id])')
    .whereRaw('not exists (select from finals where finals.frame_id = frames.id)');
}

/** Removes the files and rows of frames deleted long ago. Files go first: a run cut off between finds the row again. */
export const purgeFrames: Job = {
  name: 'purge-frames',
  every: '41 3 * * *',
  timeoutSeconds: 1800,
  async run(ctx, _payload, tools) {
    for (const frame of await overdue().limit(A_RUN)) {
      tools.signal.throwIfAborted();
      await ctx.store.remove(frame.storageKey, ...DERIVATIVE_SIZES.map((size) => frameKey(frame, size)));
      await overdue().delete().where({ id: frame.id });
    }
  },
};
