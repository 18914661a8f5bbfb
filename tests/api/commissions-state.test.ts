import fc from 'fast-check';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { commissionState, COMMISSION_STATES, type CommissionFacts } from '../../api/domain/commission-state.ts';
import { sheetState, type SheetState } from '../../api/domain/sheet-state.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { makeClient } from '../support/factories/client.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { rowOfDelivery, rowOfFinal, rowOfFrame, rowOfPickList, rowOfSheet } from '../support/factories/commission-life.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

let house: House;
let home: MadeStudio;
let clientId: string;

beforeAll(async () => {
  house = await startHouse();
  home = await makeStudio(house);
  clientId = (await makeClient(home.studio)).id;
});
afterAll(() => house.stop());

interface Life {
  closed: boolean;
  sheets: { state: SheetState | 'Withdrawn'; frames: number; lists: number[] }[];
  finalsOfPicks: number;
  furtherFinals: number;
  delivered: number;
  withdrawn: boolean;
}

const past = new Date(Date.now() - 60_000);
const moments: Record<Life['sheets'][number]['state'], Partial<Sheet>> = {
  Draft: { issuedAt: null, sentAt: null, endsAt: past },
  Open: { issuedAt: past, sentAt: null, endsAt: new Date(Date.now() + 3_600_000) },
  Sent: { issuedAt: past, sentAt: past, endsAt: past },
  Ended: { issuedAt: past, sentAt: null, endsAt: past },
  Withdrawn: { issuedAt: past, sentAt: null, withdrawnAt: past },
};

const lives: fc.Arbitrary<Life> = fc.record({
  closed: fc.nat(9).map((value) => value === 0),
  sheets: fc.array(
    fc.record({
      state: fc.constantFrom('Draft', 'Open', 'Sent', 'Ended', 'Withdrawn'),
      frames: fc.integer({ min: 1, max: 3 }),
      lists: fc.array(fc.integer({ min: 1, max: 3 }), { maxLength: 2 }),
    }),
    { maxLength: 2 },
  ),
  finalsOfPicks: fc.integer({ min: 0, max: 4 }),
  furtherFinals: fc.integer({ min: 0, max: 1 }),
  delivered: fc.integer({ min: 0, max: 5 }),
  withdrawn: fc.boolean(),
});

/** Builds the rows of a life and counts its facts the plain way, without SQL. */
async function live(life: Life): Promise<{ id: string; facts: CommissionFacts }> {
  const commission = await makeCommission(home.studio, { clientId, closedAt: life.closed ? past : null });
  const sheets: Sheet[] = [];
  const picked: string[] = [];
  const frameRows = new Map<string, Awaited<ReturnType<typeof rowOfFrame>>>();
  for (const { state, frames: count, lists } of life.sheets) {
    const frames = [];
    for (let at = 0; at < count; at += 1) frames.push(await rowOfFrame(commission));
    const sheet = await rowOfSheet(commission, frames);
    for (const size of lists) await rowOfPickList(sheet, Math.min(size, count));
    picked.push(...frames.slice(0, Math.min(lists.at(-1) ?? 0, count)).map((frame) => frame.id));
    for (const frame of frames) frameRows.set(frame.id, frame);
    sheets.push(await Sheet.query().patchAndFetchById(sheet.id, moments[state]));
  }
  const finished = picked.slice(0, life.finalsOfPicks);
  const versions = [];
  for (const frameId of finished) versions.push(await rowOfFinal(commission, frameRows.get(frameId)));
  for (let at = 0; at < life.furtherFinals; at += 1) versions.push(await rowOfFinal(commission));
  await rowOfFinal(commission, undefined, { deletedAt: past });
  const delivered = versions.slice(0, life.delivered);
  if (delivered.length > 0) await rowOfDelivery(commission, delivered, { withdrawnAt: life.withdrawn ? past : null });
  const facts: CommissionFacts = {
    closed: life.closed,
    sheets: sheets.map((sheet) => sheetState(sheet, new Date())),
    picks: picked.length,
    picksWithFinal: finished.length,
    finals: versions.length,
    finalsDelivered: life.withdrawn ? 0 : delivered.length,
  };
  return { id: commission.id, facts };
}

it('the database derives the same state of a commission as the domain, in every life', async () => {
  const seen = new Set<string>();
  await fc.assert(
    fc.asyncProperty(lives, async (life) => {
      const { id, facts } = await live(life);
      const { body } = await home.owner.agent.get(`/api/commissions/${id}`).expect(200);
      seen.add(body.state);
      expect(body.state, JSON.stringify(facts)).toBe(commissionState(facts));
      expect(body.figures).toMatchObject({ picks: facts.picks, ofPicks: facts.picksWithFinal, finals: facts.finals });
    }),
    { numRuns: 120, seed: 20261201 },
  );
  expect([...seen].sort()).toEqual([...COMMISSION_STATES].sort());
});
