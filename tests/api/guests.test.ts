import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { hashToken, newToken } from '../../api/features/guests/tokens.ts';
import { inviteAccount } from '../../api/features/guests/invite-account.ts';
import { hashPassword } from '../../api/features/sign-in/passwords.ts';
import { Account } from '../../api/models/Account.ts';
import { Delivery } from '../../api/models/Delivery.ts';
import { DeliveryRecipient } from '../../api/models/DeliveryRecipient.ts';
import { RecordEntry } from '../../api/models/RecordEntry.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { SheetGuest } from '../../api/models/SheetGuest.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { type MadeStudio, makeAccount, makeGuestAgent, makeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';
import { newestMail, tokenIn } from '../support/mail-links.ts';

const DAY = 24 * 60 * 60 * 1000;
let house: House;
let made: MadeStudio;
beforeAll(async () => void (house = await startHouse()));
afterAll(() => house.stop());
beforeEach(async () => {
  house.mails.clear();
  made = await makeStudio(house);
});

const from = (days: number) => new Date(Date.now() + days * DAY);

/** An issued sheet with one invited guest, by row. */
async function inviteToSheet(values: Partial<Sheet> = {}, account?: Account) {
  const { token, hash } = newToken();
  const guest = account ?? (await makeAccount({ name: 'Account Name', emailConfirmedAt: null }));
  const commission = await makeCommission(made.studio);
  const sheet = await Sheet.query().insertAndFetch({
    studioId: made.studio.id,
    commissionId: commission.id,
    number: 1,
    allowance: 3,
    extraPrice: 100,
    currency: 'GBP',
    watermark: made.studio.watermark,
    issuedAt: from(-40),
    endsAt: from(5),
    ...values,
  });
  const row = await SheetGuest.query().insertAndFetch({
    studioId: made.studio.id,
    sheetId: sheet.id,
    accountId: guest.id,
    role: 'lead',
    name: 'Oskar Lind',
    tokenHash: hash,
  });
  return { token, guest, commission, sheet, row };
}

async function inviteToDelivery(values: Partial<Delivery> = {}) {
  const { token, hash } = newToken();
  const guest = await makeAccount();
  const commission = await makeCommission(made.studio);
  const delivery = await Delivery.query().insertAndFetch({
    studioId: made.studio.id,
    commissionId: commission.id,
    number: 2,
    words: '',
    fetchBy: '2027-02-24',
    endsAt: from(30),
    sentAt: from(-1),
    ...values,
  });
  const row = await DeliveryRecipient.query().insertAndFetch({
    studioId: made.studio.id,
    deliveryId: delivery.id,
    accountId: guest.id,
    name: 'Oskar Lind',
    tokenHash: hash,
    invitedAt: from(-1),
  });
  return { token, guest, commission, delivery, row };
}

const open = (token: string, agent = house.agent()) => agent.post('/api/open').send({ token });

describe('opening a link', () => {
  it('begins a session of the invited guest, notes it once and confirms the address', async () => {
    const { token, guest, sheet, row, commission } = await inviteToSheet();
    const agent = house.agent();
    const { body } = await open(token, agent).expect(200);
    expect(body).toEqual({ goTo: `/sheets/${sheet.id}` });
    expect((await agent.get('/api/guest').expect(200)).body).toMatchObject({ accountId: guest.id, email: guest.email });
    const first = await SheetGuest.query().findById(row.id).throwIfNotFound();
    expect(first.firstOpenedAt).not.toBeNull();
    expect((await Account.query().findById(guest.id))?.emailConfirmedAt).not.toBeNull();
    await open(token).expect(200);
    const again = await SheetGuest.query().findById(row.id).throwIfNotFound();
    expect(again.firstOpenedAt).toEqual(first.firstOpenedAt);
    expect(again.lastSeenAt?.getTime()).toBeGreaterThan(first.lastSeenAt?.getTime() ?? 0);
    const lines = await RecordEntry.query().where({ commissionId: commission.id });
    expect(lines.map((line) => [line.byName, line.says])).toEqual([['Oskar Lind', 'Opened proof sheet 1']]);
  });

  it('notes one first opening when it is opened many times at once', async () => {
    const { token, commission } = await inviteToSheet();
    await Promise.all([1, 2, 3, 4].map(() => open(token).expect(200)));
    expect(await RecordEntry.query().where({ commissionId: commission.id })).toHaveLength(1);
  });

  it('leads to a delivery', async () => {
    const { token, delivery } = await inviteToDelivery();
    expect((await open(token).expect(200)).body).toEqual({ goTo: `/deliveries/${delivery.id}` });
  });

  it('lets in to what this guest was invited to and nothing else', async () => {
    const mine = await inviteToSheet();
    const theirs = await inviteToSheet();
    const agent = house.agent();
    await open(mine.token, agent).expect(200);
    await agent.get(`/api/guest/sheets/${mine.sheet.id}`).expect(200);
    await agent.get(`/api/guest/sheets/${theirs.sheet.id}`).expect(404);
    await agent.get('/api/me').expect(401);
    await agent.get('/api/mails').expect(401);
  });

  it('keeps a studio session of the same browser apart', async () => {
    const { token } = await inviteToSheet();
    await open(token, made.owner.agent).expect(200);
    await made.owner.agent.get('/api/me').expect(200);
    await made.owner.agent.get('/api/guest').expect(200);
    await made.owner.agent.post('/api/guest/sign-out').expect(204);
    await made.owner.agent.get('/api/guest').expect(401);
    await made.owner.agent.get('/api/me').expect(200);
  });

  it('does not make a password count that somebody else may have chosen', async () => {
    const squatted = await makeAccount({
      email: 'squatted-guest@example.test',
      emailConfirmedAt: null,
      passwordHash: await hashPassword('chosen by a stranger'),
    });
    const { token } = await inviteToSheet({}, squatted);
    await open(token).expect(200);
    expect((await Account.query().findById(squatted.id))?.emailConfirmedAt).toBeNull();
  });

  it('knows nothing of other tokens, drafts among them', async () => {
    const draft = await inviteToSheet({ issuedAt: null });
    for (const token of [newToken().token, '', 'x', draft.token, hashToken(draft.token)]) await open(token).expect(404);
  });

  it('says who withdrew it and whom to ask', async () => {
    const { token, row } = await inviteToSheet();
    await SheetGuest.query().findById(row.id).patch({ withdrawnAt: new Date() });
    const { body, headers } = await open(token).expect(410);
    expect(body).toMatchObject({ code: 'withdrawn', detail: expect.stringMatching(/Harrow Lane Studio.*studio@harrow-lane\.test/) });
    expect(headers['set-cookie']).toBeUndefined();
    const whole = await inviteToSheet({ withdrawnAt: new Date() });
    expect((await open(whole.token).expect(410)).body.code).toBe('withdrawn');
  });

  it('opens a sheet for 30 days after its last date, a delivery until its own', async () => {
    await open((await inviteToSheet({ endsAt: from(-29) })).token).expect(200);
    expect((await open((await inviteToSheet({ endsAt: from(-31) })).token).expect(410)).body.code).toBe('ended');
    await open((await inviteToSheet({ endsAt: null })).token).expect(200);
    expect((await open((await inviteToDelivery({ endsAt: from(-0.01) })).token).expect(410)).body.code).toBe('ended');
  });
});

describe('a new link', () => {
  it('takes the place of a replaced one, sent to the same address alone', async () => {
    const { token, row, guest, sheet } = await inviteToSheet();
    await SheetGuest.query().findById(row.id).patch({ tokenHash: newToken().hash });
    expect((await open(token).expect(410)).body.code).toBe('replaced');
    await house.request.post('/api/new-link').send({ token }).expect(202);
    await house.runJobs();
    expect(house.mails.mails()).toHaveLength(1);
    expect(newestMail(house, guest.email)).toMatchObject({
      replyTo: 'studio@harrow-lane.test',
      from: expect.stringContaining('Harrow Lane'),
    });
    expect((await open(tokenIn(house, guest.email, 'open')).expect(200)).body.goTo).toBe(`/sheets/${sheet.id}`);
  });

  it('is answered alike whatever the token, and sends nothing for what is closed', async () => {
    const gone = await inviteToSheet({ withdrawnAt: new Date() });
    const over = await inviteToDelivery({ endsAt: from(-1) });
    const good = await inviteToDelivery();
    const answers = [];
    for (const token of [gone.token, over.token, good.token, newToken().token]) {
      answers.push(await house.request.post('/api/new-link').send({ token }).expect(202));
    }
    expect(new Set(answers.map((answer) => answer.text)).size).toBe(1);
    await house.runJobs();
    expect(house.mails.mails().map((mail) => mail.envelope.to)).toEqual([[good.guest.email]]);
  });
});

describe('the guest', () => {
  it('is nobody without a session', async () => {
    for (const path of ['/api/guest', '/api/mine']) await house.request.get(path).expect(401);
    await made.owner.agent.get('/api/mine').expect(401);
  });

  it('changes name and shortcuts; the studio’s own word for them stays', async () => {
    const { token, row } = await inviteToSheet();
    const agent = house.agent();
    await open(token, agent);
    const { body } = await agent.patch('/api/guest').send({ name: 'O. Lind', shortcuts: false }).expect(200);
    expect(body).toMatchObject({ name: 'O. Lind', shortcuts: false });
    await agent.patch('/api/guest').send({ name: 'a\nb' }).expect(422);
    expect((await SheetGuest.query().findById(row.id))?.name).toBe('Oskar Lind');
  });

  it('finds everything they were ever invited to, newest first, in pages', async () => {
    const account = await makeAccount();
    const [gone, open_, over, old] = [
      await inviteToSheet({}, account),
      await inviteToSheet({}, account),
      await inviteToSheet({ endsAt: from(-3) }, account),
      await inviteToSheet({ endsAt: from(-60), sentAt: from(-61) }, account),
    ];
    await inviteToSheet({ issuedAt: null }, account);
    const delivery = await inviteToDelivery();
    await DeliveryRecipient.query().findById(delivery.row.id).patch({ accountId: account.id });
    await SheetGuest.query().findById(gone.row.id).patch({ withdrawnAt: new Date() });
    await inviteToSheet();
    const { agent } = await makeGuestAgent(house, account);
    const items: { state: string; goTo: string | null; kind: string; studio: string }[] = [];
    let after = '';
    for (let page = 0; page < 5; page += 1) {
      const { body } = await agent.get(`/api/mine?limit=2${after}`).expect(200);
      items.push(...body.items);
      if (!body.next) break;
      after = `&after=${body.next}`;
    }
    expect(items.map((item) => [item.kind, item.state, item.goTo])).toEqual([
      ['sheet', 'Sent', null],
      ['sheet', 'Ended', `/sheets/${over.sheet.id}`],
      ['sheet', 'Open', `/sheets/${open_.sheet.id}`],
      ['sheet', 'Withdrawn', null],
      ['delivery', 'Ready', `/deliveries/${delivery.delivery.id}`],
    ]);
    expect(old.sheet.id).not.toBe(over.sheet.id);
    await agent.get('/api/mine?after=nonsense').expect(200);
    await agent.get('/api/mine?limit=999').expect(422);
  });
});

it('finds or makes a guest account without changing what is there', async () => {
  const known = await makeAccount({ email: 'known@example.test', name: 'As they call themselves' });
  const found = await house.ctx.knex.transaction((trx) => inviteAccount(trx, { email: known.email, name: 'As a studio calls them' }));
  expect(found).toMatchObject({ id: known.id, name: 'As they call themselves' });
  const [a, b] = await Promise.all(
    [1, 2].map(() => house.ctx.knex.transaction((trx) => inviteAccount(trx, { email: 'fresh@example.test', name: 'Fresh' }))),
  );
  expect(a?.id).toBe(b?.id);
});
