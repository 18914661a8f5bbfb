import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { OpenLink } from '../../api/models/OpenLink.ts';
import { RecordEntry } from '../../api/models/RecordEntry.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { blotLinks } from '../../api/features/mail/blot-links.ts';
import { sealToken, unsealToken } from '../../api/features/open-links/sealed-token.ts';
import { sweepAccounts } from '../../api/features/sign-in/sweep-accounts.job.ts';
import { loggedPath } from '../../api/middleware/request-log.ts';
import { makeLooker, switchOn } from '../support/factories/open-link.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';

const DAY = 24 * 60 * 60 * 1000;
const WORDS = 'harbour crane at dusk';
let house: House;
let made: MadeStudio;
beforeAll(async () => void (house = await startHouse()));
afterAll(async () => {
  expect(house.logged).toEqual([]);
  await house.stop();
});
beforeEach(async () => void (made = await makeStudio(house)));

const openSheet = () => makeOpenSheet(house, made, { proofs: 2 });
const dayIn = (days: number) => new Date(Date.now() + days * DAY).toISOString().slice(0, 10);
const link = (sheetId: string) => `/api/sheets/${sheetId}/open-link`;
const seen = (sheetId: string) => `/api/guest/sheets/${sheetId}`;
const look = (token: string, passphrase?: string, agent = house.agent()) => agent.post('/api/look').send({ token, passphrase });

describe('the open link of a sheet', () => {
  it('is switched on once, is shown again to the studio and kept sealed', async () => {
    const { sheet } = await openSheet();
    const token = await switchOn(made, sheet.id);
    const again = await made.owner.agent.get(`/api/sheets/${sheet.id}`).expect(200);
    expect(again.body.openLink).toMatchObject({
      address: `${house.address}/look/${token}`,
      hasPassphrase: false,
      endsOn: null,
      endsAt: sheet.endsAt?.toISOString(),
      hasEnded: false,
      lookers: 0,
    });
    const row = await OpenLink.query().findOne({ sheetId: sheet.id }).throwIfNotFound();
    expect(JSON.stringify(row)).not.toContain(token);
    expect((await made.owner.agent.post(link(sheet.id)).send({}).expect(409)).body.code).toBe('on-already');
    const [line] = await RecordEntry.query().where({ commissionId: sheet.commissionId }).orderBy('id', 'desc');
    expect(line?.says).toBe('Switched the open link of proof sheet 1 on');
  });

  it('is switched on once where two people do it at the same moment', async () => {
    const { sheet } = await openSheet();
    const answers = await Promise.all([made.owner, made.assistant].map(({ agent }) => agent.post(link(sheet.id)).send({})));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  });

  it('cannot be switched on for a draft, a sheet that was taken back, or one whose last date has passed', async () => {
    const { sheet } = await openSheet();
    for (const [values, code] of [
      [{ issuedAt: null }, 'draft'],
      [{ issuedAt: new Date(), withdrawnAt: new Date() }, 'sheet-closed'],
      [{ withdrawnAt: null, endsAt: new Date(Date.now() - 1000) }, 'sheet-closed'],
    ] as const) {
      await Sheet.query().findById(sheet.id).patch(values);
      const { body } = await made.owner.agent.post(link(sheet.id)).send({}).expect(409);
      expect(body.code).toBe(code);
      expect((await made.owner.agent.get(`/api/sheets/${sheet.id}`)).body.can.openLink).toBe(false);
    }
  });

  it('keeps its passphrase as argon2id, and takes none of fewer than 8 characters or of thousands', async () => {
    const { sheet } = await openSheet();
    for (const passphrase of ['seven77', 'x'.repeat(5000), 'two\nlines of it', 7]) {
      await made.owner.agent.post(link(sheet.id)).send({ passphrase }).expect(422);
    }
    await switchOn(made, sheet.id, { passphrase: WORDS });
    const row = await OpenLink.query().findOne({ sheetId: sheet.id }).throwIfNotFound();
    expect(row.passphraseHash).toMatch(/^\$argon2id\$/);
  });

  it('ends on a day of its own, which is neither past nor after the sheet’s', async () => {
    const { sheet } = await openSheet();
    await switchOn(made, sheet.id);
    const change = (endsOn: string | null) => made.assistant.agent.patch(link(sheet.id)).send({ endsOn });
    expect((await change(dayIn(-3)).expect(422)).body.errors).toEqual([{ path: 'endsOn', message: 'This day has passed already.' }]);
    expect((await change(dayIn(30)).expect(422)).body.detail).toMatch(/^The link ends with the sheet at the latest/);
    const { body } = await change(dayIn(3)).expect(200);
    expect(body.openLink.endsOn).toBe(dayIn(3));
    expect(Date.parse(body.openLink.endsAt)).toBeLessThan(sheet.endsAt?.getTime() ?? 0);
    expect((await change(null).expect(200)).body.openLink.endsAt).toBe(sheet.endsAt?.toISOString());
  });

  it('has another address when it is switched on anew, and the old one says that it was withdrawn', async () => {
    const { sheet } = await openSheet();
    const before = await switchOn(made, sheet.id);
    await made.assistant.agent.post(`${link(sheet.id)}/withdraw`).expect(200);
    expect((await made.assistant.agent.post(`${link(sheet.id)}/withdraw`).expect(200)).body.openLink).toBeNull();
    const after = await switchOn(made, sheet.id);
    expect(after).not.toBe(before);
    const { body } = await look(before).expect(410);
    expect(body).toMatchObject({ code: 'withdrawn', detail: expect.stringContaining('Harrow Lane Studio has withdrawn this link') });
  });
});

it('is sealed for one installation and one sheet', () => {
  const sealed = sealToken('one secret', 'sheet-a', 'the-token');
  expect(sealed).not.toContain('the-token');
  expect(unsealToken('one secret', 'sheet-a', sealed)).toBe('the-token');
  expect(unsealToken('another secret', 'sheet-a', sealed)).toBeUndefined();
  expect(unsealToken('one secret', 'sheet-b', sealed)).toBeUndefined();
  expect(unsealToken('one secret', 'sheet-a', 'rubbish')).toBeUndefined();
});

it('is blotted out of the log and of mails that went out', () => {
  const token = 'a-token-of-an-open-link-or-its-mail';
  for (const page of ['look', 'begin']) {
    expect(loggedPath(`/${page}/${token}?x=1`)).toBe(`/${page}/…`);
    expect(blotLinks(`Open http://oriel.test/${page}/${token} now`)).toBe(`Open http://oriel.test/${page}/… now`);
  }
});

describe('looking', () => {
  it('shows the sheet, its proofs and marks; of people their initials alone', async () => {
    const { sheet, lead } = await openSheet();
    const token = await switchOn(made, sheet.id);
    const looker = await makeLooker(house, token);
    const { body } = await looker.get(seen(sheet.id)).expect(200);
    expect(body.me).toMatchObject({ role: 'looker', name: '', email: '' });
    expect(body.can).toEqual({ mark: false, ask: true, send: false, invite: false });
    expect(body.people.map((person: { name: string }) => person.name)).toEqual(['OL', 'PT']);
    const proofs = await looker.get(`${seen(sheet.id)}/proofs`).expect(200);
    await lead.agent.put(`${seen(sheet.id)}/proofs/${proofs.body.proofs[0].id}/mark`).expect(200);
    const marks = await looker.get(`${seen(sheet.id)}/marks`).expect(200);
    expect(marks.body.marks).toHaveLength(1);
    const all = JSON.stringify([body, proofs.body, marks.body]);
    for (const secret of ['Oskar', 'Lind', 'Petra', lead.account.email, 'originals']) expect(all).not.toContain(secret);
    await looker.get('/api/mine').expect(401);
    expect((await made.owner.agent.get(`/api/sheets/${sheet.id}`)).body.openLink.lookers).toBe(1);
  });

  it('is kept by a cookie that no script reads, as a hash in the table', async () => {
    const { sheet } = await openSheet();
    const { headers } = await look(await switchOn(made, sheet.id)).expect(200);
    const [cookie = ''] = headers['set-cookie'] as unknown as string[];
    expect(cookie).toMatch(/^oriel_look_\w{32}=[\w-]{27}; .*Path=\/api; .*HttpOnly; SameSite=Lax$/);
    const rows = JSON.stringify(await house.ctx.knex('lookers'));
    expect(rows).not.toContain(cookie.split(/[=;]/)[1]);
  });

  it('asks for the passphrase, refuses another, and does not ask the same browser again', async () => {
    const { sheet } = await openSheet();
    const token = await switchOn(made, sheet.id, { passphrase: WORDS });
    const agent = house.agent();
    expect((await look(token, undefined, agent).expect(200)).body).toEqual({ goTo: null, studio: 'Harrow Lane Studio' });
    const wrong = await look(token, 'harbour crane at dawn', agent).expect(422);
    expect(wrong.body.errors).toEqual([{ path: 'passphrase', message: expect.stringMatching(/^This is not the passphrase/) }]);
    await look(token, 'x'.repeat(5000), agent).expect(422);
    await agent.get(seen(sheet.id)).expect(401);
    expect((await look(token, WORDS, agent).expect(200)).body.goTo).toBe(`/sheets/${sheet.id}`);
    expect((await look(token, undefined, agent).expect(200)).body.goTo).toBe(`/sheets/${sheet.id}`);
    await agent.get(seen(sheet.id)).expect(200);
  });

  it('takes an accent written in either way', async () => {
    const { sheet } = await openSheet();
    const token = await switchOn(made, sheet.id, { passphrase: 'caf\u00e9 am Hafen' });
    await makeLooker(house, token, 'cafe\u0301 am Hafen');
  });

  it('ends at once with the link, the sheet, its last day or the commission, each with its sentence', async () => {
    const { sheet, commission } = await openSheet();
    const token = await switchOn(made, sheet.id, { endsOn: dayIn(2) });
    const looker = await makeLooker(house, token);
    const refused = async (says: RegExp) => {
      expect((await looker.get(seen(sheet.id)).expect(410)).body.detail).toMatch(says);
      await look(token).expect(410);
    };
    await made.owner.agent.post(`/api/sheets/${sheet.id}/withdraw`).expect(200);
    await refused(/withdrawn/);
    await made.owner.agent.post(`/api/sheets/${sheet.id}/restore`).expect(200);
    await looker.get(seen(sheet.id)).expect(200);
    await house.ctx.knex('commissions').where({ id: commission.id }).update({ deletedAt: new Date() });
    await refused(/withdrawn/);
    await house.ctx.knex('commissions').where({ id: commission.id }).update({ deletedAt: null });
    await OpenLink.query()
      .where({ sheetId: sheet.id })
      .patch({ endsAt: new Date(Date.now() - 1000) });
    await refused(/time of this link is over/);
    await OpenLink.query()
      .where({ sheetId: sheet.id })
      .patch({ endsAt: new Date(Date.now() + DAY) });
    await Sheet.query()
      .findById(sheet.id)
      .patch({ endsAt: new Date(Date.now() - 1000) });
    await refused(/time of this link is over/);
    await Sheet.query()
      .findById(sheet.id)
      .patch({ endsAt: new Date(Date.now() + 2 * DAY) });
    await made.assistant.agent.post(`${link(sheet.id)}/withdraw`).expect(200);
    await refused(/withdrawn/);
  });

  it('wants a changed passphrase given anew; one that is cleared asks nobody', async () => {
    const { sheet } = await openSheet();
    const token = await switchOn(made, sheet.id, { passphrase: WORDS });
    const looker = await makeLooker(house, token, WORDS);
    await made.assistant.agent.patch(link(sheet.id)).send({ passphrase: 'other words than before' }).expect(200);
    expect((await looker.get(seen(sheet.id)).expect(401)).body.detail).toMatch(/^The passphrase of this link was changed/);
    await look(token, WORDS, looker).expect(422);
    await look(token, 'other words than before', looker).expect(200);
    await looker.get(seen(sheet.id)).expect(200);
    await made.assistant.agent.patch(link(sheet.id)).send({ passphrase: null }).expect(200);
    await looker.get(seen(sheet.id)).expect(200);
    await makeLooker(house, token);
  });

  it('brings a guest of the sheet to it as they are, past the passphrase', async () => {
    const { sheet, lead } = await openSheet();
    const token = await switchOn(made, sheet.id, { passphrase: WORDS });
    const answer = await look(token, undefined, lead.agent).expect(200);
    expect(answer.body.goTo).toBe(`/sheets/${sheet.id}`);
    expect(JSON.stringify(answer.headers['set-cookie'] ?? '')).not.toContain('oriel_look');
    expect((await lead.agent.get(seen(sheet.id)).expect(200)).body.me.role).toBe('lead');
  });

  it('is over after two weeks, and its row is swept then', async () => {
    const { sheet } = await openSheet();
    const looker = await makeLooker(house, await switchOn(made, sheet.id));
    const lookers = () =>
      house.ctx.knex('lookers').whereIn('openLinkId', house.ctx.knex('openLinks').where({ sheetId: sheet.id }).select('id'));
    await lookers().update({ expiresAt: new Date(Date.now() - 1000) });
    await looker.get(seen(sheet.id)).expect(401);
    await sweepAccounts.run(house.ctx, {}, { signal: new AbortController().signal, attempt: 1, lastAttempt: false });
    expect(await lookers()).toEqual([]);
  });

  it('knows no link that was cut short', async () => {
    await look('abc').expect(404);
    await look('x'.repeat(5000)).expect(422);
    await house.request.post('/api/look').send('[]').set('Content-Type', 'application/json').expect(422);
  });
});
