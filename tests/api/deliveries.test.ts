import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import type { DeliveryList, GuestDelivery, StudioDelivery } from '../../api/contract/deliveries.ts';
import { buildArchive } from '../../api/features/archives/build-archive.job.ts';
import { findStrandedArchives } from '../../api/features/archives/find-stranded-archives.job.ts';
import { sendDelivery } from '../../api/features/deliveries/send-delivery.job.ts';
import { Archive } from '../../api/models/Archive.ts';
import type { Commission } from '../../api/models/Commission.ts';
import { Delivery } from '../../api/models/Delivery.ts';
import type { FinalVersion } from '../../api/models/FinalVersion.ts';
import { RecordEntry } from '../../api/models/RecordEntry.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { dayFromNow, makeSentDelivery } from '../support/factories/delivery.ts';
import { makeFinal } from '../support/factories/final.ts';
import { makeAccount, makeGuestAgent, makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';
import { newestMail, tokenIn } from '../support/mail-links.ts';

// Every delivery makes pictures in child processes: on a busy machine that takes its time.
vi.setConfig({ testTimeout: 180_000 });

let house: House;
let made: MadeStudio;
const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
const OSKAR = { name: 'Oskar Lind', email: 'oskar@tarn-brandreth.test' };
const PETRA = { name: 'Petra Thorn', email: 'petra@tarn-brandreth.test' };

beforeAll(async () => {
  house = await startHouse();
  made = await makeStudio(house);
});
afterAll(() => house.stop());
beforeEach(() => house.mails.clear());

let commission: Commission;
let versions: FinalVersion[];
async function prepare(names = ['East front.jpg', 'Brücke.jpg']): Promise<void> {
  commission = await makeCommission(made.studio, { title: 'Ropewalk Library' });
  versions = [];
  for (const name of names) versions.push(await makeFinal(house, commission, { name }));
}

const many = () => `/api/commissions/${commission.id}/deliveries`;
const input = (more: object = {}) => ({
  finalVersionIds: versions.map((version) => version.id),
  recipients: [OSKAR],
  fetchBy: dayFromNow(60),
  words: 'Thank you for the day on the roof.',
  key: randomUUID(),
  ...more,
});
const deliver = async (more: object = {}) => (await made.assistant.agent.post(many()).send(input(more)).expect(201)).body as StudioDelivery;
const read = async (id: string) => (await made.owner.agent.get(`${many()}/${id}`).expect(200)).body as StudioDelivery;
const post = (id: string, verb: string, body: object = {}) => made.owner.agent.post(`${many()}/${id}/${verb}`).send(body);
const guestFor = async (email: string) => {
  const { Account } = await import('../../api/models/Account.ts');
  return makeGuestAgent(house, await Account.query().findOne({ email }).throwIfNotFound());
};

describe('a delivery', () => {
  it('builds its archives first; then its recipients get their mails, once', async () => {
    await prepare();
    const made1 = await deliver({ recipients: [OSKAR, PETRA, { ...OSKAR, email: 'OSKAR@tarn-brandreth.test' }] });
    expect(made1).toMatchObject({ number: 1, state: 'Preparing', sentAt: null });
    expect(made1.recipients.map(({ name, mail }) => [name, mail])).toEqual([
      ['Oskar Lind', null],
      ['Petra Thorn', null],
    ]);
    expect(house.mails.mails()).toHaveLength(0);
    await house.runJobs();
    const sent = await read(made1.id);
    expect(sent).toMatchObject({
      state: 'Sent',
      archives: [
        { kind: 'full', state: 'ready', files: 2 },
        { kind: 'web', state: 'ready', files: 2 },
      ],
    });
    expect(sent.recipients.every((one) => one.mail === 'sent')).toBe(true);
    expect(house.mails.mails()).toHaveLength(2);
    for (let again = 0; again < 2; again += 1) await sendDelivery.run(house.ctx, { deliveryId: made1.id }, tools);
    for (const archive of await Archive.query().where({ deliveryId: made1.id }))
      await buildArchive.run(house.ctx, { archiveId: archive.id }, tools);
    await house.runJobs();
    expect(house.mails.mails()).toHaveLength(2);
  });

  it('asked for twice with one key is one', async () => {
    await prepare(['One.jpg']);
    const same = input();
    const answers = await Promise.all([1, 2, 3].map(() => made.owner.agent.post(many()).send(same).expect(201)));
    expect(new Set(answers.map((answer) => (answer.body as StudioDelivery).id)).size).toBe(1);
    expect(await Delivery.query().where({ commissionId: commission.id }).resultSize()).toBe(1);
    await house.runJobs();
    expect(house.mails.mails()).toHaveLength(1);
  });

  it('is opened by the link of its mail', async () => {
    await prepare();
    await deliver();
    await house.runJobs();
    const mail = newestMail(house, OSKAR.email);
    expect(mail.subject).toBe('Harrow Lane Studio: your pictures of Ropewalk Library');
    const agent = house.agent();
    const { body } = await agent
      .post('/api/open')
      .send({ token: tokenIn(house, OSKAR.email, 'open') })
      .expect(200);
    const page = (await agent.get(`/api${(body as { goTo: string }).goTo}`).expect(200)).body as GuestDelivery;
    expect(page).toMatchObject({
      state: 'Sent',
      number: 1,
      commission: 'Ropewalk Library',
      recipient: 'Oskar Lind',
      words: 'Thank you for the day on the roof.',
      studio: { name: 'Harrow Lane Studio', replyTo: 'studio@harrow-lane.test' },
    });
    expect(page.files.map(({ name, width, height, size, sha256 }) => ({ name, width, height, size, sha256 }))).toEqual(
      versions.map(({ name, width, height, sizeBytes: size, sha256 }) => ({ name, width, height, size, sha256 })),
    );
    await house.request.get(page.files[0]?.pictures?.['960'] ?? '').expect(200);
    expect(page.archives.map(({ kind, files, fetched }) => [kind, files, fetched])).toEqual([
      ['full', 2, false],
      ['web', 2, false],
    ]);
  });

  it('makes double names distinct, and holds one version of each final', async () => {
    await prepare(['a.jpg']);
    await makeFinal(house, commission, { name: 'a.jpg' });
    const other = await makeFinal(house, commission, { name: 'A.JPG' });
    const twice = [
      versions[0]?.id,
      (await made.owner.agent.get(`/api/commissions/${commission.id}/finals`)).body.finals[0].versions[0].id as string,
    ];
    await made.owner.agent
      .post(many())
      .send(input({ finalVersionIds: twice }))
      .expect(422);
    const { files } = await deliver({ finalVersionIds: [versions[0]?.id, other.id] });
    expect(files.map((file) => file.name)).toEqual(['a.jpg', 'A (2).JPG']);
  });

  it.each([
    ['no file', { finalVersionIds: [] }, 'finalVersionIds'],
    ['a file that is not there', { finalVersionIds: [randomUUID()] }, 'finalVersionIds'],
    ['nobody', { recipients: [] }, 'recipients'],
    ['no address', { recipients: [{ name: 'Oskar', email: 'oskar' }] }, 'recipients.0.email'],
    ['a line break in an address', { recipients: [{ name: 'O', email: 'o@a.test\r\nBcc: x@b.test' }] }, 'recipients.0.email'],
    ['a date gone by', { fetchBy: '2026-01-01' }, 'fetchBy'],
    ['a date in a hundred years', { fetchBy: '2126-01-01' }, 'fetchBy'],
    ['no date', { fetchBy: 'soon' }, 'fetchBy'],
  ])('is refused with %s', async (_name, wrong, path) => {
    await prepare(['One.jpg']);
    const { body } = await made.owner.agent.post(many()).send(input(wrong)).expect(422);
    expect((body as { errors: { path: string }[] }).errors.map((error) => error.path)).toContain(path);
    expect(await Delivery.query().where({ commissionId: commission.id }).resultSize()).toBe(0);
  });

  it('keeps the version it was made with when a newer one comes, and that version stays', async () => {
    await prepare(['One.jpg']);
    const { id } = await deliver();
    await makeFinal(house, commission, { name: 'One.jpg' });
    expect((await read(id)).files.map((file) => file.versionNumber)).toEqual([1]);
    await made.owner.agent.post(`/api/final-versions/${versions[0]?.id}/remove`).expect(409);
  });
});

describe('building that fails', () => {
  it('is told, and tried again by a person', async () => {
    await prepare(['Lost.jpg']);
    await house.runJobs();
    house.mails.clear();
    await house.ctx.store.remove(versions[0]?.storageKey ?? '');
    const { id } = await deliver();
    const full = await Archive.query().findOne({ deliveryId: id, kind: 'full' }).throwIfNotFound();
    await expect(buildArchive.run(house.ctx, { archiveId: full.id }, { ...tools, lastAttempt: true })).rejects.toThrow();
    const failed = await read(id);
    expect(failed).toMatchObject({ state: 'Failed', can: { retry: true } });
    expect(failed.archives[0]?.problem).toContain('could not be written');
    expect(house.mails.mails()).toHaveLength(0);
    await house.ctx.store.put(versions[0]?.storageKey ?? '', Buffer.from('other bytes'), 'image/jpeg');
    await post(id, 'retry').expect(200);
    expect((await read(id)).state).toBe('Preparing');
    await expect(buildArchive.run(house.ctx, { archiveId: full.id }, { ...tools, lastAttempt: true })).rejects.toThrow(
      /not the file that was taken in/,
    );
    expect((await read(id)).archives[0]?.problem).toContain('"Lost.jpg"');
    await post(id, 'withdraw').expect(200);
  });

  it('without a word, as when the worker was killed at its last try, is found', async () => {
    await prepare(['One.jpg']);
    const { id } = await deliver();
    const archives = await Archive.query().where({ deliveryId: id });
    for (const archive of archives) await house.ctx.knex.raw('select graphile_worker.remove_job(?)', [`build-archive:${archive.id}`]);
    await findStrandedArchives.run(house.ctx, {}, tools);
    expect((await read(id)).state).toBe('Preparing');
    await house.ctx.knex.raw("update archives set created_at = now() - interval '1 hour' where delivery_id = ?", [id]);
    await findStrandedArchives.run(house.ctx, {}, tools);
    expect((await read(id)).state).toBe('Failed');
    await post(id, 'retry').expect(200);
    await house.runJobs();
    expect((await read(id)).state).toBe('Sent');
  });
});

describe('the studio', () => {
  it('adds people, who get their mail at once when the others have theirs', async () => {
    await prepare(['One.jpg']);
    const { id } = await deliver();
    await post(id, 'recipients', { recipients: [PETRA] }).expect(200);
    expect(house.mails.mails()).toHaveLength(0);
    await house.runJobs();
    expect(house.mails.mails()).toHaveLength(2);
    await post(id, 'recipients', { recipients: [{ name: 'Ada Quill', email: 'ada@tarn-brandreth.test' }] }).expect(200);
    await house.runJobs();
    expect(newestMail(house, 'ada@tarn-brandreth.test').subject).toContain('your pictures');
  });

  it('sends a new link; the one before opens no more', async () => {
    await prepare(['One.jpg']);
    const { id, recipients } = await deliver();
    await post(id, `recipients/${recipients[0]?.id}/send-again`).expect(409);
    await house.runJobs();
    const before = tokenIn(house, OSKAR.email, 'open');
    await post(id, `recipients/${recipients[0]?.id}/send-again`).expect(200);
    await house.runJobs();
    await house.agent().post('/api/open').send({ token: before }).expect(410);
    await house
      .agent()
      .post('/api/open')
      .send({ token: tokenIn(house, OSKAR.email, 'open') })
      .expect(200);
  });

  it('takes it back from one person at once, and gives it back', async () => {
    await prepare(['One.jpg']);
    const { id, recipients } = await deliver({ recipients: [OSKAR, PETRA] });
    await house.runJobs();
    const oskar = await guestFor(OSKAR.email);
    const petra = await guestFor(PETRA.email);
    const mine = recipients.find((one) => one.name === OSKAR.name)?.id;
    await oskar.agent.get(`/api/deliveries/${id}`).expect(200);
    await post(id, `recipients/${mine}/withdraw`).expect(200);
    await oskar.agent.get(`/api/deliveries/${id}`).expect(404);
    await petra.agent.get(`/api/deliveries/${id}`).expect(200);
    await post(id, `recipients/${mine}/restore`).expect(200);
    await oskar.agent.get(`/api/deliveries/${id}`).expect(200);
  });

  it('withdraws all of it, and gives it back', async () => {
    const sent = await makeSentDelivery(house, made, { names: ['One.jpg'] });
    commission = sent.commission;
    const address = `/api/deliveries/${sent.delivery.id}`;
    const { body } = await post(sent.delivery.id, 'withdraw').expect(200);
    expect(body).toMatchObject({ state: 'Withdrawn', can: { withdraw: false, restore: true, extend: false } });
    await sent.guest.agent.get(address).expect(404);
    await sent.guest.agent.get(`${address}/archives/full/download`).expect(404);
    await post(sent.delivery.id, 'recipients', { recipients: [PETRA] }).expect(409);
    await post(sent.delivery.id, 'restore').expect(200);
    await sent.guest.agent.get(address).expect(200);
  });

  it('withdrawn before it was sent goes out when it is given back', async () => {
    await prepare(['One.jpg']);
    const { id } = await deliver();
    await post(id, 'withdraw').expect(200);
    await house.runJobs();
    expect(house.mails.mails()).toHaveLength(0);
    await post(id, 'restore').expect(200);
    await house.runJobs();
    expect((await read(id)).state).toBe('Sent');
    expect(house.mails.mails()).toHaveLength(1);
  });

  it('sets a later last date, which opens an ended delivery again', async () => {
    const sent = await makeSentDelivery(house, made, { names: ['One.jpg'] });
    commission = sent.commission;
    const address = `/api/deliveries/${sent.delivery.id}`;
    await Delivery.query()
      .findById(sent.delivery.id)
      .patch({ endsAt: new Date(Date.now() - 1000) });
    const ended = (await sent.guest.agent.get(address).expect(200)).body as GuestDelivery;
    expect(ended).toMatchObject({ state: 'Ended', files: [], archives: [], studio: { replyTo: 'studio@harrow-lane.test' } });
    const refused = await sent.guest.agent.get(`${address}/archives/full/download`).expect(410);
    expect((refused.body as { detail: string }).detail).toContain('Write to Harrow Lane Studio at studio@harrow-lane.test');
    const before = await read(sent.delivery.id);
    expect(before.state).toBe('Ended');
    const patch = (version: number) =>
      made.owner.agent
        .patch(`${many()}/${sent.delivery.id}`)
        .set('If-Match', `"${version}"`)
        .send({ fetchBy: dayFromNow(30) });
    await patch(before.version).expect(200);
    await patch(before.version).expect(412);
    expect(((await sent.guest.agent.get(address).expect(200)).body as GuestDelivery).state).toBe('Sent');
  });

  it('is offered the people it knows', async () => {
    await prepare(['One.jpg']);
    await deliver({ recipients: [PETRA] });
    const { people, items } = (await made.owner.agent.get(many()).expect(200)).body as DeliveryList;
    expect(items).toHaveLength(1);
    expect(people.map(({ name, from }) => [name, from])).toEqual([
      ['Oskar Lind', 'contact'],
      ['Petra Thorn', 'delivery'],
    ]);
  });

  it('finds every step in the record', async () => {
    await prepare(['One.jpg']);
    const { id } = await deliver();
    await house.runJobs();
    await post(id, 'withdraw').expect(200);
    const did = await RecordEntry.query().where({ commissionId: commission.id }).orderBy('id').select('did', 'byName', 'says');
    expect(did.map((entry) => [entry.did, entry.byName])).toEqual([
      ['final.added', 'Oriel'],
      ['delivery.made', 'Petra Thorn'],
      ['delivery.sent', 'Oriel'],
      ['delivery.withdrawn', 'Ines Okafor'],
    ]);
    expect(did[1]?.says).toBe('Made delivery 1 of one file for Oskar Lind');
  });
});

describe('who may', () => {
  it('only the studio makes and changes, only named recipients look and fetch', async () => {
    const sent = await makeSentDelivery(house, made, { names: ['One.jpg'] });
    commission = sent.commission;
    const guestPage = `/api/deliveries/${sent.delivery.id}`;
    const file = (await sent.guest.agent.get(guestPage)).body.files[0].download as string;
    const guestAddresses = [guestPage, file, `${guestPage}/archives/full/download`, `${guestPage}/archives/web/download`];
    const otherGuest = await makeGuestAgent(house, await makeAccount());
    const otherStudio = await makeStudio(house, { name: 'Other Studio' });
    for (const address of guestAddresses) {
      await house.agent().get(address).expect(401);
      await otherGuest.agent.get(address).expect(404);
      await made.owner.agent.get(address).expect(401);
      await sent.guest.agent.head(address).expect(200);
    }
    const studioCalls = (agent: typeof made.owner.agent) => [
      agent.get(many()),
      agent.post(many()).send({ ...input(), finalVersionIds: [randomUUID()] }),
      agent.get(`${many()}/${sent.delivery.id}`),
      agent
        .patch(`${many()}/${sent.delivery.id}`)
        .set('If-Match', '"1"')
        .send({ fetchBy: dayFromNow(5) }),
      ...['retry', 'withdraw', 'restore'].map((verb) => agent.post(`${many()}/${sent.delivery.id}/${verb}`)),
      agent.post(`${many()}/${sent.delivery.id}/recipients`).send({ recipients: [PETRA] }),
      ...['send-again', 'withdraw', 'restore'].map((verb) =>
        agent.post(`${many()}/${sent.delivery.id}/recipients/${sent.recipient.id}/${verb}`),
      ),
    ];
    for (const call of studioCalls(otherStudio.owner.agent)) await call.expect(404);
    for (const call of studioCalls(sent.guest.agent)) await call.expect(401);
    for (const call of studioCalls(house.agent())) await call.expect(401);
  });

  it('a delivery is found under its own commission alone', async () => {
    const sent = await makeSentDelivery(house, made, { names: ['One.jpg'] });
    commission = await makeCommission(made.studio);
    await made.owner.agent.get(`${many()}/${sent.delivery.id}`).expect(404);
    await post(sent.delivery.id, 'withdraw').expect(404);
  });
});
