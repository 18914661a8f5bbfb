import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Account } from '../../api/models/Account.ts';
import { Mail } from '../../api/models/Mail.ts';
import { Mark } from '../../api/models/Mark.ts';
import { Proof } from '../../api/models/Proof.ts';
import { RecordEntry } from '../../api/models/RecordEntry.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { SheetGuest } from '../../api/models/SheetGuest.ts';
import { makeLooker, switchOn } from '../support/factories/open-link.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeAccount, makeGuestAgent, makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';
import { newestMail, tokenIn } from '../support/mail-links.ts';

let house: House;
let made: MadeStudio;
beforeAll(async () => {
  house = await startHouse();
  made = await makeStudio(house);
});
afterAll(async () => {
  expect(house.logged).toEqual([]);
  await house.stop();
});
beforeEach(() => house.mails.clear());

type Agent = ReturnType<House['agent']>;
let counter = 0;
const newAddress = () => `looker-${(counter += 1)}@example.test`;

async function lookedAt() {
  const open = await makeOpenSheet(house, made, { proofs: 2 });
  const proof = await Proof.query().findOne({ sheetId: open.sheet.id, number: 1 }).throwIfNotFound();
  const token = await switchOn(made, open.sheet.id);
  const at = `/api/guest/sheets/${open.sheet.id}`;
  const mark = (agent: Agent) => agent.put(`${at}/proofs/${proof.id}/mark`);
  return { ...open, proof, token, at, mark, looker: await makeLooker(house, token) };
}
type LookedAt = Awaited<ReturnType<typeof lookedAt>>;

const ask = ({ at }: LookedAt, agent: Agent, email: string, name = 'Mira Sand') => agent.post(`${at}/ask-to-mark`).send({ name, email });
const begin = (token: string, agent = house.agent()) => agent.post('/api/begin').send({ token });

async function askedBy(open: LookedAt, email: string, agent = open.looker): Promise<string> {
  await ask(open, agent, email).expect(202);
  await house.runJobs();
  return tokenIn(house, email, 'begin');
}

describe('from looking to marking', () => {
  it('refuses a mark with what to do, and takes it once the address is confirmed', async () => {
    const open = await lookedAt();
    const email = newAddress();
    expect((await open.mark(open.looker).expect(403)).body).toMatchObject({
      code: 'looking',
      detail: 'You are looking. To mark, give your name and confirm your e-mail address.',
    });
    const token = await askedBy(open, email);
    expect((await begin(token, open.looker).expect(200)).body).toEqual({ goTo: `/sheets/${open.sheet.id}` });
    await open.mark(open.looker).expect(200);
    const { body } = await open.looker.get(open.at).expect(200);
    expect(body.me).toMatchObject({ name: 'Mira Sand', email, role: 'reviewer' });
    const account = await Account.query().findOne({ email }).throwIfNotFound();
    expect(account.emailConfirmedAt).not.toBeNull();
    const sheet = await made.assistant.agent.get(`/api/sheets/${open.sheet.id}`).expect(200);
    const row = sheet.body.guests.find((guest: { email: string }) => guest.email === email);
    expect(row).toMatchObject({ name: 'Mira Sand', role: 'reviewer', byOpenLink: true, marks: 1 });
    expect(sheet.body.openLink.lookers).toBe(0);
    const [line] = await RecordEntry.query().where({ commissionId: open.commission.id }).orderBy('id', 'desc');
    expect([line?.byName, line?.says]).toEqual(['Mira Sand', 'Came to proof sheet 1 by its open link and confirmed an address']);
  });

  it('answers the same, and writes the same mail, whether the address is known or not', async () => {
    const open = await lookedAt();
    const known = await makeAccount({ name: 'Known Person' });
    const answers = [];
    for (const email of [known.email, newAddress(), made.owner.account.email, open.lead.account.email]) {
      const { status, body } = await ask(open, open.looker, email);
      answers.push([status, body.says.replace(email, '…')]);
      await house.runJobs();
      expect(newestMail(house, email).text).toContain('Good day Mira Sand,');
    }
    expect(new Set(answers.map((answer) => JSON.stringify(answer))).size).toBe(1);
    expect(await SheetGuest.query().where({ sheetId: open.sheet.id }).resultSize()).toBe(2);
  });

  it('keeps the secret of a sent mail out of the outbox', async () => {
    const open = await lookedAt();
    const token = await askedBy(open, newAddress());
    const mail = await Mail.query().findOne({ commissionId: open.commission.id, kind: 'begin-marking' }).throwIfNotFound();
    expect(mail.text + mail.html).not.toContain(token);
  });

  it('works once; opened again at the same browser it shows the way, elsewhere it says so', async () => {
    const open = await lookedAt();
    const token = await askedBy(open, newAddress());
    await begin(token, open.looker).expect(200);
    expect((await begin(token, open.looker).expect(200)).body.goTo).toBe(`/sheets/${open.sheet.id}`);
    expect((await begin(token).expect(410)).body.code).toBe('link-used');
    expect((await begin(token, open.lead.agent).expect(410)).body.code).toBe('link-used');
  });

  it('makes one guest where two tabs confirm one address at once, by one mail or by two', async () => {
    const open = await lookedAt();
    const email = newAddress();
    const [first, second] = [await askedBy(open, email), await askedBy(open, email)];
    const answers = await Promise.all([begin(first), begin(first), begin(second)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 200, 410]);
    const account = await Account.query().findOne({ email }).throwIfNotFound();
    expect(await SheetGuest.query().where({ sheetId: open.sheet.id, accountId: account.id }).resultSize()).toBe(1);
  });

  it('leaves a lead a lead, and lets nobody back in whose place was taken back', async () => {
    const open = await lookedAt();
    const asLead = house.agent();
    await begin(await askedBy(open, open.lead.account.email), asLead).expect(200);
    expect((await asLead.get(open.at).expect(200)).body.me).toMatchObject({ role: 'lead', name: 'Oskar Lind' });
    const { guest, account } = open.reviewer;
    await made.assistant.agent.post(`/api/sheets/${open.sheet.id}/guests/${guest.id}/withdraw`).expect(200);
    const refused = await begin(await askedBy(open, account.email)).expect(403);
    expect(refused.body.detail).toContain('has taken your place on this proof sheet back');
    expect((await SheetGuest.query().findById(guest.id))?.withdrawnAt).not.toBeNull();
  });

  it('is refused once the link was withdrawn; who confirmed before stays a guest', async () => {
    const open = await lookedAt();
    const [early, late] = [house.agent(), house.agent()];
    const [first, second] = [await askedBy(open, newAddress()), await askedBy(open, newAddress())];
    await begin(first, early).expect(200);
    await made.owner.agent.post(`/api/sheets/${open.sheet.id}/open-link/withdraw`).expect(200);
    const { body } = await begin(second, late).expect(410);
    expect(body).toMatchObject({ code: 'withdrawn', detail: expect.stringContaining('has withdrawn this link') });
    await open.looker.get(open.at).expect(410);
    await ask(open, open.looker, newAddress()).expect(410);
    await open.mark(early).expect(200);
  });

  it('never lets somebody in who confirms while the link is being withdrawn and told so', async () => {
    const open = await lookedAt();
    const token = await askedBy(open, newAddress());
    const [withdrawn, begun] = await Promise.all([made.owner.agent.post(`/api/sheets/${open.sheet.id}/open-link/withdraw`), begin(token)]);
    expect(withdrawn.status).toBe(200);
    const came = await SheetGuest.query().where({ sheetId: open.sheet.id, byOpenLink: true }).resultSize();
    expect([begun.status, came]).toEqual(begun.status === 200 ? [200, 1] : [410, 0]);
  });

  it('is refused after the passphrase changed, the sheet ended or its commission was deleted, and nothing is asked once picks are sent', async () => {
    const open = await lookedAt();
    const token = await askedBy(open, newAddress());
    await made.owner.agent.patch(`/api/sheets/${open.sheet.id}/open-link`).send({ passphrase: 'words they do not know' }).expect(200);
    expect((await begin(token).expect(410)).body.code).toBe('link-expired');
    const fresh = await makeLooker(house, open.token, 'words they do not know');
    const again = await askedBy(open, newAddress(), fresh);
    await house.ctx.knex('commissions').where({ id: open.commission.id }).update({ deletedAt: new Date() });
    expect((await begin(again).expect(410)).body.code).toBe('withdrawn');
    await house.ctx.knex('commissions').where({ id: open.commission.id }).update({ deletedAt: null });
    await Sheet.query().findById(open.sheet.id).patch({ sentAt: new Date() });
    expect((await ask(open, fresh, newAddress()).expect(409)).body.code).toBe('not-open');
    await Sheet.query()
      .findById(open.sheet.id)
      .patch({ endsAt: new Date(Date.now() - 1000) });
    expect((await begin(again).expect(410)).body.code).toBe('ended');
  });

  it('takes a guest of other sheets, who looks here, for somebody who looks', async () => {
    const open = await lookedAt();
    const stranger = await makeGuestAgent(house);
    await open.mark(stranger.agent).expect(404);
    await stranger.agent.post('/api/look').send({ token: open.token }).expect(200);
    expect((await open.mark(stranger.agent).expect(403)).body.code).toBe('looking');
    await begin(await askedBy(open, stranger.account.email, stranger.agent), stranger.agent).expect(200);
    await open.mark(stranger.agent).expect(200);
    expect(await Mark.query().where({ accountId: stranger.account.id }).resultSize()).toBe(1);
  });

  it('takes no name or address that is none, and has nothing to ask of a guest', async () => {
    const open = await lookedAt();
    const wrong = await ask(open, open.looker, 'nobody', 'x'.repeat(4000)).expect(422);
    expect(wrong.body.errors.map((error: { path: string }) => error.path).sort()).toEqual(['email', 'name']);
    await ask(open, open.looker, 'a@example.test\r\nBcc: b@example.test').expect(422);
    expect((await ask(open, open.lead.agent, newAddress()).expect(409)).body.code).toBe('has-place');
    await ask(open, house.agent(), newAddress()).expect(401);
  });
});
