import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { CommissionContents, CommissionDetail, CommissionPage, View as ViewAnswer, Views } from '../../api/contract/commissions.ts';
import { purgeCommissions } from '../../api/features/commissions/purge-commissions.job.ts';
import { Commission } from '../../api/models/Commission.ts';
import { answers } from '../support/expect-answer.ts';
import { makeClient } from '../support/factories/client.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { rowOfFrame, rowOfSheet } from '../support/factories/commission-life.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

let house: House;
let home: MadeStudio;

beforeAll(async () => {
  house = await startHouse();
});
afterAll(() => house.stop());
beforeEach(async () => {
  home = await makeStudio(house, { currency: 'EUR' });
});

const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
const daysAgo = (count: number) => new Date(Date.now() - count * 24 * 60 * 60 * 1000);

describe('beginning a commission', () => {
  it('takes a client of the studio, and the studio’s currency', async () => {
    const client = await makeClient(home.studio, { name: 'Harbour Trust' });
    const { body } = await home.assistant.agent
      .post('/api/commissions')
      .send({ title: 'Basin bridges', clientId: client.id, dueOn: '2026-12-24', allowance: 10, views: [{ title: 'North bridge, dusk' }] })
      .expect(201)
      .expect(answers(CommissionDetail));
    expect(body).toMatchObject({
      title: 'Basin bridges',
      client: { name: 'Harbour Trust' },
      state: 'Preparing',
      dueOn: '2026-12-24',
      shotOn: null,
      currency: 'EUR',
      extraPrice: 0,
      figures: { views: 1, frames: 0, record: 1 },
      can: { edit: true, price: false, close: true, reopen: false, remove: false },
    });
  });

  it('adds the client with it, or neither', async () => {
    const client = { name: 'Pell & Quarry Homes', contacts: [{ name: 'Jon Tarr', email: 'jon@pell.test' }] };
    const { body } = await home.owner.agent
      .post('/api/commissions')
      .send({ title: 'Sailmakers Row', client, extraPrice: 8500, currency: 'gbp' })
      .expect(201);
    expect(body).toMatchObject({ client: { name: 'Pell & Quarry Homes' }, extraPrice: 8500, currency: 'GBP' });
    await home.owner.agent.post('/api/commissions').send({ title: 'No', client, currency: 'XXQ' }).expect(422);
    const twice = { ...client, contacts: [client.contacts[0], client.contacts[0]] };
    const refused = await home.owner.agent.post('/api/commissions').send({ title: 'No', client: twice }).expect(422);
    expect(refused.body.errors).toEqual([{ path: 'client.contacts.1.email', message: 'Two contacts have this address.' }]);
    expect((await home.owner.agent.get('/api/clients')).body.items).toHaveLength(1);
  });

  it('leaves prices to the owner', async () => {
    const { id: clientId } = await makeClient(home.studio);
    const priced = { title: 'Customs House', clientId, extraPrice: 9000 };
    const { body } = await home.assistant.agent.post('/api/commissions').send(priced).expect(403);
    expect(body.detail).toBe('Only the owner of the studio sets the price of an extra and the currency.');
    await home.owner.agent.post('/api/commissions').send(priced).expect(201);
  });

  it('refuses a client of another studio, no client, and what is not filled in right', async () => {
    const other = await makeClient((await makeStudio(house)).studio);
    const { agent } = home.owner;
    const foreign = await agent.post('/api/commissions').send({ title: 'T', clientId: other.id }).expect(422);
    expect(foreign.body.errors).toEqual([{ path: 'clientId', message: 'This client is not there any more.' }]);
    await agent.post('/api/commissions').send({ title: 'T' }).expect(422);
    const wrong = await agent.post('/api/commissions').send({ title: '', dueOn: '2026-02-30', allowance: -1, extraPrice: 0.5 }).expect(422);
    expect(wrong.body.errors.map((error: { path: string }) => error.path)).toEqual(['title', 'dueOn', 'allowance', 'extraPrice']);
  });
});

describe('changing a commission', () => {
  const change = (id: string, version: number, values: object) =>
    home.owner.agent.patch(`/api/commissions/${id}`).set('If-Match', `"${version}"`).send(values);

  it('leaves what is missing and clears what is null', async () => {
    const commission = await makeCommission(home.studio, { brief: 'Six views.', dueOn: '2026-12-24', shotOn: '2026-11-02' });
    const { body } = await change(commission.id, 1, { dueOn: null, title: 'Renamed' }).expect(200).expect(answers(CommissionDetail));
    expect(body).toMatchObject({ title: 'Renamed', brief: 'Six views.', dueOn: null, shotOn: '2026-11-02', version: 2 });
  });

  it('writes a sentence into the record, and none where nothing changed', async () => {
    const commission = await makeCommission(home.studio, { title: 'Basin bridges' });
    await change(commission.id, 1, { title: 'Basin bridges', brief: 'New', dueOn: '2026-12-24', allowance: 9 }).expect(200);
    const same = await change(commission.id, 2, { brief: 'New' }).expect(200);
    expect(same.body.version).toBe(2);
    const { body } = await home.owner.agent.get(`/api/commissions/${commission.id}/record`).expect(200);
    expect(body.items.map((line: { says: string }) => line.says)).toEqual(['Changed the brief, due date and allowance']);
  });

  it('of a version that moved on is refused, and nothing is lost', async () => {
    const commission = await makeCommission(home.studio);
    const [one, two] = await Promise.all([change(commission.id, 1, { brief: 'One' }), change(commission.id, 1, { brief: 'Two' })]);
    expect([one.status, two.status].sort()).toEqual([200, 412]);
    const { body } = await home.owner.agent.get(`/api/commissions/${commission.id}`);
    expect(body.brief).toBe(one.status === 200 ? 'One' : 'Two');
    await home.owner.agent.patch(`/api/commissions/${commission.id}`).send({ brief: 'Three' }).expect(428);
  });

  it('lets an assistant write everything but the price', async () => {
    const commission = await makeCommission(home.studio, { extraPrice: 8500 });
    const patch = (values: object) => home.assistant.agent.patch(`/api/commissions/${commission.id}`).set('If-Match', '"1"').send(values);
    await patch({ extraPrice: 100 }).expect(403);
    await patch({ brief: 'As before', extraPrice: 8500 }).expect(200);
  });
});

describe('closing a commission', () => {
  it('makes it read-only until it is reopened', async () => {
    const commission = await makeCommission(home.studio);
    const { agent } = home.assistant;
    const closed = await agent.post(`/api/commissions/${commission.id}/close`).expect(200).expect(answers(CommissionDetail));
    expect(closed.body).toMatchObject({ state: 'Closed', can: { edit: false, close: false, reopen: true } });
    await agent.post(`/api/commissions/${commission.id}/close`).expect(200);
    const refused = await agent.patch(`/api/commissions/${commission.id}`).set('If-Match', '"2"').send({ brief: 'x' }).expect(409);
    expect(refused.body.code).toBe('commission-closed');
    await agent.post(`/api/commissions/${commission.id}/views`).send({ title: 'x' }).expect(409);
    const reopened = await agent.post(`/api/commissions/${commission.id}/reopen`).expect(200);
    expect(reopened.body.state).toBe('Preparing');
    const record = await agent.get(`/api/commissions/${commission.id}/record`);
    expect(record.body.items.map((line: { says: string }) => line.says)).toEqual(['Reopened the commission', 'Closed the commission']);
  });

  it('waits for an open sheet', async () => {
    const commission = await makeCommission(home.studio);
    const sheet = await rowOfSheet(commission, [], { issuedAt: new Date() });
    const { body } = await home.owner.agent.post(`/api/commissions/${commission.id}/close`).expect(409);
    expect(body.detail).toMatch(/A proof sheet is still open/);
    await sheet.$query().patch({ withdrawnAt: new Date() });
    await home.owner.agent.post(`/api/commissions/${commission.id}/close`).expect(200);
  });
});

describe('the list of commissions', () => {
  const titles = async (query: object) => {
    const { body } = await home.owner.agent.get('/api/commissions').query(query).expect(200).expect(answers(CommissionPage));
    return body.items.map((item: { title: string }) => item.title);
  };

  it.each(['newest', 'due', 'title'] as const)('sorted by %s shows each once, page by page, though some are alike', async (sort) => {
    const at = new Date();
    for (const [title, dueOn] of [
      ['Bridges', '2026-12-24'],
      ['Customs House', null],
      ['bridges', '2026-12-24'],
      ['Annual report', null],
      ['Ropewalk', '2026-12-03'],
    ] as const) {
      await makeCommission(home.studio, { title, dueOn, createdAt: at });
    }
    const seen: string[] = [];
    let after: string | undefined;
    do {
      const { body } = await home.owner.agent
        .get('/api/commissions')
        .query({ sort, limit: 2, ...(after ? { after } : {}) })
        .expect(200);
      seen.push(...body.items.map((item: { title: string }) => item.title));
      after = body.next ?? undefined;
    } while (after);
    expect([...seen].sort()).toEqual(['Annual report', 'Bridges', 'Customs House', 'Ropewalk', 'bridges']);
    if (sort === 'title') expect(seen.map((title) => title.toLowerCase())).toEqual([...seen].map((title) => title.toLowerCase()).sort());
    if (sort === 'due') expect(seen[0]).toBe('Ropewalk');
    if (sort === 'due') expect(seen.slice(3).sort()).toEqual(['Annual report', 'Customs House']);
  });

  it('puts what was begun last first', async () => {
    for (const [title, days] of [
      ['old', 9],
      ['new', 1],
      ['middle', 5],
    ] as const) {
      await makeCommission(home.studio, { title, createdAt: daysAgo(days) });
    }
    expect(await titles({})).toEqual(['new', 'middle', 'old']);
  });

  it('finds titles and clients', async () => {
    const client = await makeClient(home.studio, { name: 'Harbour Trust' });
    await makeCommission(home.studio, { title: 'Basin bridges', clientId: client.id });
    await makeCommission(home.studio, { title: 'Harbour lights' });
    await makeCommission(home.studio, { title: 'Ropewalk' });
    expect((await titles({ search: 'harbour' })).sort()).toEqual(['Basin bridges', 'Harbour lights']);
    expect(await titles({ clientId: client.id })).toEqual(['Basin bridges']);
    expect(await titles({ search: '%' })).toEqual([]);
  });

  it('filters by the derived state', async () => {
    const commission = await makeCommission(home.studio, { title: 'Out' });
    await makeCommission(home.studio, { title: 'In' });
    await rowOfSheet(commission, [], { issuedAt: new Date() });
    expect(await titles({ state: 'With client' })).toEqual(['Out']);
    expect(await titles({ state: 'Preparing' })).toEqual(['In']);
    await home.owner.agent.get('/api/commissions').query({ state: 'Lost' }).expect(422);
  });

  it('takes a damaged cursor for none and refuses a page of thousands', async () => {
    await makeCommission(home.studio, { title: 'Only' });
    expect(await titles({ after: 'not-a-cursor' })).toEqual(['Only']);
    await home.owner.agent.get('/api/commissions').query({ limit: 5000 }).expect(422);
  });
});

describe('deleting a commission', () => {
  it('says what goes, stops every address, and can be undone', async () => {
    const commission = await makeCommission(home.studio, { title: 'Basin bridges' });
    await rowOfSheet(commission, [await rowOfFrame(commission), await rowOfFrame(commission)]);
    const one = `/api/commissions/${commission.id}`;
    const contents = await home.owner.agent.get(`${one}/contents`).expect(200).expect(answers(CommissionContents));
    expect(contents.body).toEqual({ frames: 2, sheets: 1, pickLists: 0, finals: 0, deliveries: 0, storedBytes: 2_000_000, undoDays: 30 });
    await home.assistant.agent.delete(one).expect(403);
    await home.owner.agent.delete(one).expect(204);
    for (const path of ['', '/views', '/record', '/contents']) await home.owner.agent.get(one + path).expect(404);
    await home.owner.agent.patch(one).set('If-Match', '"1"').send({ brief: 'x' }).expect(404);
    await home.owner.agent.post(`${one}/close`).expect(404);
    await home.assistant.agent.get('/api/commissions').query({ deleted: 'true' }).expect(403);
    const { body } = await home.owner.agent.get('/api/commissions').query({ deleted: 'true' }).expect(200);
    expect(body.items).toMatchObject([{ title: 'Basin bridges' }]);
    await home.assistant.agent.post(`${one}/restore`).expect(403);
    const back = await home.owner.agent.post(`${one}/restore`).expect(200).expect(answers(CommissionDetail));
    expect(back.body.figures).toMatchObject({ frames: 2, proofs: 2 });
  });

  it('shuts its guests out at once', async () => {
    const { commission, sheet, lead } = await makeOpenSheet(house, home, { proofs: 1 });
    await lead.agent.get(`/api/guest/sheets/${sheet.id}`).expect(200);
    await home.owner.agent.delete(`/api/commissions/${commission.id}`).expect(204);
    await lead.agent.get(`/api/guest/sheets/${sheet.id}`).expect(404);
    await home.owner.agent.post(`/api/commissions/${commission.id}/restore`).expect(200);
    await lead.agent.get(`/api/guest/sheets/${sheet.id}`).expect(200);
  });

  it('removes rows and files for good after 30 days, and those of nobody else', async () => {
    const gone = await makeCommission(home.studio);
    const stays = await makeCommission(home.studio);
    const [lost, kept] = [await makeFrame(house, gone), await makeFrame(house, stays)];
    await rowOfSheet(gone, [lost]);
    await home.owner.agent.delete(`/api/commissions/${gone.id}`).expect(204);
    await home.owner.agent.delete(`/api/commissions/${stays.id}`).expect(204);
    await Commission.query()
      .findById(gone.id)
      .patch({ deletedAt: daysAgo(31) });
    await purgeCommissions.run(house.ctx, {}, tools);
    await purgeCommissions.run(house.ctx, {}, tools);
    expect(await Commission.query().findById(gone.id)).toBeUndefined();
    expect(await house.ctx.store.head(lost.storageKey)).toBeUndefined();
    const left: string[] = [];
    for await (const { key } of house.ctx.store.list(`studios/${home.studio.id}/commissions/${gone.id}`)) left.push(key);
    expect(left).toEqual([]);
    expect(await Commission.query().findById(stays.id)).toBeDefined();
    expect(await house.ctx.store.head(kept.storageKey)).toBeDefined();
    await home.owner.agent.post(`/api/commissions/${gone.id}/restore`).expect(404);
  });
});

describe('views', () => {
  const list = async (id: string) => {
    const { body } = await home.owner.agent.get(`/api/commissions/${id}/views`).expect(200).expect(answers(Views));
    return body.items as ViewAnswer[];
  };

  it('are added, changed from the version one saw, ordered and deleted', async () => {
    const { id } = await makeCommission(home.studio);
    const { agent } = home.assistant;
    for (const title of ['East front', 'Reading room', 'Forecourt']) {
      await agent.post(`/api/commissions/${id}/views`).send({ title, askedFor: 'one, dusk' }).expect(201).expect(answers(ViewAnswer));
    }
    const [first, second, third] = await list(id);
    const order = [third!.id, first!.id, second!.id];
    await agent.put(`/api/commissions/${id}/views/order`).send({ viewIds: order }).expect(200).expect(answers(Views));
    expect((await list(id)).map((view) => view.title)).toEqual(['Forecourt', 'East front', 'Reading room']);
    const patch = (title: string) => agent.patch(`/api/commissions/${id}/views/${first!.id}`).set('If-Match', '"1"').send({ title });
    await patch('East front across the basin').expect(200).expect(answers(ViewAnswer));
    await patch('Another').expect(412);
    expect((await list(id))[1]).toMatchObject({ title: 'East front across the basin', askedFor: 'one, dusk' });
    await agent.delete(`/api/commissions/${id}/views/${third!.id}`).expect(204);
    await agent.delete(`/api/commissions/${id}/views/${third!.id}`).expect(404);
    expect(await list(id)).toHaveLength(2);
  });

  it('are not ordered by a list that is not theirs', async () => {
    const { id, views } = await makeCommission(home.studio, { views: ['A', 'B'] });
    const other = await makeCommission(home.studio, { views: ['C'] });
    const [a, b, c] = [views[0]!.id, views[1]!.id, other.views[0]!.id];
    for (const viewIds of [[a], [a, b, c], [a, a], [a, c]]) {
      await home.owner.agent.put(`/api/commissions/${id}/views/order`).send({ viewIds }).expect(412);
    }
    expect((await list(id)).map((view) => view.title)).toEqual(['A', 'B']);
  });

  it('let go of their frames and proofs when they are deleted, and guests see it', async () => {
    const { commission, sheet, lead } = await makeOpenSheet(house, home, { proofs: 3, views: ['East front', 'Forecourt'] });
    const view = (await list(commission.id))[0]!;
    expect(view).toMatchObject({ frames: 1, proofs: 1 });
    const before = await lead.agent.get(`/api/guest/sheets/${sheet.id}/proofs`).expect(200);
    expect(before.body.storeys).toHaveLength(3);
    await home.owner.agent.delete(`/api/commissions/${commission.id}/views/${view.id}`).expect(204);
    const after = await lead.agent.get(`/api/guest/sheets/${sheet.id}/proofs`).expect(200);
    expect(after.body.revision).toBeGreaterThan(before.body.revision);
    expect(after.body.storeys.map((storey: { title: string }) => storey.title)).not.toContain('East front');
    expect(after.body.proofs).toHaveLength(3);
  });

  it('renamed at the same moment by two people keep the first name', async () => {
    const { id, views } = await makeCommission(home.studio, { views: ['A'] });
    const patch = (title: string) =>
      home.owner.agent.patch(`/api/commissions/${id}/views/${views[0]!.id}`).set('If-Match', '"1"').send({ title });
    const both = await Promise.all([patch('B'), patch('C')]);
    expect(both.map((answer) => answer.status).sort()).toEqual([200, 412]);
  });

  it('of another studio or commission are not there', async () => {
    const other = await makeStudio(house);
    const theirs = await makeCommission(other.studio, { views: ['Secret'] });
    const ours = await makeCommission(home.studio, { views: ['Ours'] });
    const { agent } = home.owner;
    await agent.get(`/api/commissions/${theirs.id}/views`).expect(404);
    await agent.post(`/api/commissions/${theirs.id}/views`).send({ title: 'x' }).expect(404);
    await agent.patch(`/api/commissions/${ours.id}/views/${theirs.views[0]!.id}`).set('If-Match', '"1"').send({ title: 'x' }).expect(404);
    await agent.delete(`/api/commissions/${ours.id}/views/${theirs.views[0]!.id}`).expect(404);
  });
});
