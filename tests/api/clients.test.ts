import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { ClientDetail, ClientPage, Contact as ContactAnswer } from '../../api/contract/clients.ts';
import { purgeClients } from '../../api/features/clients/purge-clients.job.ts';
import { Client } from '../../api/models/Client.ts';
import { Contact } from '../../api/models/Contact.ts';
import { answers } from '../support/expect-answer.ts';
import { makeClient } from '../support/factories/client.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

let house: House;
let home: MadeStudio;

beforeAll(async () => {
  house = await startHouse();
});
afterAll(() => house.stop());
beforeEach(async () => {
  home = await makeStudio(house);
});

const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };

describe('clients', () => {
  it('are added with their contacts', async () => {
    const added = await home.assistant.agent
      .post('/api/clients')
      .send({ name: ' Tarn Brandreth Architects ', contacts: [{ name: 'Oskar Lind', email: 'Oskar@Tarn.TEST', position: 'Partner' }] })
      .expect(201)
      .expect(answers(ClientDetail));
    expect(added.body).toMatchObject({
      name: 'Tarn Brandreth Architects',
      contacts: [{ email: 'oskar@tarn.test', telephone: '' }],
      can: { edit: true, remove: true, restore: false },
    });
  });

  it('name every wrong field at once', async () => {
    const { body } = await home.owner.agent
      .post('/api/clients')
      .send({ name: ' ', contacts: [{ name: '', email: 'nowhere' }] })
      .expect(422);
    expect(body.errors).toEqual([
      { path: 'name', message: 'Write the name.' },
      { path: 'contacts.0.name', message: 'Write the name.' },
      { path: 'contacts.0.email', message: 'This is no e-mail address.' },
    ]);
  });

  it('are listed by name, a page at a time, and each once', async () => {
    for (const name of ['Pell & Quarry Homes', 'harbour trust', 'Ångström Works', 'Visit Vessmouth', 'Harbour Trust']) {
      await makeClient(home.studio, { name });
    }
    const names: string[] = [];
    let after: string | undefined;
    do {
      const { body } = await home.owner.agent
        .get('/api/clients')
        .query({ limit: 2, ...(after ? { after } : {}) })
        .expect(200)
        .expect(answers(ClientPage));
      names.push(...body.items.map((client: { name: string }) => client.name));
      after = body.next ?? undefined;
    } while (after);
    expect(names).toHaveLength(5);
    expect(new Set(names).size).toBe(5);
    expect(names.map((name) => name.toLowerCase()).slice(0, 2)).toEqual(['harbour trust', 'harbour trust']);
  });

  it('are found by name and by contact, and a per cent sign is only that', async () => {
    await makeClient(home.studio, { name: 'Harbour Trust', contact: { name: 'Maren Holt', email: 'maren@harbour.test' } });
    await makeClient(home.studio, { name: '100% Glass', contact: { name: 'Jon Tarr', email: 'jon@glass.test' } });
    const found = async (search: string) => {
      const { body } = await home.owner.agent.get('/api/clients').query({ search }).expect(200);
      return body.items.map((client: { name: string }) => client.name);
    };
    expect(await found('harb')).toEqual(['Harbour Trust']);
    expect(await found('MAREN')).toEqual(['Harbour Trust']);
    expect(await found('@glass')).toEqual(['100% Glass']);
    expect(await found('%')).toEqual(['100% Glass']);
    expect(await found('_')).toEqual([]);
  });

  it('of another studio are not there', async () => {
    const other = await makeStudio(house);
    const client = await makeClient(other.studio);
    const { agent } = home.owner;
    await agent.get(`/api/clients/${client.id}`).expect(404);
    await agent.patch(`/api/clients/${client.id}`).set('If-Match', '"1"').send({ name: 'Ours now' }).expect(404);
    await agent.delete(`/api/clients/${client.id}`).expect(404);
    await agent.post(`/api/clients/${client.id}/restore`).expect(404);
    await agent.post(`/api/clients/${client.id}/contacts`).send({ name: 'X', email: 'x@x.test' }).expect(404);
    expect((await agent.get('/api/clients').expect(200)).body.items).toEqual([]);
  });

  it('changed by two people at once are changed by the first alone', async () => {
    const client = await makeClient(home.studio);
    const change = (name: string) => home.owner.agent.patch(`/api/clients/${client.id}`).set('If-Match', '"1"').send({ name });
    const [one, two] = await Promise.all([change('One'), change('Two')]);
    expect([one.status, two.status].sort()).toEqual([200, 412]);
    const now = await home.owner.agent.get(`/api/clients/${client.id}`).expect(200);
    expect(now.body).toMatchObject({ version: 2, name: one.status === 200 ? 'One' : 'Two' });
    await home.owner.agent.patch(`/api/clients/${client.id}`).send({ name: 'Three' }).expect(428);
  });

  it('keep what a change does not name', async () => {
    const client = await makeClient(home.studio, { name: 'Harbour Trust', remarks: 'Pays late' });
    const { body } = await home.owner.agent
      .patch(`/api/clients/${client.id}`)
      .set('If-Match', '"1"')
      .send({ name: 'Harbour Trust Vessmouth' })
      .expect(200)
      .expect(answers(ClientDetail));
    expect(body).toMatchObject({ name: 'Harbour Trust Vessmouth', remarks: 'Pays late' });
  });

  it('stay while they have a commission, and say so', async () => {
    const client = await makeClient(home.studio, { name: 'Harbour Trust' });
    const commission = await makeCommission(home.studio, { clientId: client.id });
    const refused = await home.owner.agent.delete(`/api/clients/${client.id}`).expect(409);
    expect(refused.body.detail).toBe('Harbour Trust has a commission and stays while there is one.');
    await home.owner.agent.delete(`/api/commissions/${commission.id}`).expect(204);
    const again = await home.owner.agent.delete(`/api/clients/${client.id}`).expect(409);
    expect(again.body.detail).toMatch(/can still be brought back/);
  });

  it('go and come back', async () => {
    const client = await makeClient(home.studio, { name: 'Harbour Trust' });
    await home.owner.agent.delete(`/api/clients/${client.id}`).expect(204);
    await home.owner.agent.delete(`/api/clients/${client.id}`).expect(404);
    expect((await home.owner.agent.get('/api/clients')).body.items).toEqual([]);
    const { body } = await home.owner.agent.post(`/api/clients/${client.id}/restore`).expect(200).expect(answers(ClientDetail));
    expect(body.contacts).toHaveLength(1);
    await home.owner.agent.post(`/api/clients/${client.id}/restore`).expect(200);
    const says = await house.ctx.knex('recordEntries').where({ studioId: home.studio.id }).orderBy('id').pluck('says');
    expect(says).toEqual(['Deleted the client Harbour Trust', 'Brought the client Harbour Trust back']);
  });

  it('are gone for good 30 days after their deletion', async () => {
    const days = (count: number) => new Date(Date.now() - count * 24 * 60 * 60 * 1000);
    const kept = await makeClient(home.studio, { deletedAt: days(29) });
    const gone = await makeClient(home.studio, { deletedAt: days(31) });
    await purgeClients.run(house.ctx, {}, tools);
    await purgeClients.run(house.ctx, {}, tools);
    expect(await Client.query().whereIn('id', [kept.id, gone.id])).toHaveLength(1);
    expect(await Contact.query().where({ clientId: gone.id })).toEqual([]);
  });

  it('never get a commission while they are being deleted', async () => {
    const client = await makeClient(home.studio);
    const [deletion, creation] = await Promise.all([
      home.owner.agent.delete(`/api/clients/${client.id}`),
      home.assistant.agent.post('/api/commissions').send({ title: 'Basin bridges', clientId: client.id }),
    ]);
    expect([
      [204, 422],
      [409, 201],
    ]).toContainEqual([deletion.status, creation.status]);
  });
});

describe('contacts', () => {
  it('are added, changed from the version one saw, and deleted', async () => {
    const client = await makeClient(home.studio);
    const { agent } = home.assistant;
    const { body: contact } = await agent
      .post(`/api/clients/${client.id}/contacts`)
      .send({ name: 'Maren Holt', email: 'maren@harbour.test' })
      .expect(201)
      .expect(answers(ContactAnswer));
    const one = `/api/clients/${client.id}/contacts/${contact.id}`;
    await agent.patch(one).set('If-Match', '"1"').send({ position: 'Project lead' }).expect(200).expect(answers(ContactAnswer));
    const stale = await agent.patch(one).set('If-Match', '"1"').send({ position: 'Director' }).expect(412);
    expect(stale.body.detail).toMatch(/changed this meanwhile/);
    await agent.delete(one).expect(204);
    await agent.delete(one).expect(404);
  });

  it('have an address of their own within a client', async () => {
    const client = await makeClient(home.studio, { contact: { name: 'Oskar Lind', email: 'oskar@tarn.test' } });
    const { body } = await home.owner.agent
      .post(`/api/clients/${client.id}/contacts`)
      .send({ name: 'O. Lind', email: 'OSKAR@tarn.test' })
      .expect(422);
    expect(body.errors).toEqual([{ path: 'email', message: 'Oskar Lind has this address already.' }]);
    await home.owner.agent
      .post('/api/clients')
      .send({ name: 'Twice', contacts: [1, 2].map(() => ({ name: 'A', email: 'a@a.test' })) })
      .expect(422);
  });
});
