import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Bracket as BracketAnswer } from '../../api/contract/brackets.ts';
import type { FrameItem } from '../../api/contract/frames.ts';
import type { GuestProofs } from '../../api/contract/guest-sheets.ts';
import type { StudioSheet } from '../../api/contract/sheets.ts';
import { groupFrames } from '../../api/features/brackets/group-frames.job.ts';
import { mergeBracket } from '../../api/features/brackets/merge-bracket.job.ts';
import { Bracket } from '../../api/models/Bracket.ts';
import type { Commission } from '../../api/models/Commission.ts';
import { Frame } from '../../api/models/Frame.ts';
import { FrameMeasure } from '../../api/models/FrameMeasure.ts';
import { Proof } from '../../api/models/Proof.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { makeExposures } from '../support/factories/bracket.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeSheetGuest } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';
import { runAllJobs } from '../support/run-all-jobs.ts';

let house: House;
let ours: MadeStudio;
let commission: Commission;

beforeAll(async () => {
  house = await startHouse();
  ours = await makeStudio(house);
});
afterAll(async () => {
  expect(house.logged, 'what the log got at error level').toEqual([]);
  await house.stop();
});
beforeEach(async () => {
  commission = await makeCommission(ours.studio, { views: ['East front'] });
});

const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
const ids = (frames: readonly { id: string }[]) => frames.map(({ id }) => id);
const agent = () => ours.owner.agent;
const path = (more = '') => `/api/commissions/${commission.id}/brackets${more}`;
const brackets = async (): Promise<BracketAnswer[]> => (await agent().get(path()).expect(200)).body.items;
const only = async (): Promise<BracketAnswer> => {
  const [bracket, ...others] = await brackets();
  if (!bracket || others.length > 0) throw new Error(`There is not one bracket, but ${bracket ? others.length + 1 : 0}.`);
  return bracket;
};
const group = () => groupFrames.run(house.ctx, { commissionId: commission.id }, tools);
const makeSheet = async (frameIds: string[]): Promise<StudioSheet> =>
  (await agent().post(`/api/commissions/${commission.id}/sheets`).send({ frameIds }).expect(201)).body;
const readSheet = async (id: string): Promise<StudioSheet> => (await agent().get(`/api/sheets/${id}`).expect(200)).body;
const issue = (id: string) =>
  Sheet.query().patchAndFetchById(id, { issuedAt: new Date(), endsAt: new Date(Date.now() + 1e9), chooseBy: '2027-01-10' });

describe('frames that arrive', () => {
  it('are measured, grouped and merged with nobody asking, whatever their order', { timeout: 120_000 }, async () => {
    const [zero, minus, plus] = await makeExposures(house, commission);
    const [single] = await makeExposures(house, commission, { stops: [0], minute: 30, seed: 2 });
    await runAllJobs(house);
    const bracket = await only();
    expect(bracket).toMatchObject({
      leadFrameId: zero?.id,
      frameIds: [minus?.id, zero?.id, plus?.id],
      steps: [-2, 0, 2],
      says: '3 frames, 2 stops apart, f/11, ISO 100',
      byHand: false,
      shows: 'merged',
      takenLocal: '2026-10-28T17:05:12',
      merged: { state: 'ready', width: 480, height: 320, leftOut: [], problem: null },
      can: { regroup: true, change: true, why: null },
    });
    for (const size of ['480', '960', '2560'] as const) {
      await house.request
        .get(bracket.merged.pictures?.[size] ?? '')
        .expect(200)
        .expect('Content-Type', 'image/jpeg');
    }
    const { body } = await agent().get(`/api/commissions/${commission.id}/frames`).expect(200);
    const bracketOf = new Map((body.items as FrameItem[]).map((item) => [item.id, item.bracketId]));
    expect(bracketOf.get(plus?.id ?? '')).toBe(bracket.id);
    expect(bracketOf.get(single?.id ?? '')).toBeNull();
    const summary = (await agent().get(`/api/commissions/${commission.id}/frames/summary`).expect(200)).body;
    expect(summary).toMatchObject({ brackets: 1, single: 1 });
    const frame = (await agent().get(`/api/frames/${plus?.id}`).expect(200)).body;
    expect(frame.step).toBe(2);
    expect(frame.measures.histogram.luma).toHaveLength(64);
  });

  it('join a bracket that is there, which keeps its id and is merged anew under new addresses', async () => {
    const [first, second, third] = await makeExposures(house, commission);
    await Frame.query()
      .findById(third?.id ?? '')
      .patch({ deletedAt: new Date() });
    await runAllJobs(house);
    const before = await only();
    expect(before.frameIds.sort()).toEqual([first?.id, second?.id].sort());
    await Frame.query()
      .findById(third?.id ?? '')
      .patch({ deletedAt: null, measuresRecipe: 1 });
    await group();
    expect(await only()).toMatchObject({ id: before.id, merged: { state: 'waiting', pictures: null } });
    await runAllJobs(house);
    const after = await only();
    expect(after).toMatchObject({ id: before.id, merged: { state: 'ready' } });
    expect(after.frameIds).toHaveLength(3);
    expect(after.merged.pictures?.['480'].split('?')[0]).not.toBe(before.merged.pictures?.['480'].split('?')[0]);
    await house.request.get(before.merged.pictures?.['480'] ?? '').expect(404);
  });

  it('are the same brackets when they are grouped and merged twice', async () => {
    await makeExposures(house, commission);
    await makeExposures(house, commission, { minute: 20, seed: 3 });
    await runAllJobs(house);
    const rows = () => Bracket.query().where({ commissionId: commission.id }).orderBy('id');
    const before = await rows();
    expect(before).toHaveLength(2);
    await group();
    for (const { id } of before) await mergeBracket.run(house.ctx, { bracketId: id }, tools);
    expect(await rows()).toEqual(before);
  });

  it('are measured once more where nothing was known of them', async () => {
    const [frame] = await makeExposures(house, commission, { stops: [0] });
    await runAllJobs(house);
    expect((await Frame.query().findById(frame?.id ?? ''))?.measuresRecipe).toEqual(expect.any(Number));
    expect(await FrameMeasure.query().findById(frame?.id ?? '')).toMatchObject({ studioId: ours.studio.id });
  });
});

describe('by hand', () => {
  it('frames are joined and split, and the machine leaves it so', async () => {
    const frames = [
      ...(await makeExposures(house, commission, { stops: [0], minute: 1 })),
      ...(await makeExposures(house, commission, { stops: [2], minute: 9 })),
    ];
    await runAllJobs(house);
    expect(await brackets()).toEqual([]);
    const joined: BracketAnswer = (
      await agent()
        .post(path())
        .send({ frameIds: ids(frames) })
        .expect(201)
    ).body;
    expect(joined).toMatchObject({ frameIds: ids(frames), byHand: true, leadFrameId: frames[0]?.id, merged: { state: 'waiting' } });
    await runAllJobs(house);
    await group();
    expect(await only()).toMatchObject({ id: joined.id, merged: { state: 'ready' } });
    const split = (await agent().post(`/api/brackets/${joined.id}/split`).expect(200)).body;
    expect(split.frameIds.sort()).toEqual(ids(frames).sort());
    await group();
    expect(await brackets()).toEqual([]);
    await agent().post(`/api/brackets/${joined.id}/split`).expect(404);
    const record = await house.ctx.knex('recordEntries').where({ commissionId: commission.id }).orderBy('id').pluck('says');
    expect(record).toEqual(['Joined 2 frames to a bracket', 'Split a bracket of 2 frames']);
  });

  it('a bracket that was split stays split, and joining it again undoes that', async () => {
    const frames = await makeExposures(house, commission);
    await runAllJobs(house);
    const found = await only();
    await agent().post(`/api/brackets/${found.id}/split`).expect(200);
    await group();
    expect(await brackets()).toEqual([]);
    const again = await agent().post(path()).send({ frameIds: found.frameIds, leadFrameId: found.leadFrameId }).expect(201);
    const twice = await agent().post(path()).send({ frameIds: found.frameIds, leadFrameId: found.leadFrameId }).expect(201);
    expect(twice.body.id).toBe(again.body.id);
    expect((await only()).frameIds).toEqual(found.frameIds);
    expect(frames).toHaveLength(3);
  });

  it('a frame is taken out, and of two frames none is left a bracket', async () => {
    const [zero, minus, plus] = await makeExposures(house, commission);
    await runAllJobs(house);
    const { id } = await only();
    const out = (
      await agent()
        .post(`/api/brackets/${id}/take-out`)
        .send({ frameIds: [zero?.id] })
        .expect(200)
    ).body;
    expect(out).toMatchObject({ frameIds: [zero?.id], bracket: { id, frameIds: [minus?.id, plus?.id], byHand: true } });
    await group();
    expect((await only()).frameIds).toEqual([minus?.id, plus?.id]);
    const last = (
      await agent()
        .post(`/api/brackets/${id}/take-out`)
        .send({ frameIds: [plus?.id] })
        .expect(200)
    ).body;
    expect(last).toEqual({ frameIds: [plus?.id], bracket: null });
    await group();
    expect(await brackets()).toEqual([]);
  });

  it('another lead is named, and stays when the frames are grouped again', async () => {
    const [, minus] = await makeExposures(house, commission);
    await runAllJobs(house);
    const before = await only();
    const changed = await agent().patch(`/api/brackets/${before.id}`).send({ leadFrameId: minus?.id }).expect(200);
    expect(changed.body).toMatchObject({ leadFrameId: minus?.id, steps: [0, 2, 4], merged: { state: 'waiting' } });
    await group();
    await runAllJobs(house);
    expect(await only()).toMatchObject({ id: before.id, leadFrameId: minus?.id, merged: { state: 'ready' } });
  });

  it('what cannot be is refused in words', async () => {
    const [frame, other] = await makeExposures(house, commission, { stops: [0, 0.1] });
    const elsewhere = await makeExposures(house, await makeCommission(ours.studio), { stops: [0] });
    await runAllJobs(house);
    const join = (body: object) => agent().post(path()).send(body);
    await join({ frameIds: [frame?.id, frame?.id] }).expect(422);
    await join({ frameIds: [frame?.id, elsewhere[0]?.id] }).expect(422);
    await join({ frameIds: [frame?.id, other?.id], leadFrameId: elsewhere[0]?.id }).expect(422);
    const { body } = await join({ frameIds: [frame?.id, other?.id] }).expect(201);
    await agent().patch(`/api/brackets/${body.id}`).send({ leadFrameId: elsewhere[0]?.id }).expect(422);
    await agent().patch(`/api/brackets/${body.id}`).send({}).expect(422);
  });
});

describe('frames that go and come', () => {
  it('leave their bracket when they are deleted, and are in it again when they are restored', async () => {
    const [zero, minus, plus] = await makeExposures(house, commission);
    await runAllJobs(house);
    const { id } = await only();
    const frames = `/api/commissions/${commission.id}/frames`;
    await agent()
      .post(`${frames}/delete`)
      .send({ frameIds: [minus?.id] })
      .expect(200);
    expect(await only()).toMatchObject({ id, frameIds: [zero?.id, plus?.id] });
    await agent()
      .post(`${frames}/restore`)
      .send({ frameIds: [minus?.id] })
      .expect(200);
    await runAllJobs(house);
    expect(await only()).toMatchObject({ id, frameIds: [minus?.id, zero?.id, plus?.id], merged: { state: 'ready' } });
    await agent()
      .post(`${frames}/delete`)
      .send({ frameIds: [minus?.id, zero?.id] })
      .expect(200);
    expect(await brackets()).toEqual([]);
  });

  it('hang under a view as a whole', async () => {
    const frames = await makeExposures(house, commission);
    await runAllJobs(house);
    const viewId = commission.views?.[0]?.id;
    const { body } = await agent()
      .post(`/api/commissions/${commission.id}/frames/hang`)
      .send({ frameIds: [frames[1]?.id], viewId })
      .expect(200);
    expect(body.frameIds.sort()).toEqual(ids(frames).sort());
    expect((await only()).viewId).toBe(viewId);
  });
});

describe('on a proof sheet', () => {
  it('a bracket is one proof, of the merged picture, however many of its frames were chosen', async () => {
    const [zero, minus, plus] = await makeExposures(house, commission);
    await runAllJobs(house);
    const bracket = await only();
    const sheet = await makeSheet([minus?.id ?? '', plus?.id ?? '']);
    expect(sheet.proofs).toHaveLength(1);
    await agent()
      .post(`/api/sheets/${sheet.id}/proofs`)
      .send({ frameIds: [zero?.id] })
      .expect(200);
    await runAllJobs(house);
    const [proof, ...others] = (await readSheet(sheet.id)).proofs;
    expect(others).toEqual([]);
    expect(proof).toMatchObject({
      frameId: zero?.id,
      bracketId: bracket.id,
      exposures: { count: 3, merged: true, says: '3 exposures merged' },
      ready: true,
    });
    expect(proof?.pictures.small.split('?')[0]).toBe(bracket.merged.pictures?.['480'].split('?')[0]);
    const { body } = await agent().get(`/api/sheets/${sheet.id}/preview`).expect(200);
    const [seen] = (body.proofs as GuestProofs).proofs;
    expect(seen).toMatchObject({
      exposures: { count: 3, merged: true, says: '3 exposures merged' },
      asShot: { shutterRange: { fastest: 1 / 64, slowest: 1 / 4 }, apart: '2 stops apart' },
    });
    expect(JSON.stringify(body)).not.toContain('HL_06');
    await house.request.get(seen?.pictures?.large ?? '').expect(200);
  });

  it('frames laid on a draft one by one become one proof when they are grouped, and one of the lead when that is split', async () => {
    const frames = await makeExposures(house, commission);
    const sheet = await makeSheet(ids(frames));
    expect(sheet.proofs).toHaveLength(3);
    await runAllJobs(house);
    const bracket = await only();
    const [merged, ...others] = (await readSheet(sheet.id)).proofs;
    expect(others).toEqual([]);
    expect(merged).toMatchObject({ number: 1, bracketId: bracket.id, ready: true });
    await agent().post(`/api/brackets/${bracket.id}/split`).expect(200);
    const [single] = (await readSheet(sheet.id)).proofs;
    expect(single).toMatchObject({ frameId: bracket.leadFrameId, bracketId: null, exposures: null, ready: false });
    expect(single?.id).not.toBe(merged?.id);
  });

  it('shows the lead frame where the photographer says so: new pictures under new addresses, and a new revision', async () => {
    const frames = await makeExposures(house, commission);
    await runAllJobs(house);
    const bracket = await only();
    const sheet = await issue((await makeSheet(ids(frames))).id);
    await runAllJobs(house);
    const lead = await makeSheetGuest(house, sheet);
    const look = async () => (await lead.agent.get(`/api/guest/sheets/${sheet.id}/proofs`).expect(200)).body as GuestProofs;
    const before = await look();
    await agent().patch(`/api/brackets/${bracket.id}`).send({ shows: 'lead' }).expect(200);
    expect((await look()).proofs[0]?.pictures).toBeNull();
    await runAllJobs(house);
    const after = await look();
    expect(after.revision).toBeGreaterThan(before.revision);
    expect(after.proofs[0]).toMatchObject({ exposures: { count: 3, merged: false, says: '1 of 3 exposures' } });
    const [was, is] = [before.proofs[0]?.pictures?.large ?? '', after.proofs[0]?.pictures?.large ?? ''];
    expect(is.split('?')[0]).not.toBe(was.split('?')[0]);
    const pictures = await Promise.all([was, is].map(async (address) => (await house.request.get(address).expect(200)).body as Buffer));
    expect(pictures[0]?.equals(pictures[1] ?? Buffer.alloc(0))).toBe(false);
  });

  it('waits for its merged picture, and takes the lead where none can be made', async () => {
    const frames = await makeExposures(house, commission);
    await runAllJobs(house);
    const { id } = await only();
    await Bracket.query().findById(id).patch({ wanted: 'another', madeOf: null });
    const sheet = await makeSheet(ids(frames));
    await house.runJobs();
    expect((await readSheet(sheet.id)).proofs[0]).toMatchObject({ ready: false });
    for (const { id: frameId } of frames) await Frame.query().findById(frameId).patch({ recipe: 99 });
    await mergeBracket.run(house.ctx, { bracketId: id }, { ...tools, lastAttempt: true });
    for (const { id: frameId } of frames) await Frame.query().findById(frameId).patch({ recipe: 1 });
    await house.runJobs();
    expect(await only()).toMatchObject({ merged: { state: 'failed', problem: 'The frames could not be merged.' } });
    expect((await readSheet(sheet.id)).proofs[0]).toMatchObject({ ready: true, exposures: { merged: false } });
  });

  it('stays as it is once a client has it', async () => {
    const frames = await makeExposures(house, commission);
    await runAllJobs(house);
    const bracket = await only();
    await issue((await makeSheet(ids(frames))).id);
    const refused = await agent().post(`/api/brackets/${bracket.id}/split`).expect(409);
    expect(refused.body.detail).toBe('This bracket stays as it is. It is on proof sheet 1, which your client has.');
    await agent().post(`/api/brackets/${bracket.id}/take-out`).send({ frameIds: bracket.frameIds }).expect(409);
    const other = await makeExposures(house, commission, { stops: [0], minute: 40 });
    await agent()
      .post(path())
      .send({ frameIds: [frames[0]?.id, other[0]?.id] })
      .expect(409);
    const { body } = await agent()
      .post(`/api/commissions/${commission.id}/frames/delete`)
      .send({ frameIds: [frames[1]?.id] })
      .expect(200);
    expect(body).toMatchObject({ frameIds: [], refused: [{ why: 'It is on proof sheet 1, which your client has.' }] });
    // Even where the machine would see it otherwise now.
    await Frame.query().findByIds(ids(frames)).patch({ fNumber: 11, exposureTime: 1 });
    await group();
    expect((await only()).id).toBe(bracket.id);
    expect((await only()).can).toMatchObject({ regroup: false, change: true });
  });

  it('leaves single frames that a client has as single frames', async () => {
    const frames = await makeExposures(house, commission);
    await issue((await makeSheet(ids(frames))).id);
    await runAllJobs(house);
    expect(await brackets()).toEqual([]);
    expect(await Proof.query().whereIn('frameId', ids(frames)).resultSize()).toBe(3);
  });
});
