import { DERIVATIVE_SIZES } from '../../imaging/derivative-sizes.ts';
import type { Job } from '../../jobs/job.ts';
import { Bracket } from '../../models/Bracket.ts';
import { mergedKey } from '../../services/storage-keys.ts';

/** Removes the pictures of a merge, unless the bracket shows them again. */
export const dropMerged: Job<{ bracketId: string; studioId: string; commissionId: string; madeOf: string }> = {
  name: 'drop-merged',
  async run(ctx, { bracketId, studioId, commissionId, madeOf }) {
    const bracket = await Bracket.within({ studioId }).findById(bracketId);
    if (bracket?.madeOf === madeOf || bracket?.wanted === madeOf) return;
    const gone = { id: bracketId, studioId, commissionId, madeOf };
    await ctx.store.remove(...DERIVATIVE_SIZES.map((size) => mergedKey(gone, size)));
  },
};
