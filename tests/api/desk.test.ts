import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Desk, type DeskGroup } from '../../api/contract/desk.ts';
import type { DeskFacts } from '../../api/features/desk/desk-facts.ts';
import { nextStep } from '../../api/features/desk/next-step.ts';
import { Download } from '../../api/models/Download.ts';
import { answers } from '../support/expect-answer.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { rowOfDelivery, rowOfFinal, rowOfFrame, rowOfPickList, rowOfSheet } from '../support/factories/commission-life.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

const now = new Date('2026-12-01T12:00:00Z');
const moment = { now, today: '2026-12-01' };
const days = (count: number) => new Date(now.getTime() + count * 24 * 60 * 60 * 1000);

const nothing: DeskFacts = {
  id: '00000000-0000-4000-8000-000000000001',
  title: 'Ropewalk Library',
  clientName: 'Tarn Brandreth Architects',
  state: 'Preparing',
  shotOn: null,
  dueOn: null,
  hasBrief: false,
  createdAt: days(-9),
  views: 0,
  frames: 0,
  framesReading: 0,
  framesFailed: 0,
  lastFrameAt: null,
  drafts: 0,
  openSheets: 0,
  endedSheets: 0,
  draftNumber: null,
  draftProofs: null,
  draftAt: null,
  openSheetId: null,
  openNumber: null,
  openAllowance: null,
  openSince: null,
  openEndsAt: null,
  guests: null,
  guestsOpened: null,
  marked: null,
  markers: null,
  mailsFailed: 0,
  endedNumber: null,
  endedAt: null,
  listNumber: null,
  listAt: null,
  listPicks: null,
  listExtras: null,
  picks: 0,
  extras: 0,
  picksWithFinal: 0,
  finals: 0,
  finalsDelivered: 0,
  finalsToMatch: 0,
  lastFinalAt: null,
  deliveryNumber: null,
  deliverySentAt: null,
  deliveryMadeAt: null,
  deliveryEndsAt: null,
  deliveryFiles: null,
  deliveryFetched: null,
  archivesFailed: null,
  pictureId: null,
  pictureRecipe: null,
  pictureWidth: null,
  pictureHeight: null,
  picturePlaceholder: null,
};

const frames: Partial<DeskFacts> = { hasBrief: true, views: 6, frames: 184, lastFrameAt: days(-1) };
const open: Partial<DeskFacts> = {
  ...frames,
  state: 'With client',
  openSheets: 1,
  openSheetId: '00000000-0000-4000-8000-000000000002',
  openNumber: 1,
  openAllowance: 10,
  openSince: days(-6),
  openEndsAt: days(4),
  guests: 2,
  guestsOpened: 2,
  marked: 6,
  markers: 2,
};
const listed: Partial<DeskFacts> = {
  ...frames,
  state: 'Picks in',
  picks: 14,
  listNumber: 1,
  listAt: days(-0.1),
  listPicks: 14,
  listExtras: 2,
};
const delivered: Partial<DeskFacts> = {
  ...listed,
  state: 'Delivered',
  finals: 8,
  deliveryNumber: 1,
  deliverySentAt: days(-3),
  deliveryMadeAt: days(-3),
  deliveryEndsAt: days(29),
  deliveryFiles: 8,
  deliveryFetched: 8,
};

describe('the next step', () => {
  it.each<[string, Partial<DeskFacts>, string, string, string, string?]>([
    ['nothing at all', {}, 'yours', 'No brief and no views yet', 'Write brief', 'since'],
    ['a brief alone', { hasBrief: true }, 'yours', 'Brief written, no frames yet', 'Upload frames', 'since'],
    [
      'views, shot the day after tomorrow',
      { views: 6, shotOn: '2026-12-03' },
      'yours',
      '6 views asked for, no frames yet',
      'Upload frames',
      'shot',
    ],
    ['views, shot last week', { views: 1, shotOn: '2026-11-24' }, 'yours', '1 view asked for, no frames yet', 'Upload frames', 'since'],
    ['frames', frames, 'yours', '184 frames in, no proof sheet yet', 'Make proof sheet', 'since'],
    ['frames being read', { ...frames, framesReading: 9 }, 'yours', '184 frames in, 9 being read, no proof sheet yet', 'Make proof sheet'],
    [
      'frames that failed',
      { ...frames, framesFailed: 1 },
      'yours',
      '184 frames in, 1 could not be read, no proof sheet yet',
      'Open frames',
    ],
    [
      'a draft',
      { ...frames, drafts: 1, draftNumber: 1, draftProofs: 42, draftAt: days(0) },
      'yours',
      'Proof sheet 1 with 42 proofs, not sent yet',
      'Send proof sheet',
    ],
    ['an open sheet', open, 'theirs', 'Proof sheet 1 open: 6 of 10 picked by two people', 'Remind', 'left'],
    [
      'an open sheet without marks',
      { ...open, marked: 0, markers: 0 },
      'theirs',
      'Proof sheet 1 open: nothing picked yet',
      'Remind',
      'left',
    ],
    [
      'an open sheet without a last date',
      { ...open, openEndsAt: null },
      'theirs',
      'Proof sheet 1 open: 6 of 10 picked by two people',
      'Remind',
      'since',
    ],
    ['links nobody opened', { ...open, guestsOpened: 0 }, 'theirs', 'None of 2 links opened yet', 'Send again', 'since'],
    ['one link not opened', { ...open, guests: 1, guestsOpened: 0 }, 'theirs', 'Link not opened yet', 'Send again'],
    ['an open sheet without guests', { ...open, guests: 0, guestsOpened: 0 }, 'yours', 'Nobody is invited to proof sheet 1', 'Invite'],
    ['a mail that failed', { ...open, mailsFailed: 1 }, 'yours', '1 mail with the link to proof sheet 1 did not arrive', 'Open proofs'],
    [
      'an ended sheet',
      { ...frames, state: 'With client', endedSheets: 1, endedNumber: 1, endedAt: days(-2) },
      'yours',
      'Proof sheet 1 ended without a pick list',
      'Open proofs',
    ],
    ['a pick list', listed, 'yours', 'Pick list 1 sent: 14 picks, 2 extra', 'Open picks', 'since'],
    [
      'a reopened sheet beside a list',
      { ...listed, ...open, picks: 14 },
      'theirs',
      'Proof sheet 1 open: 6 of 10 picked by two people',
      'Remind',
    ],
    [
      'some finals',
      { ...listed, state: 'Finishing', picksWithFinal: 9, picks: 12, finals: 9 },
      'yours',
      '9 of 12 finals uploaded',
      'Upload finals',
    ],
    [
      'a final to match',
      { ...listed, state: 'Finishing', picksWithFinal: 9, picks: 12, finals: 10, finalsToMatch: 1 },
      'yours',
      '9 of 12 finals uploaded, 1 to match',
      'Match finals',
    ],
    ['every final', { ...listed, state: 'Ready', finals: 12 }, 'yours', '12 finals in, nothing delivered yet', 'Make delivery'],
    [
      'delivered in part',
      { ...delivered, state: 'Ready', finals: 12, finalsDelivered: 5 },
      'yours',
      '5 of 12 finals delivered',
      'Make delivery',
    ],
    [
      'a delivery being prepared',
      { ...delivered, state: 'Ready', deliverySentAt: null },
      'yours',
      'Delivery 1 is being prepared',
      'Open delivery',
    ],
    [
      'a delivery that failed',
      { ...delivered, state: 'Ready', deliverySentAt: null, archivesFailed: 1 },
      'yours',
      'Delivery 1 could not be prepared',
      'Open delivery',
    ],
    [
      'delivered, nothing fetched',
      { ...delivered, deliveryFetched: 0 },
      'theirs',
      'Delivered, none of 8 files fetched yet',
      'Delivery',
      'since',
    ],
    ['delivered and fetched', delivered, 'settled', 'Delivered · 8 of 8 files fetched', 'Delivery', 'ends'],
    ['delivered, link over', { ...delivered, deliveryEndsAt: days(-1) }, 'settled', 'Delivered · 8 of 8 files fetched', 'Close', 'ended'],
  ])('with %s', (_name, facts, whose, says, words, kind) => {
    const step = nextStep({ ...nothing, ...facts }, moment);
    expect(step).toMatchObject({ whose, says, action: { words } });
    if (kind) expect(step.when?.kind).toBe(kind);
  });

  it.each([
    ['2026-11-30', true],
    ['2026-12-01', true],
    ['2026-12-03', true],
    ['2026-12-04', false],
    ['2026-12-08', false],
  ])('shows the due date %s, urgent: %s', (dueOn, urgent) => {
    expect(nextStep({ ...nothing, ...listed, dueOn }, moment).when).toEqual({ kind: 'due', at: dueOn, urgent });
  });

  it('shows how long it waits while the due date is more than a week away', () => {
    expect(nextStep({ ...nothing, ...listed, dueOn: '2026-12-09' }, moment).when?.kind).toBe('since');
  });

  it('is urgent where a link was not opened for four days, or a sheet ends within two', () => {
    const urgent = (facts: Partial<DeskFacts>) => nextStep({ ...nothing, ...open, ...facts }, moment).when?.urgent;
    expect(urgent({ guestsOpened: 0, openSince: days(-3.9) })).toBe(false);
    expect(urgent({ guestsOpened: 0, openSince: days(-4) })).toBe(true);
    expect(urgent({ openEndsAt: days(2.1) })).toBe(false);
    expect(urgent({ openEndsAt: days(2) })).toBe(true);
  });

  it('reminds from the desk, and only there acts at once or closes', () => {
    expect(nextStep({ ...nothing, ...open }, moment).action).toMatchObject({ does: 'remind', sheetId: open.openSheetId });
    expect(nextStep({ ...nothing, ...delivered, deliveryEndsAt: days(-1) }, moment).action).toMatchObject({ does: 'close' });
    expect(nextStep({ ...nothing, ...listed }, moment).action).toMatchObject({ does: null, step: 'picks' });
  });
});

describe('the desk', () => {
  let house: House;
  let home: MadeStudio;
  beforeAll(async () => {
    house = await startHouse();
    home = await makeStudio(house);
  });
  afterAll(() => house.stop());

  const desk = async (made = home) => {
    const { body } = await made.assistant.agent.get('/api/desk').expect(200).expect(answers(Desk));
    return body as Desk;
  };
  const said = (groups: DeskGroup[]) => groups.map(({ whose, rows }) => [whose, rows.map((row) => [row.commission.title, row.says])]);

  it('says of every commission what is next and whose it is', async () => {
    await makeCommission(home.studio, { title: 'Begun' });
    const shot = await makeCommission(home.studio, { title: 'Shot', dueOn: new Date().toISOString().slice(0, 10) });
    const frame = await makeFrame(house, shot);
    const { commission, sheet, lead, reviewer, frames: proofs } = await makeOpenSheet(house, home, { proofs: 3, allowance: 2 });
    await house.ctx.knex('sheetGuests').where({ sheetId: sheet.id }).update({ firstOpenedAt: new Date() });
    const { body } = await lead.agent.get(`/api/guest/sheets/${sheet.id}/proofs`).expect(200);
    await lead.agent.put(`/api/guest/sheets/${sheet.id}/proofs/${body.proofs[0].id}/mark`).expect(200);
    await reviewer.agent.put(`/api/guest/sheets/${sheet.id}/proofs/${body.proofs[1].id}/mark`).expect(200);
    const picked = await makeCommission(home.studio, { title: 'Picked' });
    const pickedFrames = [await rowOfFrame(picked), await rowOfFrame(picked)];
    await rowOfPickList(await rowOfSheet(picked, pickedFrames, { issuedAt: new Date() }), 2, 1);
    const done = await makeCommission(home.studio, { title: 'Done' });
    const version = await rowOfFinal(done);
    const { files, id: deliveryId, studioId } = await rowOfDelivery(done, [version]);
    await makeCommission(home.studio, { title: 'Closed', closedAt: new Date() });
    await makeCommission(home.studio, { title: 'Deleted', deletedAt: new Date() });

    expect(said((await desk()).groups)).toEqual([
      [
        'yours',
        [
          ['Shot', '1 frame in, no proof sheet yet'],
          ['Begun', 'No brief and no views yet'],
          ['Picked', 'Pick list 1 sent: 2 picks, 1 extra'],
        ],
      ],
      [
        'theirs',
        [
          [commission.title, 'Proof sheet 1 open: 1 of 2 picked by two people'],
          ['Done', 'Delivered, none of 1 file fetched yet'],
        ],
      ],
      ['settled', []],
    ]);

    await Download.query().insert({
      studioId,
      deliveryId,
      what: 'file',
      deliveryFileId: files[0]!.id,
      sizeBytes: 10,
      sentBytes: 10,
      finishedAt: new Date(),
    });
    const after = await desk();
    expect(said(after.groups)[2]).toEqual(['settled', [['Done', 'Delivered · 1 of 1 file fetched']]]);
    expect(after.figures).toMatchObject({ yours: 3, theirs: 1, linksEnding: 0, storageBytes: 500e9 });
    expect(after.figures.storedBytes).toBe(
      frame.sizeBytes + 2 * 1_000_000 + 2_000_000 + proofs.reduce((sum, each) => sum + each.sizeBytes, 0),
    );
    const picture = after.groups[0]!.rows[0]!.picture;
    expect(picture).toMatchObject({ width: 6000, height: 4000 });
    expect(picture!.small).toContain(frame.id);
  });

  it('counts the links that end this week', async () => {
    const other = await makeStudio(house);
    const soon = (count: number) => new Date(Date.now() + count * 24 * 60 * 60 * 1000);
    const commission = await makeCommission(other.studio);
    await rowOfSheet(commission, [], { issuedAt: new Date(), endsAt: soon(3) });
    await rowOfSheet(commission, [], { issuedAt: new Date(), endsAt: soon(9) });
    await rowOfDelivery(commission, [], { endsAt: soon(6) });
    expect((await desk(other)).figures.linksEnding).toBe(2);
  });

  it('asks the database the same few questions for fifty commissions as for one', async () => {
    const count = async (commissions: number) => {
      const made = await makeStudio(house);
      for (let at = 0; at < commissions; at += 1) await rowOfFrame(await makeCommission(made.studio));
      let asked = 0;
      const hear = () => (asked += 1);
      house.ctx.knex.on('query', hear);
      const { groups } = await desk(made);
      house.ctx.knex.removeListener('query', hear);
      expect(groups[0]!.count).toBe(commissions);
      return asked;
    };
    expect(await count(50)).toBe(await count(1));
  });
});
