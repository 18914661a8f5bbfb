import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { takeInFinal } from '../../api/features/finals/take-in-final.ts';
import { Bracket } from '../../api/models/Bracket.ts';
import type { Commission } from '../../api/models/Commission.ts';
import type { Frame } from '../../api/models/Frame.ts';
import { Archive } from '../../api/models/Archive.ts';
import { Pick } from '../../api/models/Pick.ts';
import { PickList } from '../../api/models/PickList.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { Upload } from '../../api/models/Upload.ts';
import { makeExposures } from '../support/factories/bracket.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeSheetGuest, type SheetPerson } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';
import { runAllJobs } from '../support/run-all-jobs.ts';

let house: House;
let ours: MadeStudio;
let commission: Commission;
let exposures: Frame[];
let single: Frame;
let lead: SheetPerson;
let list: PickList;

/** A bracket of three and a single frame, both picked and sent. */
beforeAll(async () => {
  house = await startHouse();
  ours = await makeStudio(house);
  commission = await makeCommission(ours.studio, { views: ['East front'] });
  exposures = await makeExposures(house, commission);
  [single] = (await makeExposures(house, commission, { stops: [0], minute: 30, seed: 2 })) as [Frame];
  await runAllJobs(house);
  const frameIds = [single.id, ...exposures.map(({ id }) => id)];
  const { body } = await ours.owner.agent.post(`/api/commissions/${commission.id}/sheets`).send({ frameIds }).expect(201);
  const sheet = await Sheet.query().patchAndFetchById(body.id, { issuedAt: new Date(), endsAt: new Date(Date.now() + 1e9) });
  await runAllJobs(house);
  lead = await makeSheetGuest(house, sheet);
  const proofIds = (body.proofs as { id: string }[]).map(({ id }) => id);
  for (const id of proofIds) await lead.agent.put(`/api/guest/sheets/${sheet.id}/proofs/${id}/mark`).expect(200);
  await lead.agent.post(`/api/guest/sheets/${sheet.id}/pick-lists`).send({ proofIds }).expect(201);
  list = await PickList.query().findOne({ sheetId: sheet.id }).throwIfNotFound();
});
afterAll(async () => {
  expect(house.logged, 'what the log got at error level').toEqual([]);
  await house.stop();
});

/** Names of the files in an archive, as Info-ZIP lists them. */
function namesIn(zip: Buffer): string[] {
  const dir = mkdtempSync(path.join(tmpdir(), 'oriel-zip-'));
  try {
    writeFileSync(path.join(dir, 'a.zip'), zip);
    return execFileSync('unzip', ['-Z1', path.join(dir, 'a.zip')], { encoding: 'utf8' })
      .trim()
      .split('\n')
      .map((name) => name.split('/').at(-1) ?? '');
  } finally {
    rmSync(dir, { recursive: true });
  }
}

const darkestFirst = () => [exposures[1], exposures[0], exposures[2]].map((frame) => frame?.name ?? '');
const stem = (name: string) => name.replace('.jpg', '');
const get = (part: string) => ours.owner.agent.get(`/api/pick-lists/${list.id}${part}`).expect(200);

it('a pick of a bracket brings all its frames, written down once and for all', async () => {
  const pick = await Pick.query()
    .findOne({ frameId: exposures[0]?.id ?? '' })
    .throwIfNotFound();
  expect(pick.frameIds).toEqual([exposures[1]?.id, exposures[0]?.id, exposures[2]?.id]);
  await expect(house.ctx.knex('picks').update({ frameIds: [] })).rejects.toThrow(/never changed/);
  const { body } = await get('');
  expect(body).toMatchObject({ pickCount: 2, originals: 4 });
  const rows = body.picks as { frameId: string; frames: { name: string }[]; sizeBytes: number; picture: string }[];
  const row = rows.find(({ frameId }) => frameId === exposures[0]?.id);
  expect(row?.frames.map(({ name }) => name)).toEqual(darkestFirst());
  // What the client saw: the merged picture, not a frame.
  expect(row?.picture).toContain('/pictures/brackets/');
  expect(row?.sizeBytes).toBe(exposures.reduce((sum, { sizeBytes }) => sum + sizeBytes, 0));
  expect(body.originalsBytes).toBe(rows.reduce((sum, { sizeBytes }) => sum + sizeBytes, 0));
});

it('the names and the CSV name every frame', async () => {
  const names = (await get('/names')).text.split(' ');
  expect(names.sort()).toEqual([single.name, ...darkestFirst()].map(stem).sort());
  const csv = (await get('/csv')).text;
  expect(csv).toContain('Frame,Exposures,Frames');
  expect(csv).toContain(`${exposures[0]?.name},3,"${darkestFirst().join(', ')}"`);
});

it('the archive of the originals has every frame', async () => {
  await ours.owner.agent.post(`/api/pick-lists/${list.id}/archive`).expect((answer) => expect(answer.status).toBeLessThan(300));
  await runAllJobs(house);
  const archive = await Archive.query().findOne({ pickListId: list.id }).throwIfNotFound();
  expect(archive).toMatchObject({ state: 'ready', fileCount: 4 });
  const files = namesIn(await house.ctx.store.getBuffer(archive.storageKey)).filter((name) => name !== 'SHA256SUMS.txt');
  expect(files.sort()).toEqual([single.name, ...darkestFirst()].sort());
});

it('a finished file is matched by the name of any of its frames', async () => {
  const name = `${stem(exposures[2]?.name ?? '')}_merged.tif`;
  const upload = await Upload.query().insertAndFetch({
    ...{ studioId: ours.studio.id, commissionId: commission.id, purpose: 'final', state: 'checking', originalName: name, name },
    ...{ sizeBytes: 1000, partSize: 8 * 1024 * 1024, sha256: 'f'.repeat(64), storageKey: `studios/${ours.studio.id}/a-final` },
  });
  const judged = { mediaType: 'image/tiff', width: 480, height: 320, takenLocal: exposures[2]?.takenLocal ?? null };
  await Upload.transaction((trx) => takeInFinal(trx, upload, judged));
  const { body } = await ours.owner.agent.get(`/api/commissions/${commission.id}/finals`).expect(200);
  expect(body.finals).toMatchObject([{ match: 'by-name', frameId: exposures[0]?.id }]);
  expect(body.picks.map(({ exposures: count }: { exposures: number }) => count).sort()).toEqual([1, 3]);
});

it('what was picked is neither regrouped nor shown otherwise nor deleted', async () => {
  const bracket = await Bracket.query().findOne({ commissionId: commission.id }).throwIfNotFound();
  const refused = await ours.owner.agent.patch(`/api/brackets/${bracket.id}`).send({ shows: 'lead' }).expect(409);
  expect(refused.body.detail).toBe('This bracket stays as it is. It is on a pick list that was sent to you.');
  await ours.owner.agent.post(`/api/brackets/${bracket.id}/split`).expect(409);
  const { body } = await ours.owner.agent
    .post(`/api/commissions/${commission.id}/frames/delete`)
    .send({ frameIds: [exposures[1]?.id] })
    .expect(200);
  expect(body).toMatchObject({ frameIds: [], refused: [{ why: 'It is on a pick list that was sent to you.' }] });
});
