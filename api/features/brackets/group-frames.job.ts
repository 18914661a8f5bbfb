import { setImmediate } from 'node:timers/promises';
import { groupInSteps, type BracketCandidate, type FoundBracket } from '../../domain/brackets.ts';
import type { Context } from '../../context.ts';
import type { Job } from '../../jobs/job.ts';
import { Commission } from '../../models/Commission.ts';
import type { Frame } from '../../models/Frame.ts';
import { announceBrackets } from './announce-brackets.ts';
import { findDoubles } from './find-doubles.ts';
import { openToGrouping } from './open-to-grouping.ts';
import { writeBrackets } from './write-brackets.ts';

/** So often a person may come in between while frames are compared; after that the job is tried again later. */
const MOST_ROUNDS = 5;

/**
 * Groups the frames of a commission into brackets. What somebody decided by hand, and what a client has been shown or has picked, stays as it
 * is; brackets whose frames are the same keep their ids. Comparing thousands of frames takes seconds in which nobody is held up; what was
 * found is then written in one transaction if it still holds. So it may be cut off and run again.
 */
export const groupFrames: Job<{ commissionId: string }> = {
  name: 'group-frames',
  async run(ctx, { commissionId }) {
    const commission = await Commission.query(ctx.knex).findById(commissionId).whereNull('deletedAt');
    if (!commission) return;
    await regroup(ctx, commission);
    await findDoubles(commission);
    await announceBrackets(ctx.knex, commissionId);
  },
};

async function regroup(ctx: Context, commission: Commission): Promise<void> {
  for (let round = 1; round <= MOST_ROUNDS; round += 1) {
    const { frames } = await openToGrouping(ctx.knex, commission);
    const thumbs = await thumbsOf(ctx, commission);
    const found = await groupWithPauses(frames.map((frame) => candidateOf(frame, thumbs.get(frame.id) ?? null)));
    if (await writeBrackets(commission, frames, found)) return;
  }
  throw new Error(`The frames of a commission were changed ${MOST_ROUNDS} times while they were compared.`);
}

async function thumbsOf(ctx: Context, { id, studioId }: Commission): Promise<Map<string, string>> {
  const { rows } = await ctx.knex.raw<{ rows: { id: string; thumb: string }[] }>(
    `select f.id, m.measures->>'thumb' as thumb from frames f join frame_measures m on m.frame_id = f.id
      where f.studio_id = ? and f.commission_id = ? and m.measures->>'thumb' is not null`,
    [studioId, id],
  );
  return new Map(rows.map((row) => [row.id, row.thumb]));
}

/** Milliseconds at a stretch; a worker that gives no sign of life for long is taken for dead, and its jobs are begun again by others. */
const A_STRETCH = 50;

/** Groups frames, and lets everything else the worker does have its turn in between. */
async function groupWithPauses(frames: BracketCandidate[]): Promise<FoundBracket[]> {
  const steps = groupInSteps(frames);
  let begun = Date.now();
  for (let step = steps.next(); ; step = steps.next()) {
    if (step.done) return step.value;
    if (Date.now() - begun < A_STRETCH) continue;
    await setImmediate();
    begun = Date.now();
  }
}

function candidateOf(frame: Frame, thumb: string | null): BracketCandidate {
  const { id, name, takenLocal, exposureTime, fNumber, iso, exposureBias, exposureMode } = frame;
  const { make, model, serial, lens, focalLength, width, height } = frame;
  return {
    ...{ id, name, takenLocal, exposureTime, fNumber, iso, exposureBias, exposureMode },
    ...{ make, model, serial, lens, focalLength, width, height, thumb },
    takenAt: frame.takenAt?.getTime() ?? null,
  };
}
