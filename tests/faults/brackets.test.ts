import { type ChildProcess, spawn } from 'node:child_process';
import { setTimeout as pause } from 'node:timers/promises';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { groupFrames } from '../../api/features/brackets/group-frames.job.ts';
import { mergeBracket } from '../../api/features/brackets/merge-bracket.job.ts';
import { makeSheet } from '../../api/features/sheets/make-sheet.ts';
import { Bracket } from '../../api/models/Bracket.ts';
import { Frame } from '../../api/models/Frame.ts';
import { Proof } from '../../api/models/Proof.ts';
import { makeExposures } from '../support/factories/bracket.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';
import { runAllJobs } from '../support/run-all-jobs.ts';

let house: House;
let made: MadeStudio;
const workers: ChildProcess[] = [];

beforeAll(async () => {
  house = await startHouse();
  made = await makeStudio(house);
});
afterAll(async () => {
  for (const worker of workers) worker.kill('SIGKILL');
  await house.stop();
});

const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };

function startWorker(): ChildProcess {
  const env = { ...process.env, ...house.env, ORIEL_LOG_LEVEL: 'silent', AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true' };
  const worker = spawn(process.execPath, ['--import', 'tsx', 'api/worker.ts'], { env, stdio: 'ignore' });
  workers.push(worker);
  return worker;
}

async function kill(worker: ChildProcess): Promise<void> {
  const gone = new Promise((resolve) => worker.once('exit', resolve));
  worker.kill('SIGKILL');
  await gone;
}

async function until(holds: () => Promise<boolean>): Promise<void> {
  while (!(await holds())) await pause(50);
}

/** Frames of so many brackets of two, measured and not grouped yet. */
async function measuredBrackets(count: number) {
  const commission = await makeCommission(made.studio);
  const frames: Frame[] = [];
  for (let minute = 1; minute <= count; minute += 1) {
    frames.push(...(await makeExposures(house, commission, { stops: [0, 2], minute, seed: minute })));
  }
  await house.runJobs();
  return { commission, frames };
}

/** Whether a worker is at a bracket's merge. */
async function mergeBegan(bracketId: string): Promise<boolean> {
  const { rows } = await house.ctx.knex.raw<{ rows: unknown[] }>(
    'select id from graphile_worker.jobs where key = ? and locked_by is not null',
    [`merge-bracket:${bracketId}`],
  );
  return rows.length > 0;
}

/** The bracket that is merged last: a commission's merges run one after the other. */
async function lastInLine(): Promise<string> {
  const { rows } = await house.ctx.knex.raw<{ rows: { key: string }[] }>(
    `select key from graphile_worker.jobs where key like 'merge-bracket:%' order by run_at desc, id desc limit 1`,
  );
  return rows[0]?.key.split(':')[1] ?? '';
}

it('a worker killed in the middle of merging leaves nothing half done: another goes on', { timeout: 600_000 }, async () => {
  const { commission, frames } = await measuredBrackets(6);
  await groupFrames.run(house.ctx, { commissionId: commission.id }, tools);
  const rows = () => Bracket.query().where({ commissionId: commission.id }).orderBy('id');
  const merged = async () => (await rows()).filter(({ madeOf, wanted }) => madeOf === wanted).length;
  const before = (await rows()).map(({ id }) => id);
  const held = await lastInLine();
  // The worker can store this bracket's picture, and not write down that it did.
  const hold = await house.ctx.knex.transaction();
  await hold('brackets').where({ id: held }).forUpdate().select('id');
  const first = startWorker();
  await until(async () => (await merged()) > 0 && (await mergeBegan(held)));
  await kill(first);
  await hold.rollback();
  expect((await rows()).find(({ id }) => id === held)?.madeOf).toBeNull();
  const second = startWorker();
  await until(async () => (await merged()) === 6);
  await kill(second);
  expect((await rows()).map(({ id }) => id)).toEqual(before);
  const grouped = await Frame.query()
    .findByIds(frames.map(({ id }) => id))
    .whereNotNull('bracketId');
  expect(grouped).toHaveLength(12);
});

it(
  'grouping at the same time, more than once and while frames are laid on a sheet, makes each bracket one proof',
  { timeout: 120_000 },
  async () => {
    const { commission, frames } = await measuredBrackets(3);
    const group = () => groupFrames.run(house.ctx, { commissionId: commission.id }, tools);
    const ids = frames.map(({ id }) => id);
    const lay = () => makeSheet(house.ctx, made.owner.actor, commission.id, ids);
    const [, , sheet] = await Promise.all([group(), group(), lay(), group()]);
    expect(await Bracket.query().where({ commissionId: commission.id }).resultSize()).toBe(3);
    const proofs = await Proof.query().where({ sheetId: sheet.id }).orderBy('number');
    expect(proofs.map(({ number }) => number)).toEqual([1, 2, 3]);
    expect(new Set(proofs.map(({ bracketId }) => bracketId)).size).toBe(3);
  },
);

it('a merge that comes too late throws away what it made', { timeout: 120_000 }, async () => {
  const { commission } = await measuredBrackets(1);
  await groupFrames.run(house.ctx, { commissionId: commission.id }, tools);
  const { id, wanted } = await Bracket.query().findOne({ commissionId: commission.id }).throwIfNotFound();
  const { pixels } = house.ctx;
  const slow = {
    ...pixels,
    merge: async (...args: Parameters<typeof pixels.merge>) => {
      const picture = await pixels.merge(...args);
      await Bracket.query().findById(id).patch({ wanted: 'another' });
      return picture;
    },
  };
  await mergeBracket.run({ ...house.ctx, pixels: slow }, { bracketId: id }, tools);
  expect(await Bracket.query().findById(id)).toMatchObject({ madeOf: null, wanted: 'another' });
  const left: string[] = [];
  for await (const { key } of house.ctx.store.list(`studios/${made.studio.id}/commissions/${commission.id}/pictures/brackets/`))
    left.push(key);
  expect(left).toEqual([]);
  await Bracket.query().findById(id).patch({ wanted });
  await runAllJobs(house);
  expect(await Bracket.query().findById(id)).toMatchObject({ madeOf: wanted });
});
