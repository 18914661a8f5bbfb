import { type ChildProcess, spawn } from 'node:child_process';
import { setTimeout as pause } from 'node:timers/promises';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { freeJobsOfTheDead } from '../../api/jobs/heart.ts';
import { enqueue } from '../../api/jobs/queue.ts';
import { startWork } from '../../api/jobs/work.ts';
import { Proof } from '../../api/models/Proof.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;
const workers: ChildProcess[] = [];

beforeAll(async () => {
  house = await startHouse();
});
afterAll(async () => {
  for (const worker of workers) worker.kill('SIGKILL');
  await house.stop();
});

function startWorker(): ChildProcess {
  const env = { ...process.env, ...house.env, ORIEL_LOG_LEVEL: 'silent', AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true' };
  const worker = spawn(process.execPath, ['--import', 'tsx', 'api/worker.ts'], { env, stdio: 'ignore' });
  workers.push(worker);
  return worker;
}

async function lockedBy(): Promise<string[]> {
  const { rows } = await house.ctx.knex.raw<{ rows: { lockedBy: string }[] }>(
    'select locked_by from graphile_worker.jobs where locked_by is not null',
  );
  return rows.map((row) => row.lockedBy);
}

async function until(holds: () => Promise<boolean>): Promise<void> {
  while (!(await holds())) await pause(100);
}

it(
  'the jobs of a worker killed with SIGKILL are taken up by another, and nothing is done twice or lost',
  { timeout: 600_000 },
  async () => {
    const made = await makeStudio(house);
    const { sheet } = await makeOpenSheet(house, made, { proofs: 24 });
    const first = startWorker();
    const ready = () => Proof.query().where({ sheetId: sheet.id }).whereNotNull('watermarkHash').resultSize();
    await until(async () => (await ready()) > 0 && (await lockedBy()).length > 0);
    first.kill('SIGKILL');
    await new Promise((resolve) => first.once('exit', resolve));
    expect(await lockedBy()).toHaveLength(1);
    expect(await ready()).toBeLessThan(24);
    startWorker();
    await until(async () => (await ready()) === 24);
    await until(async () => (await lockedBy()).length === 0);
    expect(await house.ctx.knex.raw('select id from graphile_worker.jobs').then((result) => result.rows.length)).toBe(0);
  },
);

it('a job that takes long is locked in a name that gives signs of life', { timeout: 600_000 }, async () => {
  let finish = () => undefined as void;
  const finished = new Promise<void>((resolve) => (finish = resolve));
  const work = await startWork(house.ctx, [{ name: 'take-long', run: () => finished }]);
  await enqueue(house.ctx.knex, 'take-long', {});
  await until(async () => (await lockedBy()).length === 1);
  const [holder = ''] = await lockedBy();
  await expect
    .poll(() => house.ctx.knex('workerBeats').where({ workerId: holder }).select('workerId'), { timeout: 60_000 })
    .toHaveLength(1);
  finish();
  await until(async () => (await lockedBy()).length === 0);
  await work.stop();
});

it('a worker that gives signs of life keeps its job', async () => {
  await enqueue(house.ctx.knex, 'nobody-knows-this', {});
  const hold = (worker: string) =>
    house.ctx.knex.raw(`update graphile_worker._private_jobs set locked_by = ?, locked_at = now() - interval '5 minutes'`, [worker]);
  await hold('worker-alive');
  await house.ctx.knex('workerBeats').insert({ workerId: 'worker-alive', beatAt: house.ctx.knex.fn.now() });
  expect(await freeJobsOfTheDead(house.ctx.knex)).toBe(0);
  expect(await lockedBy()).toEqual(['worker-alive']);
  await hold('worker-dead');
  expect(await freeJobsOfTheDead(house.ctx.knex)).toBe(1);
  expect(await lockedBy()).toEqual([]);
});
