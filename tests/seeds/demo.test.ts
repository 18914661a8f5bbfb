import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Demo, seedDemo } from '../../seeds/demo.ts';
import { type House, startHouse } from '../support/house.ts';

const dir = mkdtempSync(path.join(tmpdir(), 'oriel-demo-'));
let house: House;
let demo: Demo;

beforeAll(async () => {
  house = await startHouse();
  demo = await seedDemo(house.ctx, { dir, longSide: 240, runJobs: () => house.runJobs() });
}, 480_000);

afterAll(async () => {
  await house.stop();
  rmSync(dir, { recursive: true, force: true });
});

const signedIn = async (at: number) => {
  const agent = house.agent();
  const { email, password } = demo.signIns[at]!;
  await agent.post('/api/sign-in').set('Origin', house.address).send({ email, password }).expect(200);
  return agent;
};

describe('The demo', () => {
  it('lets the owner and the assistant in, with passwords of this installation alone', async () => {
    expect(demo.signIns.map(({ who }) => who)).toEqual(['owner', 'assistant']);
    for (const at of [0, 1]) await signedIn(at);
    expect(demo.signIns[0]!.password).not.toBe(demo.signIns[1]!.password);
  });

  it('shows a commission in each state that the work goes through', async () => {
    const agent = await signedIn(0);
    const { body } = await agent.get('/api/commissions?limit=50').expect(200);
    const states = Object.fromEntries(
      (body as { items: { title: string; state: string }[] }).items.map(({ title, state }) => [title, state]),
    );
    expect(states).toEqual({
      'Skyline for the annual report': 'Delivered',
      'Corn Exchange relighting': 'Picks in',
      'Basin bridges': 'With client',
      'Ropewalk Library, first light to last': 'Preparing',
      'Sailmakers Row, phase 2': 'Preparing',
    });
  });

  it('gives a proofing link that opens the sheet with marks of two people', async () => {
    const guest = house.agent();
    const token = demo.proofingLink.replace('/open/', '');
    const { body: opened } = await guest.post('/api/open').set('Origin', house.address).send({ token }).expect(200);
    const { goTo } = opened as { goTo: string };
    expect(goTo).toMatch(/^\/sheets\//);
    await guest.get(`/api/guest${goTo}`).expect(200);
    const marks = await house.ctx
      .knex('marks')
      .where({ sheetId: goTo.split('/').at(-1) })
      .distinct('accountId');
    expect(marks).toHaveLength(2);
  });

  it('has a delivery with two archives, a final with two versions, and downloads finished and broken off', async () => {
    const { knex } = house.ctx;
    expect(await knex('archives').where({ state: 'ready' })).toHaveLength(2);
    expect(await knex('finalVersions').where({ number: 2 })).toHaveLength(1);
    expect(await knex('downloads').whereNotNull('finishedAt')).toHaveLength(2);
    expect(await knex('downloads').whereNull('finishedAt')).toHaveLength(1);
  });

  it('has its brackets found and merged, and each of them is one proof of its merged picture', async () => {
    const { knex } = house.ctx;
    const sizes = await knex('frames').whereNotNull('bracketId').groupBy('bracketId').select(knex.raw('count(*)::int as size'));
    expect(sizes.map(({ size }: { size: number }) => size).sort()).toEqual([3, 3, 3, 3, 3, 3, 5, 5, 5]);
    expect(await knex('brackets').whereRaw('made_of is distinct from wanted')).toEqual([]);
    const proofs = await knex('proofs').whereNotNull('bracketId').select('pictured');
    expect(proofs).toHaveLength(9);
    for (const { pictured } of proofs) expect(pictured).toMatch(/^m[0-9a-f]{16}$/);
  });

  it('keeps its past in order: what came later has a later moment, and nothing lies ahead', async () => {
    const entries = await house.ctx.knex('recordEntries').whereNotNull('commissionId').orderBy('id').select('commissionId', 'at', 'did');
    const last = new Map<string, Date>();
    for (const { commissionId, at } of entries as { commissionId: string; at: Date }[]) {
      expect(at.getTime()).toBeLessThanOrEqual(Date.now());
      expect(at.getTime()).toBeGreaterThanOrEqual(last.get(commissionId)?.getTime() ?? 0);
      last.set(commissionId, at);
    }
  });

  it('leaves the record as guarded as it found it', async () => {
    await expect(house.ctx.knex('recordEntries').update({ says: 'something else' })).rejects.toThrow(/never changed/);
    await expect(house.ctx.knex('pickLists').update({ words: 'something else' })).rejects.toThrow(/never changed/);
  });

  it('refuses to be made twice', async () => {
    await expect(seedDemo(house.ctx, { dir, longSide: 240 })).rejects.toThrow(/already/);
  });

  it('leaves nothing failed: no upload, no job, no mail', async () => {
    const { knex } = house.ctx;
    expect(await knex('uploads').whereNot({ state: 'done' })).toEqual([]);
    expect(await knex('mails').whereNot({ state: 'sent' }).select('kind', 'state', 'problem')).toEqual([]);
    expect(house.logged).toEqual([]);
  });
});
