import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { groupFrames } from '../../api/features/brackets/group-frames.job.ts';
import { openToGrouping } from '../../api/features/brackets/open-to-grouping.ts';
import { writeBrackets } from '../../api/features/brackets/write-brackets.ts';
import type { FoundBracket } from '../../api/domain/brackets.ts';
import { Bracket } from '../../api/models/Bracket.ts';
import type { Commission } from '../../api/models/Commission.ts';
import { Frame } from '../../api/models/Frame.ts';
import { makeExposures } from '../support/factories/bracket.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;
let made: MadeStudio;
let commission: Commission;
let frames: Frame[];

beforeAll(async () => {
  house = await startHouse();
  made = await makeStudio(house);
});
afterAll(() => house.stop());

// Nobody runs the grouping that measuring queues: each test says itself when it happens.
beforeEach(async () => {
  commission = await makeCommission(made.studio);
  frames = await makeExposures(house, commission);
  await house.runJobs();
});

const ids = () => frames.map(({ id }) => id);
const compared = async () => (await openToGrouping(house.ctx.knex, commission)).frames;
const bracketOf = (frameIds: string[]): FoundBracket => ({ frameIds, leadId: frameIds[0] ?? '', steps: frameIds.map(() => 0), says: '' });
const there = async () => {
  const rows = await Frame.query().where({ commissionId: commission.id }).whereNotNull('bracketId').orderBy('id');
  return rows.map(({ id }) => id);
};
const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };

describe('what was found among frames is not written where, while they were compared,', () => {
  it('somebody deleted one', async () => {
    const before = await compared();
    await Frame.query()
      .findById(ids()[1] ?? '')
      .patch({ deletedAt: new Date() });
    expect(await writeBrackets(commission, before, [bracketOf(ids())])).toBe(false);
    expect(await there()).toEqual([]);
  });

  it('somebody joined two by hand', async () => {
    const before = await compared();
    const [first, second] = ids();
    await made.owner.agent
      .post(`/api/commissions/${commission.id}/brackets`)
      .send({ frameIds: [first, second] })
      .expect(201);
    expect(await writeBrackets(commission, before, [bracketOf(ids())])).toBe(false);
    expect(await there()).toEqual([first, second].sort());
  });

  it('a grouping that saw more came first', async () => {
    const before = (await compared()).filter(({ id }) => id !== ids()[2]);
    await groupFrames.run(house.ctx, { commissionId: commission.id }, tools);
    expect(await there()).toEqual(ids().sort());
    expect(await writeBrackets(commission, before, [bracketOf(ids().slice(0, 2))])).toBe(false);
    expect(await there()).toEqual(ids().sort());
  });
});

it('is written where only new frames came meanwhile', async () => {
  const before = await compared();
  const [late] = await makeExposures(house, commission, { stops: [0], minute: 30, seed: 3 });
  await house.runJobs();
  expect((await compared()).map(({ id }) => id)).toContain(late?.id);
  expect(await writeBrackets(commission, before, [bracketOf(ids())])).toBe(true);
  expect(await there()).toEqual(ids().sort());
  expect(await Bracket.query().where({ commissionId: commission.id }).resultSize()).toBe(1);
});

it('is compared anew as long as frames change meanwhile, and in the end tried later', async () => {
  const { knex } = house.ctx;
  const { raw } = knex;
  let rounds = 0;
  const meddling = vi.spyOn(knex, 'raw').mockImplementation(((sql: string, ...values: unknown[]) => {
    const answer = raw.apply(knex, [sql, ...values] as never) as unknown as Promise<unknown>;
    if (!sql.includes(`->>'thumb'`)) return answer;
    rounds += 1;
    const change = Frame.query()
      .findById(ids()[0] ?? '')
      .patch({ measuresRecipe: 100 + rounds });
    return answer.then(async (rows) => (await change, rows));
  }) as never);
  try {
    await expect(groupFrames.run(house.ctx, { commissionId: commission.id }, tools)).rejects.toThrow('changed 5 times');
  } finally {
    meddling.mockRestore();
  }
  expect(rounds).toBe(5);
  expect(await there()).toEqual([]);
});
