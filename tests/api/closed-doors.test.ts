import express from 'express';
import supertest from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { newToken } from '../../api/features/guests/tokens.ts';
import { sendDelivery } from '../../api/features/deliveries/send-delivery.job.ts';
import { problems } from '../../api/middleware/problem.ts';
import { Account } from '../../api/models/Account.ts';
import { Commission } from '../../api/models/Commission.ts';
import { Delivery } from '../../api/models/Delivery.ts';
import { DeliveryRecipient } from '../../api/models/DeliveryRecipient.ts';
import { Mail } from '../../api/models/Mail.ts';
import { Mark } from '../../api/models/Mark.ts';
import { Proof } from '../../api/models/Proof.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { SheetGuest } from '../../api/models/SheetGuest.ts';
import { makeSentDelivery } from '../support/factories/delivery.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

let house: House;
let made: MadeStudio;
beforeAll(async () => {
  house = await startHouse();
  made = await makeStudio(house);
});
afterAll(() => house.stop());

const deletion = ({ id }: { id: string }, deletedAt: Date | null) => Commission.query().findById(id).patch({ deletedAt });
const daysAgo = (days: number) => new Date(Date.now() - days * 86_400_000);

describe('a deleted commission', () => {
  it('takes no marks, and takes them again once it is back', async () => {
    const { commission, sheet, lead } = await makeOpenSheet(house, made, { proofs: 1 });
    const proof = await Proof.query().findOne({ sheetId: sheet.id }).throwIfNotFound();
    const mark = () => lead.agent.put(`/api/guest/sheets/${sheet.id}/proofs/${proof.id}/mark`);
    await deletion(commission, new Date());
    await mark().expect(404);
    expect(await Mark.query().where({ sheetId: sheet.id }).resultSize()).toBe(0);
    await deletion(commission, null);
    await mark().expect(200);
  });

  it('is withdrawn to its guests: links do not open, nothing new is sent, their list leads nowhere', async () => {
    const { commission, sheet, lead } = await makeOpenSheet(house, made, { proofs: 1 });
    const { token, hash } = newToken();
    await SheetGuest.query().findById(lead.guest.id).patch({ tokenHash: hash });
    await deletion(commission, new Date());
    expect((await house.request.post('/api/open').send({ token }).expect(410)).body.code).toBe('withdrawn');
    await house.request.post('/api/new-link').send({ token }).expect(202);
    expect(await Mail.query().where({ commissionId: commission.id }).resultSize()).toBe(0);
    const { items } = (await lead.agent.get('/api/mine').expect(200)).body;
    expect(items).toEqual([expect.objectContaining({ id: sheet.id, state: 'Withdrawn', goTo: null })]);
  });

  it('sends no delivery, and sends it once it is back', async () => {
    const { commission, delivery } = await makeSentDelivery(house, made, { names: ['East front.jpg'] });
    const mails = () => Mail.query().where({ commissionId: commission.id, kind: 'delivery' }).resultSize();
    await Mail.query().where({ commissionId: commission.id }).delete();
    await Delivery.query().findById(delivery.id).patch({ sentAt: null });
    await deletion(commission, new Date());
    await sendDelivery.run(
      house.ctx,
      { deliveryId: delivery.id },
      { signal: new AbortController().signal, attempt: 1, lastAttempt: false },
    );
    const again = await DeliveryRecipient.query().findOne({ deliveryId: delivery.id }).throwIfNotFound();
    const address = `/api/commissions/${commission.id}/deliveries/${delivery.id}`;
    await made.owner.agent.post(`${address}/recipients/${again.id}/send-again`).expect(404);
    await made.owner.agent.post(`${address}/withdraw`).expect(404);
    expect(await mails()).toBe(0);
    await made.owner.agent.post(`/api/commissions/${commission.id}/restore`).expect(200);
    await house.runJobs();
    expect(await Delivery.query().findById(delivery.id)).toMatchObject({ sentAt: expect.any(Date), withdrawnAt: null });
    expect(await mails()).toBe(1);
  });
});

it('a sheet is looked at for thirty days after its last date, and not by a session that lasts longer', async () => {
  const { sheet, lead } = await makeOpenSheet(house, made, { proofs: 1 });
  const base = `/api/guest/sheets/${sheet.id}`;
  await Sheet.query()
    .findById(sheet.id)
    .patch({ endsAt: daysAgo(29.9) });
  await lead.agent.get(base).expect(200);
  await Sheet.query()
    .findById(sheet.id)
    .patch({ endsAt: daysAgo(30.1) });
  for (const path of ['', '/proofs', '/marks', '/pick-lists']) {
    expect((await lead.agent.get(`${base}${path}`).expect(410)).body.code).toBe('ended');
  }
});

describe('what no page sends', () => {
  it('an id in capitals names the same row', async () => {
    const { sheet, lead } = await makeOpenSheet(house, made, { proofs: 1 });
    const proof = await Proof.query().findOne({ sheetId: sheet.id }).throwIfNotFound();
    const { body } = await lead.agent.put(`/api/guest/sheets/${sheet.id.toUpperCase()}/proofs/${proof.id.toUpperCase()}/mark`).expect(200);
    expect(body).toEqual({ proofId: proof.id, marked: true });
  });

  it('NUL in a text is refused with a sentence and is no fault of ours', async () => {
    const { body } = await made.owner.agent
      .post('/api/commissions')
      .send({ title: 'Quay\u0000', client: { name: 'Tarn' } })
      .expect(422);
    expect(body.detail).toContain('NUL');
  });

  it.each(['/api/commissions', '/api/commissions?sort=due', '/api/clients'])('a forged cursor of %s is refused', async (path) => {
    const after = Buffer.from(JSON.stringify(['no date', 'no id'])).toString('base64url');
    await made.owner.agent.get(path).query({ after }).expect(422);
  });

  it('a row that two requests make at once is a state to the second, also where a model says so', async () => {
    const account = { email: 'twice@tarn.test', name: 'Oskar Lind' };
    const twice = express().post('/', async () => {
      for (let times = 0; times < 2; times += 1) await Account.query().insert(account);
    });
    const { body } = await supertest(twice.use(problems(house.ctx.log)))
      .post('/')
      .expect(409);
    expect(body.code).toBe('there-already');
  });

  it('none of it is logged as an error', () => expect(house.logged).toEqual([]));
});
