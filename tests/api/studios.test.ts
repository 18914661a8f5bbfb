import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { RecordEntry } from '../../api/models/RecordEntry.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { type MadeStudio, makeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;
let made: MadeStudio;
beforeAll(async () => void (house = await startHouse()));
afterAll(() => house.stop());
beforeEach(async () => void (made = await makeStudio(house)));

it('changes what is named, counts the version up and writes it into the record', async () => {
  const { agent } = made.owner;
  const before = (await agent.get('/api/studio').expect(200)).body;
  expect(before).toMatchObject({ name: 'Harrow Lane Studio', can: { change: true }, version: 1 });
  const { body } = await agent.patch('/api/studio').set('If-Match', '"1"').send({ currency: 'CZK', timeZone: 'Europe/Prague' }).expect(200);
  expect(body).toMatchObject({ name: 'Harrow Lane Studio', currency: 'CZK', timeZone: 'Europe/Prague', version: 2 });
  const line = await RecordEntry.query().findOne({ studioId: made.studio.id, did: 'studio.changed' });
  expect(line?.says).toBe("Changed the studio's time zone and currency");
});

it('loses no change of two people at once', async () => {
  const { agent } = made.owner;
  const answers = await Promise.all(
    ['First Name', 'Second Name'].map((name) => agent.patch('/api/studio').set('If-Match', '"1"').send({ name })),
  );
  expect(answers.map((answer) => answer.status).sort()).toEqual([200, 412]);
  await agent.patch('/api/studio').send({ name: 'Without version' }).expect(428);
});

it.each([
  ['name', { name: '' }],
  ['name', { name: 'Two\nlines' }],
  ['replyTo', { replyTo: 'a@b.test\r\nBcc: c@d.test' }],
  ['timeZone', { timeZone: 'Europe/Vessmouth' }],
  ['timeZone', { timeZone: '+01:00' }],
  ['currency', { currency: 'XTS' }],
  ['currency', { currency: 'pound' }],
])('refuses a wrong %s: %j', async (path, change) => {
  const { body } = await made.owner.agent.patch('/api/studio').set('If-Match', '"1"').send(change).expect(422);
  expect(body.errors[0].path).toBe(path);
});

it('is read by assistants and changed by the owner', async () => {
  const { body } = await made.assistant.agent.get('/api/studio').expect(200);
  expect(body.can).toEqual({ change: false });
  await made.assistant.agent.patch('/api/studio').set('If-Match', '"1"').send({ name: 'Mine' }).expect(403);
  await house.request.get('/api/studio').expect(401);
});

it('offers the currencies of ISO 4217 that people pay in', async () => {
  const { body } = await made.owner.agent.get('/api/currencies').expect(200);
  const byCode = new Map(body.items.map((one: { code: string; digits: number }) => [one.code, one.digits]));
  // ISO 4217 list one: minor units.
  expect([byCode.get('GBP'), byCode.get('JPY'), byCode.get('KWD'), byCode.get('XOF')]).toEqual([2, 0, 3, 0]);
  for (const code of ['XAU', 'XTS', 'XXX', 'CLF', 'USN']) expect(byCode.has(code)).toBe(false);
});

it('counts what is stored, of this studio alone', async () => {
  const other = await makeStudio(house);
  await makeFrame(house, await makeCommission(other.studio));
  const commission = await makeCommission(made.studio);
  const frames = [await makeFrame(house, commission), await makeFrame(house, commission)];
  const { body } = await made.assistant.agent.get('/api/studio/storage').expect(200);
  const bytes = frames.reduce((sum, frame) => sum + frame.sizeBytes, 0);
  expect(body.kinds.find((one: { kind: string }) => one.kind === 'frames')).toEqual({ kind: 'frames', files: 2, bytes });
  expect(body).toMatchObject({ bytes, limitBytes: house.ctx.config.limits.storageBytes });
});
