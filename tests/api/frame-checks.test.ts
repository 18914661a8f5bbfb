import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { FrameItem } from '../../api/contract/frames.ts';
import { DEFAULT_THRESHOLDS } from '../../api/domain/check-thresholds.ts';
import { measureOlder } from '../../api/features/frames/measure-older.job.ts';
import type { Commission } from '../../api/models/Commission.ts';
import { Frame } from '../../api/models/Frame.ts';
import { makeExposures } from '../support/factories/bracket.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';
import { runAllJobs } from '../support/run-all-jobs.ts';

let house: House;
let ours: MadeStudio;
let commission: Commission;

beforeAll(async () => {
  house = await startHouse();
});
afterAll(async () => {
  expect(house.logged, 'what the log got at error level').toEqual([]);
  await house.stop();
});
beforeEach(async () => {
  ours = await makeStudio(house);
  commission = await makeCommission(ours.studio);
});

const frames = async (): Promise<FrameItem[]> =>
  (await ours.owner.agent.get(`/api/commissions/${commission.id}/frames`).expect(200)).body.items;
const summary = async () => (await ours.owner.agent.get(`/api/commissions/${commission.id}/frames/summary`).expect(200)).body;
const change = (values: object) => ours.owner.agent.put('/api/studio/checks').send({ thresholds: { ...DEFAULT_THRESHOLDS, ...values } });

describe('checks', () => {
  it('are on the frame, follow the thresholds at once, and count in the figures', async () => {
    const [shaken] = await makeExposures(house, commission, { stops: [0], values: { iso: 3200, exposureTime: 1 / 10 } });
    await runAllJobs(house);
    const named = async () => (await frames()).flatMap(({ checks }) => checks.map(({ check }) => check));
    expect(await named()).toContain('iso');
    await change({ isoAbove: 6400 }).expect(200);
    expect(await named()).not.toContain('iso');
    await change({ handSpeed: 2, sharpFrom: 20 }).expect(200);
    const quiet = (await summary()).toCheck;
    await change({ handSpeed: 100, sharpFrom: 20 }).expect(200);
    expect(await named()).toContain('shake');
    expect((await summary()).toCheck).toBe(1);
    expect(quiet).toBe(0);
    await ours.owner.agent
      .post(`/api/commissions/${commission.id}/frames/hide`)
      .send({ frameIds: [shaken?.id] })
      .expect(200);
    expect((await summary()).toCheck).toBe(0);
  });

  it('are never told to a client', async () => {
    const { sheet, frames: shown, lead } = await makeOpenSheet(house, ours, { proofs: 1 });
    await Frame.query()
      .findById(shown[0]?.id ?? '')
      .patch({ iso: 12800 });
    const { text } = await lead.agent.get(`/api/guest/sheets/${sheet.id}/proofs`).expect(200);
    expect(text).not.toContain('check');
    expect(text).not.toContain('measures');
  });

  it('are the owner’s to change, within reason', async () => {
    expect((await ours.assistant.agent.get('/api/studio/checks').expect(200)).body).toEqual({
      thresholds: DEFAULT_THRESHOLDS,
      defaults: DEFAULT_THRESHOLDS,
      can: { change: false },
    });
    await change({ tiltDegrees: 0 }).expect(422);
    await change({ apertureFrom: 16, apertureTo: 8 }).expect(422);
    const { body } = await change({ tiltDegrees: 1 }).expect(200);
    expect(body.thresholds).toEqual({ ...DEFAULT_THRESHOLDS, tiltDegrees: 1 });
  });

  it('are made up for frames that were there before there was measuring', async () => {
    const [frame] = await makeExposures(house, commission, { stops: [0] });
    await house.ctx.knex.raw('select graphile_worker.complete_jobs(array(select id from graphile_worker.jobs))');
    const measured = async () => (await Frame.query().findById(frame?.id ?? ''))?.measuresRecipe;
    const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
    await measureOlder.run(house.ctx, undefined, tools);
    await runAllJobs(house);
    expect(await measured()).toBeNull();
    await Frame.query()
      .findById(frame?.id ?? '')
      .patch({ createdAt: new Date(Date.now() - 20 * 60_000) });
    await measureOlder.run(house.ctx, undefined, tools);
    await runAllJobs(house);
    expect(await measured()).toEqual(expect.any(Number));
  });
});

describe('near-doubles', () => {
  it('are found, and one that is hidden is out of the running', async () => {
    const [one] = await makeExposures(house, commission, { stops: [0], minute: 1 });
    const [two] = await makeExposures(house, commission, { stops: [0], minute: 9 });
    await makeExposures(house, commission, { stops: [0], minute: 20, seed: 9 });
    await runAllJobs(house);
    const alike = async () => new Map((await frames()).map((frame) => [frame.id, frame.alike]));
    const found = await alike();
    expect(found.get(one?.id ?? '')).toMatchObject({ count: 2, group: one?.id });
    expect(found.get(two?.id ?? '')).toMatchObject({ count: 2, group: one?.id });
    expect((await summary()).alike).toBe(2);
    await ours.owner.agent
      .post(`/api/commissions/${commission.id}/frames/hide`)
      .send({ frameIds: [two?.id] })
      .expect(200);
    await runAllJobs(house);
    expect([...(await alike()).values()]).toEqual([null, null, null]);
  });
});

describe('uses', () => {
  it('are the studio’s table, and stand on its clients’ sheets', async () => {
    const { body: before } = await ours.assistant.agent.get('/api/studio/uses').expect(200);
    expect(before.uses).toEqual(before.defaults);
    // ISO 216 gives A4 as 210 mm by 297 mm.
    const uses = [{ id: 'a4', title: 'Our brochure', kind: 'page', widthMm: 210, heightMm: 297, ppi: 300 }];
    await ours.owner.agent
      .put('/api/studio/uses')
      .send({ uses: [...uses, ...uses] })
      .expect(422);
    const { body } = await ours.owner.agent.put('/api/studio/uses').send({ uses }).expect(200);
    expect(body.uses).toEqual(uses);
    const { sheet, lead } = await makeOpenSheet(house, ours, { proofs: 1 });
    expect((await lead.agent.get(`/api/guest/sheets/${sheet.id}`).expect(200)).body.uses).toEqual(uses);
  });
});
