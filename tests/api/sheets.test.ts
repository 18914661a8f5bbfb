import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Mail } from '../../api/models/Mail.ts';
import { Proof } from '../../api/models/Proof.ts';
import { proofKey } from '../../api/services/storage-keys.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;
let ours: MadeStudio;
let theirs: MadeStudio;

beforeAll(async () => {
  house = await startHouse();
  ours = await makeStudio(house);
  theirs = await makeStudio(house, { name: 'Quay Street Pictures' });
});
afterAll(() => house.stop());

const soon = () => new Date(Date.now() + 10 * 24 * 3600 * 1000).toISOString().slice(0, 10);
const lead = { name: 'Ines Okafor', email: 'ines@tarn-brandreth.test', role: 'lead' as const };

async function draftOf(count = 3) {
  const commission = await makeCommission(ours.studio, { views: ['East front', 'Forecourt'] });
  const frames = [];
  for (let index = 0; index < count; index += 1) frames.push(await makeFrame(house, commission));
  const made = await ours.owner.agent.post(`/api/commissions/${commission.id}/sheets`).send({ frameIds: frames.map((frame) => frame.id) });
  expect(made.status).toBe(201);
  return { commission, frames, sheet: made.body };
}

describe('a draft', () => {
  it('takes terms from the commission and numbers its proofs in order', async () => {
    const { sheet } = await draftOf();
    expect(sheet).toMatchObject({ state: 'Draft', number: 1, allowance: 12, extraPrice: 8500, currency: 'GBP', proofCount: 3 });
    expect(sheet.proofs.map((proof: { number: number }) => proof.number)).toEqual([1, 2, 3]);
  });

  it('is reordered, and its numbers follow', async () => {
    const { sheet } = await draftOf();
    const wanted = sheet.proofs.map((proof: { id: string }) => proof.id).reverse();
    const ordered = await ours.assistant.agent.put(`/api/sheets/${sheet.id}/order`).send({ proofIds: wanted });
    expect(ordered.body.proofs.map((proof: { id: string; number: number }) => [proof.id, proof.number])).toEqual(
      wanted.map((id: string, index: number) => [id, index + 1]),
    );
    const short = await ours.assistant.agent.put(`/api/sheets/${sheet.id}/order`).send({ proofIds: wanted.slice(1) });
    expect(short.status).toBe(412);
  });

  it('hangs proofs under a view of its own commission and under no other', async () => {
    const { sheet, commission } = await draftOf();
    const other = await makeCommission(ours.studio, { views: ['Elsewhere'] });
    const proofIds = [sheet.proofs[2].id];
    const hung = await ours.owner.agent.post(`/api/sheets/${sheet.id}/hang`).send({ proofIds, viewId: commission.views[0]!.id });
    expect(hung.body.proofs[0]).toMatchObject({ id: proofIds[0], viewId: commission.views[0]!.id, number: 1 });
    const wrong = await ours.owner.agent.post(`/api/sheets/${sheet.id}/hang`).send({ proofIds, viewId: other.views[0]!.id });
    expect(wrong.status).toBe(422);
  });

  it('refuses frames of another commission, of another studio, and frames still being read', async () => {
    const { sheet } = await draftOf(1);
    const elsewhere = await makeFrame(house, await makeCommission(ours.studio));
    const foreign = await makeFrame(house, await makeCommission(theirs.studio));
    for (const frame of [elsewhere, foreign]) {
      const put = await ours.owner.agent.post(`/api/sheets/${sheet.id}/proofs`).send({ frameIds: [frame.id] });
      expect(put.status).toBe(422);
    }
    const reading = await makeFrame(house, { id: sheet.commissionId, studioId: ours.studio.id }, { state: 'reading' });
    const put = await ours.owner.agent.post(`/api/sheets/${sheet.id}/proofs`).send({ frameIds: [reading.id] });
    expect(put.body.errors[0].message).toContain('still being read');
  });

  it('lays a frame once, however often it is put', async () => {
    const { sheet, frames } = await draftOf(2);
    const again = await ours.owner.agent.post(`/api/sheets/${sheet.id}/proofs`).send({ frameIds: [frames[0]!.id, frames[1]!.id] });
    expect(again.body.proofCount).toBe(2);
  });

  it('answers 412 to whoever changes an older version, and 428 to whoever names none', async () => {
    const { sheet } = await draftOf(1);
    const first = await ours.owner.agent.patch(`/api/sheets/${sheet.id}`).set('If-Match', `"${sheet.version}"`).send({ allowance: 5 });
    expect(first.body).toMatchObject({ allowance: 5, version: sheet.version + 1 });
    const late = await ours.assistant.agent.patch(`/api/sheets/${sheet.id}`).set('If-Match', `"${sheet.version}"`).send({ allowance: 6 });
    expect(late.status).toBe(412);
    const none = await ours.assistant.agent.patch(`/api/sheets/${sheet.id}`).send({ allowance: 6 });
    expect(none.status).toBe(428);
  });

  it('lets only the owner change its price', async () => {
    const { sheet } = await draftOf(1);
    const change = (agent: MadeStudio['owner']['agent']) =>
      agent.patch(`/api/sheets/${sheet.id}`).set('If-Match', `"${sheet.version}"`).send({ extraPrice: 9900 });
    expect((await change(ours.assistant.agent)).status).toBe(403);
    expect((await ours.assistant.agent.get(`/api/sheets/${sheet.id}`)).body.can.price).toBe(false);
    expect((await change(ours.owner.agent)).body).toMatchObject({ extraPrice: 9900, can: { price: true } });
  });

  it('is nothing while its commission is deleted', async () => {
    const { sheet, commission } = await draftOf(1);
    await house.ctx.knex('commissions').where({ id: commission.id }).update({ deletedAt: new Date() });
    expect((await ours.owner.agent.get(`/api/sheets/${sheet.id}`)).status).toBe(404);
    expect((await ours.owner.agent.delete(`/api/sheets/${sheet.id}`)).status).toBe(404);
    await house.ctx.knex('commissions').where({ id: commission.id }).update({ deletedAt: null });
    expect((await ours.owner.agent.get(`/api/sheets/${sheet.id}`)).status).toBe(200);
  });

  it('is nothing to another studio', async () => {
    const { sheet } = await draftOf(1);
    expect((await theirs.owner.agent.get(`/api/sheets/${sheet.id}`)).status).toBe(404);
    expect((await theirs.owner.agent.delete(`/api/sheets/${sheet.id}`)).status).toBe(404);
    expect((await theirs.owner.agent.post(`/api/sheets/${sheet.id}/proofs`).send({ frameIds: [sheet.proofs[0].frameId] })).status).toBe(
      404,
    );
  });
});

describe('issuing', () => {
  it('needs a last date, a lead and happens once', async () => {
    const { sheet } = await draftOf(1);
    const issue = (guests: object[]) => ours.owner.agent.post(`/api/sheets/${sheet.id}/issue`).send({ guests, words: 'Have a look.' });
    expect((await issue([lead])).body.errors[0].path).toBe('chooseBy');
    await ours.owner.agent.patch(`/api/sheets/${sheet.id}`).set('If-Match', `"${sheet.version}"`).send({ chooseBy: soon() });
    expect((await issue([{ ...lead, role: 'reviewer' }])).body.errors[0].path).toBe('guests');
    const opened = await issue([lead]);
    expect(opened.body).toMatchObject({ state: 'Open', guests: [{ name: 'Ines Okafor', role: 'lead', mail: 'waiting' }] });
    expect((await issue([lead])).status).toBe(409);
    expect(await Mail.query().where({ kind: 'sheet-invitation', commissionId: sheet.commissionId }).resultSize()).toBe(1);
  });

  it('ends the sheet with the last day in the zone of the studio', async () => {
    const { sheet } = await draftOf(1);
    await house.ctx.knex('studios').where({ id: ours.studio.id }).update({ timeZone: 'America/New_York' });
    const changed = await ours.owner.agent
      .patch(`/api/sheets/${sheet.id}`)
      .set('If-Match', `"${sheet.version}"`)
      .send({ chooseBy: '2027-01-15' });
    await house.ctx.knex('studios').where({ id: ours.studio.id }).update({ timeZone: 'Europe/London' });
    // New York is five hours behind UTC in January (IANA time zone database).
    expect(changed.body.endsAt).toBe('2027-01-16T05:00:00.000Z');
  });

  it('mails a link that opens the sheet, and a newer link replaces it', async () => {
    const { sheet } = await makeOpenSheet(house, ours, { proofs: 1 });
    const invited = await ours.owner.agent
      .post(`/api/sheets/${sheet.id}/guests`)
      .send({ guests: [{ ...lead, email: 'mira@harbour-trust.test', name: 'Mira Bell' }] });
    const guestId = invited.body.guests.find((guest: { name: string }) => guest.name === 'Mira Bell').id;
    const link = async () => {
      const mail = await Mail.query().where({ toAddress: 'mira@harbour-trust.test' }).orderBy('createdAt', 'desc').first();
      return /\/open\/([\w-]+)/.exec(mail?.text ?? '')?.[1] ?? '';
    };
    const first = await link();
    const guest = house.agent();
    expect((await guest.post('/api/open').send({ token: first })).body).toMatchObject({ goTo: `/sheets/${sheet.id}` });
    expect((await guest.get(`/api/guest/sheets/${sheet.id}`)).status).toBe(200);
    await ours.owner.agent.post(`/api/sheets/${sheet.id}/guests/${guestId}/send-again`).send({});
    expect((await house.agent().post('/api/open').send({ token: first })).status).not.toBe(200);
    await ours.owner.agent.post(`/api/sheets/${sheet.id}/guests/${guestId}/withdraw`);
    expect((await guest.get(`/api/guest/sheets/${sheet.id}`)).status).toBe(404);
  });
});

describe('watermarks', () => {
  it('are laid over every proof by the worker, at every size, and made anew when they change', async () => {
    const { sheet, commission, lead: guest } = await makeOpenSheet(house, ours, { proofs: 2 });
    await house.ctx
      .knex('sheets')
      .where({ id: sheet.id })
      .update({ watermark: { kind: 'text', text: 'HARROW LANE', opacity: 0.5, size: 0.6, tiled: false }, watermarkHash: 'first' });
    await house.runJobs();
    const proof = await Proof.query().findOne({ sheetId: sheet.id }).throwIfNotFound();
    const sizes = await Promise.all(
      ([480, 960, 2560] as const).map(
        async (size) => (await sharp(await house.ctx.store.getBuffer(proofKey(proof, commission.id, size))).metadata()).width,
      ),
    );
    expect(sizes).toEqual([480, 960, 960]);
    const seen = await guest.agent.get(`/api/guest/sheets/${sheet.id}/proofs`);
    expect(seen.body.proofs[0].pictures.large).toContain(`/w${proof.watermarkHash}-2560.jpg`);
    await ours.owner.agent
      .patch(`/api/sheets/${sheet.id}`)
      .set('If-Match', `"${sheet.version}"`)
      .send({ watermark: { kind: 'text', text: 'PROOF', opacity: 0.3, size: 0.4, tiled: true } });
    await house.runJobs();
    const again = await Proof.query().findById(proof.id).throwIfNotFound();
    expect(again.watermarkHash).not.toBe(proof.watermarkHash);
  });

  it('refuse a picture of another studio', async () => {
    const { sheet } = await draftOf(1);
    const watermark = {
      kind: 'image',
      text: '',
      imageKey: `studios/${theirs.studio.id}/watermarks/${'a'.repeat(64)}.png`,
      opacity: 0.5,
      size: 0.5,
      tiled: false,
    };
    const changed = await ours.owner.agent.patch(`/api/sheets/${sheet.id}`).set('If-Match', `"${sheet.version}"`).send({ watermark });
    expect(changed.status).toBe(422);
  });

  it('take an uploaded PNG and show it on a frame', async () => {
    const png = await sharp({ create: { width: 200, height: 80, channels: 4, background: { r: 255, g: 255, b: 255, alpha: 0.8 } } })
      .png()
      .toBuffer();
    const uploaded = await ours.owner.agent.post('/api/studio/watermark-images').attach('image', png, 'logo.png');
    expect(uploaded.status).toBe(201);
    const watermark = { kind: 'image', text: '', imageKey: uploaded.body.imageKey, opacity: 0.8, size: 0.5, tiled: false };
    const preview = await ours.owner.agent
      .post('/api/studio/watermark-previews')
      .send({ watermark })
      .buffer(true)
      .parse((res, done) => {
        const chunks: Buffer[] = [];
        res.on('data', (chunk: Buffer) => chunks.push(chunk)).on('end', () => done(null, Buffer.concat(chunks)));
      });
    const { width, format } = await sharp(preview.body).metadata();
    expect({ width, format }).toEqual({ width: 960, format: 'jpeg' });
    const html = await ours.owner.agent.post('/api/studio/watermark-images').attach('image', Buffer.from('<html>'), 'logo.png');
    expect(html.status).toBeGreaterThanOrEqual(400);
    expect(html.status).toBeLessThan(500);
  });
});
