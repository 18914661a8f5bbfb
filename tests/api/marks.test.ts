import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { setMark } from '../../api/features/marks/set-mark.ts';
import { Mail } from '../../api/models/Mail.ts';
import { Mark } from '../../api/models/Mark.ts';
import { PickList } from '../../api/models/PickList.ts';
import { Proof } from '../../api/models/Proof.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { makeOpenSheet, makeSheetGuest } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;
let made: MadeStudio;

beforeAll(async () => {
  house = await startHouse();
  made = await makeStudio(house);
});
afterAll(() => house.stop());

async function openSheet(values: Parameters<typeof makeOpenSheet>[2] = {}) {
  const open = await makeOpenSheet(house, made, values);
  const proofs = await Proof.query().where({ sheetId: open.sheet.id }).orderBy('number');
  const at = (proof: { id: string }) => `/api/guest/sheets/${open.sheet.id}/proofs/${proof.id}/mark`;
  return { ...open, proofs, at, base: `/api/guest/sheets/${open.sheet.id}` };
}

describe('marks', () => {
  it('are set and taken away, twice as once', async () => {
    const { lead, proofs, at, base } = await openSheet();
    for (let times = 0; times < 2; times += 1)
      expect((await lead.agent.put(at(proofs[0]!))).body).toEqual({ proofId: proofs[0]!.id, marked: true });
    expect((await lead.agent.get(`${base}/marks`)).body.marks).toEqual([{ proofId: proofs[0]!.id, accountId: lead.account.id }]);
    for (let times = 0; times < 2; times += 1) expect((await lead.agent.delete(at(proofs[0]!))).body.marked).toBe(false);
    expect((await lead.agent.get(`${base}/marks`)).body.marks).toEqual([]);
  });

  it('of two guests never overwrite each other', async () => {
    const { lead, reviewer, proofs, at, sheet } = await openSheet();
    await Promise.all([lead.agent.put(at(proofs[0]!)), reviewer.agent.put(at(proofs[0]!))]);
    await reviewer.agent.delete(at(proofs[0]!));
    const left = await Mark.query().where({ sheetId: sheet.id });
    expect(left.map((mark) => mark.accountId)).toEqual([lead.account.id]);
  });

  it('are lost or doubled by none of forty guests who mark at once', async () => {
    const { sheet, proofs, at } = await openSheet({ proofs: 3 });
    const guests = [];
    for (let index = 0; index < 40; index += 1)
      guests.push(await makeSheetGuest(house, sheet, { name: `Guest ${index}`, role: 'reviewer' }));
    const answers = await Promise.all(guests.flatMap((guest) => proofs.map((proof) => guest.agent.put(at(proof)))));
    expect(new Set(answers.map((answer) => answer.status))).toEqual(new Set([200]));
    expect(await Mark.query().where({ sheetId: sheet.id }).resultSize()).toBe(120);
  });

  it('that arrive together are allowed and refused each for itself', async () => {
    const [open, other] = [await openSheet({ proofs: 2 }), await openSheet()];
    const guest = ({ id }: { id: string }) => ({ kind: 'guest' as const, accountId: id, name: '', email: '', sessionId: '' });
    const mark = (account: { id: string }, proof: { id: string }, marked = true) =>
      setMark(house.ctx, guest(account), open.sheet.id, proof.id, marked);
    const [first, second] = [open.proofs[0]!, open.proofs[1]!];
    await mark(open.reviewer.account, first);
    const done = await Promise.allSettled([
      mark(open.lead.account, first),
      mark(other.lead.account, first),
      mark(open.lead.account, second),
      mark(open.lead.account, other.proofs[0]!),
      mark(open.reviewer.account, first, false),
    ]);
    expect(done.map((each) => each.status)).toEqual(['fulfilled', 'rejected', 'fulfilled', 'rejected', 'fulfilled']);
    const left = await Mark.query().where({ sheetId: open.sheet.id }).orderBy('markedAt');
    expect(new Set(left.map((each) => `${each.accountId}/${each.proofId}`))).toEqual(
      new Set([first, second].map((proof) => `${open.lead.account.id}/${proof.id}`)),
    );
  });

  it('are refused after the last date and after sending, with a sentence', async () => {
    const { sheet, lead, proofs, at, base } = await openSheet();
    await Sheet.query()
      .findById(sheet.id)
      .patch({ endsAt: new Date(Date.now() - 1000) });
    const late = await lead.agent.put(at(proofs[0]!));
    expect(late.status).toBe(409);
    expect(late.body.detail).toContain('last date has passed');
    expect((await lead.agent.get(base)).body).toMatchObject({ state: 'Ended', can: { mark: false, send: false, invite: false } });
  });

  it('are nothing to guests of other sheets, withdrawn guests and proofs of other sheets', async () => {
    const one = await openSheet();
    const two = await openSheet();
    expect((await two.lead.agent.put(one.at(one.proofs[0]!))).status).toBe(404);
    expect((await one.lead.agent.put(`${one.base}/proofs/${two.proofs[0]!.id}/mark`)).status).toBe(404);
    await one.lead.guest.$query().patch({ withdrawnAt: new Date() });
    expect((await one.lead.agent.put(one.at(one.proofs[0]!))).status).toBe(404);
    expect((await house.agent().put(one.at(one.proofs[0]!))).status).toBe(401);
  });
});

describe('what a guest sees', () => {
  it('names no file, no key of an original and no place', async () => {
    const { lead, frames, base } = await openSheet();
    await house.runJobs();
    const text = JSON.stringify([(await lead.agent.get(base)).body, (await lead.agent.get(`${base}/proofs`)).body]);
    for (const frame of frames) {
      expect(text).not.toContain(frame.name);
      expect(text).not.toContain(frame.name.replace('.jpg', ''));
      expect(text).not.toContain(frame.storageKey);
      expect(text).not.toContain(`frames/${frame.id}`);
    }
    expect(text).not.toMatch(/latitude|longitude|originals/);
  });

  it('answers 304 while the proofs are the same and anew once they change', async () => {
    const { lead, sheet, base } = await openSheet();
    await house.runJobs();
    const first = await lead.agent.get(`${base}/proofs`);
    const again = await lead.agent.get(`${base}/proofs`).set('If-None-Match', first.headers.etag!);
    expect(again.status).toBe(304);
    await made.owner.agent.post(`/api/sheets/${sheet.id}/hang`).send({ proofIds: [first.body.proofs[0].id], viewId: null });
    const changed = await lead.agent.get(`${base}/proofs`).set('If-None-Match', first.headers.etag!);
    expect(changed.status).toBe(200);
    expect(changed.body.proofs.at(-1)).toBeDefined();
  });
});

describe('a pick list', () => {
  it('copies the lead’s picks in the order of the sheet and says which are extra', async () => {
    const { lead, reviewer, proofs, at, base, commission } = await openSheet({ proofs: 4, allowance: 2 });
    for (const proof of [proofs[3]!, proofs[0]!, proofs[2]!]) await lead.agent.put(at(proof));
    await reviewer.agent.put(at(proofs[1]!));
    await reviewer.agent.put(at(proofs[0]!));
    const sent = await lead.agent
      .post(`${base}/pick-lists`)
      .send({ proofIds: [proofs[0]!.id, proofs[2]!.id, proofs[3]!.id], words: 'Thank you' });
    expect(sent.status).toBe(201);
    expect(sent.body).toMatchObject({ number: 1, picks: 3, allowance: 2, extras: 1, extraPrice: 8500 });
    const lists = await made.owner.agent.get(`/api/commissions/${commission.id}/pick-lists`);
    const detail = await made.assistant.agent.get(`/api/pick-lists/${lists.body.items[0].id}`);
    const picks = detail.body.picks as { number: number; proofNumber: number; extra: boolean; markedBy: { initials: string }[] }[];
    expect(picks.map((pick) => [pick.number, pick.proofNumber, pick.extra])).toEqual([
      [1, 1, false],
      [2, 3, false],
      [3, 4, true],
    ]);
    expect(picks[0]!.markedBy.map((guest) => guest.initials)).toEqual(['OL', 'PT']);
    expect(await Mail.query().where({ kind: 'pick-list', commissionId: commission.id }).resultSize()).toBe(1);
  });

  it('is sent once, however often the lead clicks', async () => {
    const { lead, proofs, at, base, sheet } = await openSheet();
    await lead.agent.put(at(proofs[0]!));
    const send = () => lead.agent.post(`${base}/pick-lists`).send({ proofIds: [proofs[0]!.id] });
    const answers = await Promise.all([send(), send(), send()]);
    expect(answers.map((answer) => answer.status).sort()).toEqual([201, 409, 409]);
    expect(await PickList.query().where({ sheetId: sheet.id }).resultSize()).toBe(1);
    expect((await lead.agent.put(at(proofs[1]!))).body.code).toBe('sent');
  });

  it('is not sent where the picks are not those that the lead saw', async () => {
    const { lead, proofs, at, base, sheet } = await openSheet();
    await lead.agent.put(at(proofs[0]!));
    await lead.agent.put(at(proofs[1]!));
    const sent = await lead.agent.post(`${base}/pick-lists`).send({ proofIds: [proofs[0]!.id] });
    expect(sent.body).toMatchObject({ status: 409, code: 'picks-changed' });
    expect((await Sheet.query().findById(sheet.id))?.sentAt).toBeNull();
  });

  it('is not for reviewers', async () => {
    const { reviewer, proofs, at, base } = await openSheet();
    await reviewer.agent.put(at(proofs[0]!));
    expect((await reviewer.agent.post(`${base}/pick-lists`).send({ proofIds: [proofs[0]!.id] })).status).toBe(403);
  });

  it('cannot be changed by anybody once it is sent', async () => {
    const { lead, proofs, at, base, sheet } = await openSheet();
    await lead.agent.put(at(proofs[0]!));
    await lead.agent.post(`${base}/pick-lists`).send({ proofIds: [proofs[0]!.id] });
    await expect(house.ctx.knex('pickLists').where({ sheetId: sheet.id }).update({ pickCount: 9 })).rejects.toThrow(/never changed/);
    await expect(house.ctx.knex('picks').where({ proofId: proofs[0]!.id }).update({ number: 9 })).rejects.toThrow(/never changed/);
  });

  it('is followed by a second one that shows what changed, after the studio reopened with a reason', async () => {
    const { lead, proofs, at, base, sheet, commission } = await openSheet();
    await lead.agent.put(at(proofs[0]!));
    await lead.agent.put(at(proofs[1]!));
    await lead.agent.post(`${base}/pick-lists`).send({ proofIds: [proofs[0]!.id, proofs[1]!.id] });
    expect((await made.owner.agent.post(`/api/sheets/${sheet.id}/reopen`).send({ reason: '' })).status).toBe(422);
    const reopened = await made.owner.agent.post(`/api/sheets/${sheet.id}/reopen`).send({ reason: 'The crane is gone.' });
    expect(reopened.body.state).toBe('Open');
    expect((await lead.agent.get(base)).body.reopened.reason).toBe('The crane is gone.');
    await lead.agent.delete(at(proofs[1]!));
    await lead.agent.put(at(proofs[2]!));
    await lead.agent.post(`${base}/pick-lists`).send({ proofIds: [proofs[0]!.id, proofs[2]!.id] });
    const { items } = (await made.owner.agent.get(`/api/commissions/${commission.id}/pick-lists`)).body;
    const detail = (await made.owner.agent.get(`/api/pick-lists/${items[0].id}`)).body;
    expect(detail.number).toBe(2);
    expect(detail.picks.map((pick: { change: string }) => pick.change)).toEqual(['kept', 'added']);
    expect(detail.dropped.map((pick: { proofNumber: number }) => pick.proofNumber)).toEqual([proofs[1]!.number]);
  });

  it('comes as CSV without formulas and as names for a search box', async () => {
    const { lead, proofs, at, base, frames, commission } = await openSheet();
    await house.ctx.knex('frames').where({ id: proofs[0]!.frameId }).update({ name: '=HYPERLINK("x").jpg' });
    await lead.agent.put(at(proofs[0]!));
    await lead.agent.put(at(proofs[1]!));
    await lead.agent.post(`${base}/pick-lists`).send({ proofIds: [proofs[0]!.id, proofs[1]!.id] });
    const { items } = (await made.owner.agent.get(`/api/commissions/${commission.id}/pick-lists`)).body;
    const csv = await made.owner.agent.get(`/api/pick-lists/${items[0].id}/csv`);
    expect(csv.headers['content-type']).toContain('text/csv');
    expect(csv.text.split('\r\n')[0]).toBe('\uFEFFPick,Proof,View,Frame,Exposures,Frames,Extra,Marked by');
    // OWASP, "CSV Injection": a cell must not begin with = + - @.
    expect(csv.text).not.toMatch(/(^|,|")=/m);
    const names = await made.owner.agent.get(`/api/pick-lists/${items[0].id}/names`);
    const second = frames.find((frame) => frame.id === proofs[1]!.frameId)!;
    expect(names.text).toContain(second.name.replace('.jpg', ''));
    expect(names.text).not.toContain('.jpg');
  });
});
