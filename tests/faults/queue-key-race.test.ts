import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { enqueue } from '../../api/jobs/queue.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;
beforeAll(async () => void (house = await startHouse()));
afterAll(() => house.stop());

const jobs = () => house.ctx.knex('graphile_worker._private_jobs').select('key', 'lockedAt', 'payload').orderBy('id');

describe('a job whose key is waiting already', () => {
  it('is put beside it when a worker takes the waiting one at that very moment', async () => {
    const { knex } = house.ctx;
    await enqueue(knex, 'watermark-proofs', { sheetId: 'first' }, { key: 'race' });
    const worker = await knex.transaction();
    await worker('graphile_worker._private_jobs').where({ key: 'race' }).update({ lockedAt: knex.fn.now(), lockedBy: 'lane' });
    // The queue's first statement still sees the job waiting; its second one waits here for the worker's transaction.
    const second = enqueue(knex, 'watermark-proofs', { sheetId: 'second' }, { key: 'race' });
    await expect
      .poll(async () => {
        const { rows } = await knex.raw<{ rows: unknown[] }>(
          `select 1 from pg_stat_activity where wait_event_type = 'Lock' and query ~ 'add_job'`,
        );
        return rows.length;
      })
      .toBe(1);
    await worker.commit();
    await second;
    expect(await jobs()).toMatchObject([
      { key: null, payload: { sheetId: 'first' } },
      { key: 'race', lockedAt: null, payload: { sheetId: 'second' } },
    ]);
  });

  it('replaces the waiting one where no worker has it', async () => {
    const { knex } = house.ctx;
    for (const sheetId of ['a', 'b']) await enqueue(knex, 'watermark-proofs', { sheetId }, { key: 'calm' });
    expect((await jobs()).filter((job) => job.key === 'calm')).toMatchObject([{ payload: { sheetId: 'b' } }]);
  });
});
