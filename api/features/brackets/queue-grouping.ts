import type { Knex } from 'knex';
import { enqueue } from '../../jobs/queue.ts';
import type { Bracket } from '../../models/Bracket.ts';
import { lineOf } from '../frames/queue-measuring.ts';

/** Frames that come within so long of each other are grouped together. */
const GATHER_MS = 3000;
/** A bracket that may still grow is not merged at once. */
const GROWS_MS = 2000;

/** Has a commission's frames grouped soon: at most every few seconds while frames arrive, and once after the last. */
export async function queueGrouping(trx: Knex, commissionId: string): Promise<void> {
  const options = { key: `group-frames:${commissionId}`, runAt: new Date(Date.now() + GATHER_MS), keepRunAt: true, priority: 3 };
  await enqueue(trx, 'group-frames', { commissionId }, options);
}

/** Has a bracket merged, behind everything that brings frames in. */
export async function queueMerge(
  trx: Knex,
  { id: bracketId, commissionId }: Pick<Bracket, 'id' | 'commissionId'>,
  mayGrow: boolean,
): Promise<void> {
  const options = {
    key: `merge-bracket:${bracketId}`,
    priority: 8,
    line: lineOf(commissionId),
    ...(mayGrow ? { runAt: new Date(Date.now() + GROWS_MS) } : {}),
  };
  await enqueue(trx, 'merge-bracket', { bracketId }, options);
}

/** Has the pictures of a merge removed that nothing shows any more. */
export async function queueDrop(
  trx: Knex,
  { id, studioId, commissionId, madeOf }: { id: string; studioId: string; commissionId: string; madeOf: string | null },
): Promise<void> {
  if (madeOf !== null) await enqueue(trx, 'drop-merged', { bracketId: id, studioId, commissionId, madeOf }, { priority: 8 });
}
