import type { Knex } from 'knex';
import { enqueue } from '../../jobs/queue.ts';

/** Has a frame measured, behind the frames that are still to be taken in. */
export async function queueMeasuring(trx: Knex, frameId: string): Promise<void> {
  await enqueue(trx, 'measure-frame', { frameId }, { key: `measure-frame:${frameId}`, priority: 5 });
}
