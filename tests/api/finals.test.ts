import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import type { FinalItem, FinalList } from '../../api/contract/finals.ts';
import { takeInFinal } from '../../api/features/finals/take-in-final.ts';
import { KEPT_DAYS, sweepFinals } from '../../api/features/finals/sweep-finals.job.ts';
import type { Commission } from '../../api/models/Commission.ts';
import { Final } from '../../api/models/Final.ts';
import { FinalVersion } from '../../api/models/FinalVersion.ts';
import type { Frame } from '../../api/models/Frame.ts';
import { Upload } from '../../api/models/Upload.ts';
import { startHouse, type House } from '../support/house.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeFinal, makePickList } from '../support/factories/final.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';

// Pictures are made in child processes: on a busy machine that takes its time.
vi.setConfig({ testTimeout: 180_000 });

let house: House;
let made: MadeStudio;
let commission: Commission;
let frames: Frame[];

beforeAll(async () => {
  house = await startHouse();
  made = await makeStudio(house);
});
afterAll(() => house.stop());
beforeEach(async () => {
  commission = await makeCommission(made.studio);
  frames = [
    await makeFrame(house, commission, { name: 'HL_0412.jpg', takenLocal: '2026-10-28T17:01:00' }),
    await makeFrame(house, commission, { name: 'HL_0413.jpg', takenLocal: '2026-10-28T17:02:00' }),
    await makeFrame(house, commission, { name: 'HL_0414.jpg', takenLocal: '2026-10-28T17:03:00' }),
  ];
});

const pick2 = () => makePickList(commission, frames.slice(0, 2), { viewTitles: ['East front, dusk', null] });
const list = async (): Promise<FinalList> =>
  (await made.owner.agent.get(`/api/commissions/${commission.id}/finals`).expect(200)).body as FinalList;
const final = async (name: string): Promise<FinalItem> => {
  const found = (await list()).finals.find((one) => one.versions.some((version) => version.name === name));
  if (!found) throw new Error(`no final has ${name}`);
  return found;
};
const change = (item: FinalItem, body: object, version = item.version) =>
  made.owner.agent.patch(`/api/finals/${item.id}`).set('If-Match', `"${version}"`).send(body);

describe('a finished file', () => {
  it('is hung to its pick by name, and counted', async () => {
    await pick2();
    await makeFinal(house, commission, { name: 'HL_0412_final-v2.tif' });
    const { picks, figures } = await list();
    const item = await final('HL_0412_final-v2.tif');
    expect(item).toMatchObject({ match: 'by-name', frameId: frames[0]?.id, title: 'East front, dusk', ownTitle: false, doubt: null });
    expect(picks.map((pick) => pick.finalId)).toEqual([item.id, null]);
    expect(figures).toMatchObject({ picks: 2, picksWithFinal: 1, toAsk: 0, further: 0 });
  });

  it('is the next version when one came before', async () => {
    await pick2();
    await makeFinal(house, commission, { name: 'HL_0412.tif' });
    await makeFinal(house, commission, { name: 'HL_0412_b.tif' });
    const { finals } = await list();
    expect(finals).toHaveLength(1);
    expect(finals[0]?.versions.map(({ number, name }) => [number, name])).toEqual([
      [2, 'HL_0412_b.tif'],
      [1, 'HL_0412.tif'],
    ]);
  });

  it('is asked about, with candidates, when its time contradicts its name', async () => {
    await pick2();
    await makeFinal(house, commission, { name: 'HL_0412.tif', takenLocal: '2026-10-28T17:02:00' });
    expect(await final('HL_0412.tif')).toMatchObject({
      match: 'ask',
      doubt: 'time-contradicts',
      candidates: [frames[0]?.id, frames[1]?.id],
      frameId: null,
    });
  });

  it('is asked about when its frame was not picked', async () => {
    await pick2();
    await makeFinal(house, commission, { name: 'HL_0414_final.tif' });
    expect(await final('HL_0414_final.tif')).toMatchObject({ match: 'ask', doubt: 'nothing-alike', candidates: [] });
  });

  it('needs no pick where nothing was picked, and the same name again is its next version', async () => {
    await makeFinal(house, commission, { name: 'Crane.tif' });
    await makeFinal(house, commission, { name: 'Crane.tif' });
    const { finals, figures } = await list();
    expect(finals).toHaveLength(1);
    expect(finals[0]).toMatchObject({ match: 'none', title: 'Crane', doubt: null });
    expect(finals[0]?.versions).toHaveLength(2);
    expect(figures).toMatchObject({ picks: 0, further: 1 });
  });

  it('taken in twice by the same upload is there once', async () => {
    await pick2();
    const version = await makeFinal(house, commission, { name: 'HL_0412.tif' });
    const upload = await Upload.query()
      .findById(version.uploadId ?? '')
      .throwIfNotFound();
    const judged = { mediaType: 'image/tiff', width: 10, height: 10, takenLocal: null };
    const again = await Promise.all([1, 2].map(() => FinalVersion.transaction((trx) => takeInFinal(trx, upload, judged))));
    expect(again.map((one) => one.id)).toEqual([version.id, version.id]);
  });

  it('and another of the same pick at the same moment are two versions of one final', async () => {
    await pick2();
    await Promise.all(['HL_0412_a.tif', 'HL_0412_b.tif', 'HL_0412_c.tif'].map((name) => makeFinal(house, commission, { name })));
    const { finals } = await list();
    expect(finals.map((one) => one.versions.map((version) => version.number))).toEqual([[3, 2, 1]]);
  });

  it('has its pictures and its web size made, once', async () => {
    const version = await makeFinal(house, commission, { name: 'Quay.jpg', width: 2400, height: 1600 });
    await house.runJobs();
    const item = await final('Quay.jpg');
    const pictures = item.versions[0]?.pictures;
    expect(item.versions[0]).toMatchObject({ width: 2400, height: 1600, placeholder: expect.any(String) as string });
    for (const address of Object.values(pictures ?? {})) await house.request.get(address).expect(200).expect('content-type', 'image/jpeg');
    expect(Object.keys(pictures ?? {})).toEqual(['480', '960', '2560']);
    const key = `studios/${version.studioId}/commissions/${commission.id}/web/${version.id}/r1.jpg`;
    expect((await house.ctx.store.head(key))?.size).toBeGreaterThan(1000);
  });
});

describe('a match', () => {
  it('is chosen by hand, and the pick’s older final keeps its place', async () => {
    await pick2();
    await makeFinal(house, commission, { name: 'HL_0412.tif' });
    await makeFinal(house, commission, { name: 'dusk.tif' });
    const asked = await final('dusk.tif');
    await change(asked, { frameId: frames[1]?.id }).expect(200);
    expect(await final('dusk.tif')).toMatchObject({ match: 'by-hand', frameId: frames[1]?.id, doubt: null });
    await change(await final('dusk.tif'), { frameId: frames[0]?.id }).expect(200);
    const { finals } = await list();
    expect(finals).toHaveLength(1);
    expect(finals[0]?.versions.map((version) => version.name)).toEqual(['dusk.tif', 'HL_0412.tif']);
  });

  it('can be that it is none of the picks', async () => {
    await pick2();
    await makeFinal(house, commission, { name: 'dusk.tif' });
    const { body } = await change(await final('dusk.tif'), { frameId: null }).expect(200);
    expect((body as FinalList).figures).toMatchObject({ toAsk: 0, further: 1 });
  });

  it('is refused to a frame that is no pick, and where somebody changed it meanwhile', async () => {
    await pick2();
    await makeFinal(house, commission, { name: 'dusk.tif' });
    const asked = await final('dusk.tif');
    await change(asked, { frameId: frames[2]?.id }).expect(422);
    await change(asked, { title: 'Dusk' }).expect(200);
    await change(asked, { frameId: frames[0]?.id }).expect(412);
    await made.owner.agent.patch(`/api/finals/${asked.id}`).send({ title: 'x' }).expect(428);
    await change(await final('dusk.tif'), {}).expect(422);
    expect(await final('dusk.tif')).toMatchObject({ title: 'Dusk', ownTitle: true });
  });

  it('that was wrong is undone by making the version a final of its own', async () => {
    await pick2();
    await makeFinal(house, commission, { name: 'HL_0412.tif' });
    const wrong = await makeFinal(house, commission, { name: 'HL_0412-pano.tif' });
    await made.owner.agent.post(`/api/final-versions/${wrong.id}/detach`).expect(200);
    expect(await final('HL_0412-pano.tif')).toMatchObject({ match: 'ask', candidates: [frames[0]?.id] });
    expect((await final('HL_0412.tif')).versions).toHaveLength(1);
    await made.owner.agent.post(`/api/final-versions/${wrong.id}/detach`).expect(409);
  });

  it('is put anew to the picks that came since', async () => {
    await pick2();
    await makeFinal(house, commission, { name: 'HL_0414_final.tif' });
    await makePickList(commission, [frames[2] as Frame]);
    expect(await final('HL_0414_final.tif')).toMatchObject({ match: 'ask', candidates: [frames[2]?.id] });
  });
});

describe('a version', () => {
  it('is removed and restored; the final goes and comes with its last one', async () => {
    await pick2();
    const version = await makeFinal(house, commission, { name: 'HL_0412.tif' });
    const removed = await made.assistant.agent.post(`/api/final-versions/${version.id}/remove`).expect(200);
    expect((removed.body as FinalList).finals).toEqual([]);
    await made.assistant.agent.post(`/api/final-versions/${version.id}/remove`).expect(200);
    await made.assistant.agent.post(`/api/final-versions/${version.id}/restore`).expect(200);
    expect(await final('HL_0412.tif')).toMatchObject({ match: 'by-name', frameId: frames[0]?.id });
  });

  it('restored after its pick got another final is asked about', async () => {
    await pick2();
    const first = await makeFinal(house, commission, { name: 'HL_0412.tif' });
    await made.owner.agent.post(`/api/final-versions/${first.id}/remove`).expect(200);
    await makeFinal(house, commission, { name: 'HL_0412_new.tif' });
    await made.owner.agent.post(`/api/final-versions/${first.id}/restore`).expect(200);
    expect(await final('HL_0412.tif')).toMatchObject({ match: 'ask', candidates: [frames[0]?.id] });
  });

  it('is let go of with its files after thirty days', async () => {
    const version = await makeFinal(house, commission, { name: 'gone.jpg' });
    const kept = await makeFinal(house, commission, { name: 'kept.jpg' });
    await house.runJobs();
    for (const one of [version, kept]) await made.owner.agent.post(`/api/final-versions/${one.id}/remove`).expect(200);
    await FinalVersion.query()
      .findById(version.id)
      .patch({ deletedAt: new Date(Date.now() - (KEPT_DAYS + 1) * 86_400_000) });
    const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
    await sweepFinals.run(house.ctx, {}, tools);
    await sweepFinals.run(house.ctx, {}, tools);
    expect(await house.ctx.store.head(version.storageKey)).toBeUndefined();
    expect(await house.ctx.store.head(kept.storageKey)).toBeDefined();
    expect(await Final.query().findById(version.finalId)).toBeUndefined();
    await made.owner.agent.post(`/api/final-versions/${version.id}/restore`).expect(404);
    await made.owner.agent.post(`/api/final-versions/${kept.id}/restore`).expect(200);
  });
});

describe('who may', () => {
  it('nobody without a session, nor another studio', async () => {
    const version = await makeFinal(house, commission, { name: 'mine.jpg' });
    const item = await final('mine.jpg');
    const stranger = await makeStudio(house, { name: 'Other Studio' });
    const calls = (agent: typeof stranger.owner.agent) => [
      agent.get(`/api/commissions/${commission.id}/finals`),
      agent.patch(`/api/finals/${item.id}`).set('If-Match', `"${item.version}"`).send({ title: 'stolen' }),
      ...['detach', 'remove', 'restore'].map((verb) => agent.post(`/api/final-versions/${version.id}/${verb}`)),
    ];
    for (const call of calls(stranger.owner.agent)) await call.expect(404);
    for (const call of calls(house.agent())) await call.expect(401);
  });

  it('nobody changes a closed commission', async () => {
    await makeFinal(house, commission, { name: 'closed.jpg' });
    const item = await final('closed.jpg');
    await commission.$query().patch({ closedAt: new Date() });
    await change(item, { title: 'late' }).expect(409);
    expect((await list()).can.change).toBe(false);
  });
});
