import type { Knex } from 'knex';
import { enqueue } from '../../jobs/queue.ts';

/** Measuring and merging of a commission take one lane of the worker between them: the others are for files that come in. */
export const lineOf = (commissionId: string): string => `look-into:${commissionId}`;

/** Has a frame measured, behind the frames that are still to be taken in. */
export async function queueMeasuring(trx: Knex, frame: { id: string; commissionId: string }): Promise<void> {
  const options = { key: `measure-frame:${frame.id}`, priority: 5, line: lineOf(frame.commissionId) };
  await enqueue(trx, 'measure-frame', { frameId: frame.id }, options);
}
