import { randomBytes, randomUUID } from 'node:crypto';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { takeInUpload } from '../../api/features/uploads/take-in-upload.job.ts';
import { cleanUploads } from '../../api/features/uploads/clean-uploads.job.ts';
import { Final } from '../../api/models/Final.ts';
import { Frame } from '../../api/models/Frame.ts';
import { RecordEntry } from '../../api/models/RecordEntry.ts';
import { Upload } from '../../api/models/Upload.ts';
import { frameKey } from '../../api/services/storage-keys.ts';
import { begin, bringUp, sendPart, sha256 } from '../support/bring-in.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { drawPicture } from '../support/factories/frame.ts';
import { makeGuestAgent, makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

let house: House;
let ours: MadeStudio;
let theirs: MadeStudio;
let seed = 0;

beforeAll(async () => {
  house = await startHouse();
  ours = await makeStudio(house);
  theirs = await makeStudio(house);
});
afterAll(() => house.stop());
afterEach(() => expect(house.logged.splice(0)).toEqual([]));

const picture = () => drawPicture(1200, 800, ++seed);
const commission = () => makeCommission(ours.studio);
const PART = 8 * 1024 * 1024;

async function keysOf(commissionId: string): Promise<string[]> {
  const keys: string[] = [];
  for await (const { key } of house.ctx.store.list(`studios/${ours.studio.id}/commissions/${commissionId}/`)) keys.push(key);
  return keys;
}

async function stateOf(uploadId: string) {
  return (await ours.owner.agent.get(`/api/uploads/${uploadId}`)).body as { state: string; problem: string | null; frameId: string | null };
}

describe('beginning', () => {
  it('names the parts that a file has', async () => {
    const { id } = await commission();
    const answer = await begin(ours.assistant, id, Buffer.alloc(1), { size: 2 * PART + 1, sha256: sha256(randomBytes(8)) });
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({ state: 'receiving', partSize: PART, partCount: 3, partsThere: [], frameId: null });
  });

  it('goes on with an unfinished upload of the same file, whoever asks', async () => {
    const { id } = await commission();
    const file = randomBytes(PART + 5);
    const first = await begin(ours.owner, id, file);
    await sendPart(ours.owner, first.body, file, 2);
    const second = await begin(ours.assistant, id, file, { name: 'renamed.jpg' });
    expect(second.status).toBe(200);
    expect(second.body).toMatchObject({ id: first.body.id, partsThere: [2], name: 'HL_0412.jpg' });
  });

  it('lets one upload through where the same file is begun many times at once', async () => {
    const { id } = await commission();
    const file = await picture();
    const answers = await Promise.all(Array.from({ length: 8 }, () => begin(ours.owner, id, file)));
    expect(new Set(answers.map(({ body }) => body.id)).size).toBe(1);
    expect(answers.filter(({ status }) => status === 201)).toHaveLength(1);
    expect(await Upload.query().where({ commissionId: id }).resultSize()).toBe(1);
  });

  it('refuses two sizes under one SHA-256', async () => {
    const { id } = await commission();
    const file = await picture();
    await begin(ours.owner, id, file);
    const answer = await begin(ours.owner, id, file, { size: file.length + 1 });
    expect(answer.status).toBe(409);
    expect(answer.body.code).toBe('size-differs');
  });

  it('keeps the name as it came as text and cleans it of paths, control characters and turned letters', async () => {
    const { id } = await commission();
    const name = '../../etc/\u202egpj.exe\u0000\u0007/east\u0001 front\u202e.jpg';
    const answer = await begin(ours.owner, id, await picture(), { name });
    expect(answer.status).toBe(201);
    expect(answer.body.name).toBe('east front.jpg');
    expect(answer.body.originalName).toBe(name.replaceAll('\0', ''));
  });

  it.each([
    ['no bytes', { size: 0 }, 422, 'The file is empty.'],
    ['half a byte', { size: 1.5 }, 422, undefined],
    ['a negative size', { size: -1 }, 422, 'The file is empty.'],
    ['no SHA-256', { sha256: 'abc' }, 422, 'The SHA-256 has 64 hexadecimal digits.'],
    ['no name', { name: '' }, 422, 'The file has no name.'],
    ['more than an installation takes', { size: 500_000_001 }, 413, 'The file has 500 MB; at most 500 MB are taken in.'],
  ])('refuses %s', async (_what, values, status, detail) => {
    const { id } = await commission();
    const answer = await begin(ours.owner, id, Buffer.from('x'), values);
    expect(answer.status).toBe(status);
    if (detail) expect(answer.body.detail).toBe(detail);
  });

  it('refuses a closed commission, a deleted one and another studio', async () => {
    const closed = await makeCommission(ours.studio, { closedAt: new Date() });
    const deleted = await makeCommission(ours.studio, { deletedAt: new Date() });
    const file = await picture();
    expect((await begin(ours.owner, closed.id, file)).status).toBe(409);
    expect((await begin(ours.owner, deleted.id, file)).status).toBe(404);
    expect((await begin(theirs.owner, (await commission()).id, file)).status).toBe(404);
    expect((await begin(ours.owner, randomUUID(), file)).status).toBe(404);
    expect((await begin(ours.owner, 'no-id', file)).status).toBe(404);
    expect((await begin({ agent: house.agent(), cookie: '' }, (await commission()).id, file)).status).toBe(401);
    expect((await begin(await makeGuestAgent(house), (await commission()).id, file)).status).toBe(401);
  });
});

describe('sending parts', () => {
  it('takes parts in any order and twice', async () => {
    const { id } = await commission();
    const file = randomBytes(2 * PART + 100);
    const { body: upload } = await begin(ours.owner, id, file);
    for (const number of [3, 1, 3, 2, 1]) expect((await sendPart(ours.owner, upload, file, number)).status).toBe(200);
    const asked = await ours.owner.agent.get(`/api/uploads/${upload.id}`);
    expect(asked.body.partsThere).toEqual([1, 2, 3]);
    expect((await ours.owner.agent.post(`/api/uploads/${upload.id}/complete`)).body.state).toBe('checking');
    const { storageKey } = await Upload.query().findById(upload.id).throwIfNotFound();
    expect(sha256(await house.ctx.store.getBuffer(storageKey))).toBe(sha256(file));
  });

  it('refuses a part of another length than it must have, and does not count it', async () => {
    const { id } = await commission();
    const file = randomBytes(PART + 100);
    const { body: upload } = await begin(ours.owner, id, file);
    const put = (number: number, bytes: Buffer) =>
      ours.owner.agent.put(`/api/uploads/${upload.id}/parts/${number}`).attach('part', bytes, 'part');
    expect((await put(1, file.subarray(0, PART - 1))).status).toBe(422);
    expect((await put(2, file.subarray(0, 101))).status).toBe(422);
    expect((await put(2, file.subarray(0, 5000))).status).toBe(422);
    expect((await put(2, Buffer.alloc(0))).status).toBe(422);
    expect((await ours.owner.agent.get(`/api/uploads/${upload.id}`)).body.partsThere).toEqual([]);
    expect((await put(2, file.subarray(PART))).status).toBe(200);
  });

  it('refuses parts that the file has not, other fields, and bodies that are no form', async () => {
    const { id } = await commission();
    const file = await picture();
    const { body: upload } = await begin(ours.owner, id, file);
    for (const number of ['0', '2', '-1', '1.5', 'x']) {
      const answer = await ours.owner.agent.put(`/api/uploads/${upload.id}/parts/${number}`).attach('part', file, 'part');
      expect(answer.status).toBe(404);
    }
    const path = `/api/uploads/${upload.id}/parts/1`;
    expect((await ours.owner.agent.put(path).attach('other', file, 'part')).status).toBe(422);
    expect((await ours.owner.agent.put(path).attach('part', file, 'a').attach('part', file, 'b')).status).toBe(422);
    expect((await ours.owner.agent.put(path).set('Content-Type', 'application/octet-stream').send(file)).status).toBe(422);
    expect((await ours.owner.agent.put(path).send({ part: 1 })).status).toBe(422);
  });

  it('refuses parts of an upload that is complete or given up', async () => {
    const { id } = await commission();
    const file = await picture();
    const upload = await bringUp(ours.owner, id, file);
    expect((await sendPart(ours.owner, upload, file, 1)).status).toBe(409);
    const other = await picture();
    const { body: given } = await begin(ours.owner, id, other);
    expect((await ours.owner.agent.delete(`/api/uploads/${given.id}`)).status).toBe(204);
    const late = await sendPart(ours.owner, given, other, 1);
    expect(late.status).toBe(409);
    expect(late.body.detail).toBe('This upload has ended.');
  });

  it('does not know the uploads of another studio', async () => {
    const { id } = await commission();
    const file = await picture();
    const { body: upload } = await begin(ours.owner, id, file);
    expect((await sendPart(theirs.owner, upload, file, 1)).status).toBe(404);
    expect((await theirs.owner.agent.get(`/api/uploads/${upload.id}`)).status).toBe(404);
    expect((await theirs.owner.agent.post(`/api/uploads/${upload.id}/complete`)).status).toBe(404);
    expect((await theirs.owner.agent.delete(`/api/uploads/${upload.id}`)).status).toBe(404);
    expect((await theirs.owner.agent.get(`/api/commissions/${id}/uploads`)).status).toBe(404);
  });
});

describe('completing', () => {
  it('names the parts that are missing', async () => {
    const { id } = await commission();
    const file = randomBytes(3 * PART + 1);
    const { body: upload } = await begin(ours.owner, id, file);
    await sendPart(ours.owner, upload, file, 2);
    const answer = await ours.owner.agent.post(`/api/uploads/${upload.id}/complete`);
    expect(answer.status).toBe(409);
    expect(answer.body).toMatchObject({ code: 'parts-missing', detail: 'The parts 1, 3 and 4 are missing.' });
    expect(answer.body.errors.map(({ path }: { path: string }) => path)).toEqual(['parts.1', 'parts.3', 'parts.4']);
  });

  it('does no harm when it is asked for many times at once, and makes one frame', async () => {
    const { id } = await commission();
    const file = await picture();
    const { body: upload } = await begin(ours.owner, id, file);
    await sendPart(ours.owner, upload, file, 1);
    const complete = () => ours.owner.agent.post(`/api/uploads/${upload.id}/complete`);
    const answers = await Promise.all([complete(), complete(), complete(), complete()]);
    expect(answers.map(({ status }) => status)).toEqual([200, 200, 200, 200]);
    await house.runJobs();
    expect((await complete()).body.state).toBe('done');
    expect(await Frame.query().where({ commissionId: id }).resultSize()).toBe(1);
  });

  it('is not possible for an upload that was given up', async () => {
    const { id } = await commission();
    const { body: upload } = await begin(ours.owner, id, await picture());
    await ours.owner.agent.delete(`/api/uploads/${upload.id}`);
    expect((await ours.owner.agent.post(`/api/uploads/${upload.id}/complete`)).status).toBe(409);
  });
});

describe('taking in', () => {
  it('makes a frame with its pictures, and recognises the file from then on', async () => {
    const made = await makeCommission(ours.studio);
    const file = await picture();
    const upload = await bringUp(ours.assistant, made.id, file, { name: 'HL_0433.JPG' });
    await house.runJobs();
    const { state, frameId } = await stateOf(upload.id);
    expect(state).toBe('done');
    const frame = await Frame.query()
      .findById(frameId ?? '')
      .throwIfNotFound();
    expect(frame).toMatchObject({
      state: 'ready',
      name: 'HL_0433.JPG',
      width: 1200,
      height: 800,
      mediaType: 'image/jpeg',
      sha256: sha256(file),
    });
    expect(frame.createdBy).toBe(ours.assistant.account.id);
    const expected = [frame.storageKey, ...([480, 960, 2560] as const).map((size) => frameKey(frame, size))];
    expect((await keysOf(made.id)).sort()).toEqual(expected.sort());
    expect(sha256(await house.ctx.store.getBuffer(frame.storageKey))).toBe(sha256(file));
    const again = await begin(ours.owner, made.id, file, { name: 'other.jpg' });
    expect(again.status).toBe(200);
    expect(again.body).toEqual({ state: 'known', frameId: frame.id, finalId: null, name: 'HL_0433.JPG' });
  });

  it('takes the same file into another commission', async () => {
    const file = await picture();
    for (const { id } of [await commission(), await commission()]) {
      await bringUp(ours.owner, id, file);
      await house.runJobs();
      expect(await Frame.query().where({ commissionId: id }).resultSize()).toBe(1);
    }
  });

  it('judges by content: a picture under a lying name is a frame, a page named .jpg is none', async () => {
    const { id } = await commission();
    const lying = await bringUp(ours.owner, id, await picture(), { name: 'invoice.exe' });
    const page = await bringUp(ours.owner, id, Buffer.from('<!doctype html><script>alert(1)</script>'), { name: 'east.jpg' });
    await house.runJobs();
    expect((await stateOf(lying.id)).state).toBe('done');
    const refused = await stateOf(page.id);
    expect(refused.state).toBe('failed');
    expect(refused.problem).toContain('a web page');
  });

  it.each([
    ['cut in half', async () => (await picture()).subarray(0, -1000), 'cut short or damaged'],
    ['a zip', () => Buffer.from('504b0304140000000800', 'hex'), 'a zip archive'],
    ['a drawing', () => Buffer.from('<svg xmlns="http://www.w3.org/2000/svg" width="9" height="9"/>'), 'an SVG drawing'],
    ['no picture', () => randomBytes(5000), 'not a picture'],
  ])('refuses a file that is %s, and leaves nothing of it in the store', async (_what, make, words) => {
    const { id } = await commission();
    const upload = await bringUp(ours.owner, id, await make());
    await house.runJobs();
    const { state, problem, frameId } = await stateOf(upload.id);
    expect({ state, frameId }).toEqual({ state: 'failed', frameId: null });
    expect(problem).toContain(words);
    expect(await keysOf(id)).toEqual([]);
    expect(await Frame.query().where({ commissionId: id }).resultSize()).toBe(0);
  });

  it('a refused file can be brought again', async () => {
    const { id } = await commission();
    const file = Buffer.from('not a picture, whatever it is called');
    await bringUp(ours.owner, id, file);
    await house.runJobs();
    expect((await begin(ours.owner, id, file)).status).toBe(201);
  });

  it('refuses a file whose bytes are not those it was declared with', async () => {
    const { id } = await commission();
    const upload = await bringUp(ours.owner, id, await picture(), { sha256: sha256(Buffer.from('another')) });
    await house.runJobs();
    expect((await stateOf(upload.id)).problem).toContain('SHA-256');
    expect(await keysOf(id)).toEqual([]);
  });

  it('does not let one broken file stop the rest of the set', async () => {
    const { id } = await commission();
    const good = [await picture(), await picture()];
    await bringUp(ours.owner, id, good[0] as Buffer);
    await bringUp(ours.owner, id, randomBytes(3000));
    await bringUp(ours.owner, id, good[1] as Buffer);
    await house.runJobs();
    expect(await Frame.query().where({ commissionId: id, state: 'ready' }).resultSize()).toBe(2);
  });

  it('takes a final in under its purpose, and no raw file as one', async () => {
    const { id } = await commission();
    const file = await picture();
    const upload = await bringUp(ours.owner, id, file, { purpose: 'final', name: 'HL_0412_final.jpg' });
    await house.runJobs();
    expect(await stateOf(upload.id)).toMatchObject({ state: 'done', frameId: null });
    const final = await Final.query().findOne({ commissionId: id }).throwIfNotFound();
    expect((await begin(ours.owner, id, file, { purpose: 'final' })).body).toMatchObject({ state: 'known', finalId: final.id });
    expect((await begin(ours.owner, id, file, { purpose: 'frame' })).status).toBe(201);
  });

  it('makes one frame where the job runs again after it was cut off', async () => {
    const { id } = await commission();
    const upload = await bringUp(ours.owner, id, await picture());
    const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
    await takeInUpload.run(house.ctx, { uploadId: upload.id }, tools);
    // As if the process had died before the transaction's end: the pictures are there, the rows are not.
    await Frame.query().deleteById(upload.id);
    await Upload.query().findById(upload.id).patch({ state: 'checking', frameId: null });
    await takeInUpload.run(house.ctx, { uploadId: upload.id }, { ...tools, attempt: 2 });
    await takeInUpload.run(house.ctx, { uploadId: upload.id }, { ...tools, attempt: 3 });
    expect(await Frame.query().where({ commissionId: id }).resultSize()).toBe(1);
    expect(await keysOf(id)).toHaveLength(4);
  });

  it('stops where the job is told to, without refusing the file', async () => {
    const { id } = await commission();
    const upload = await bringUp(ours.owner, id, await picture());
    const tools = { signal: AbortSignal.abort(new Error('the worker is stopping')), attempt: 1, lastAttempt: true };
    await expect(takeInUpload.run(house.ctx, { uploadId: upload.id }, tools)).rejects.toThrow();
    expect((await stateOf(upload.id)).state).toBe('checking');
    await house.runJobs();
    expect((await stateOf(upload.id)).state).toBe('done');
  });

  it('keeps one frame where the same bytes came by two uploads', async () => {
    const { id } = await commission();
    const file = await picture();
    const first = await bringUp(ours.owner, id, file);
    const row = await Upload.query().findById(first.id).throwIfNotFound();
    // The second was begun before the first became a frame, and its row stood in no other's way by then.
    const storageKey = `${row.storageKey}-2`;
    await house.ctx.store.put(storageKey, file, 'application/octet-stream');
    await house.runJobs();
    const { id: _id, createdAt: _createdAt, ...columns } = row;
    const second = await Upload.query().insertAndFetch({ ...columns, storageKey, state: 'checking' });
    const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
    await takeInUpload.run(house.ctx, { uploadId: second.id }, tools);
    await house.runJobs();
    expect(await stateOf(second.id)).toMatchObject({ state: 'done', frameId: first.id });
    expect(await Frame.query().where({ commissionId: id }).resultSize()).toBe(1);
    expect(await keysOf(id)).toHaveLength(4);
  });

  it('writes one line of the record for a set', async () => {
    const { id } = await commission();
    for (let index = 0; index < 3; index++) await bringUp(ours.assistant, id, await picture());
    await house.runJobs();
    const note = { commissionId: id, accountId: ours.assistant.account.id };
    const { noteFrames } = await import('../../api/features/uploads/note-frames.job.ts');
    const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
    await noteFrames.run(house.ctx, note, tools);
    await noteFrames.run(house.ctx, note, tools);
    const lines = await RecordEntry.query().where({ commissionId: id });
    expect(lines.map(({ says, byName }) => [says, byName])).toEqual([['Brought in 3 frames', 'Petra Thorn']]);
  });
});

describe('the list', () => {
  it('pages through uploads, newest first, and tells the limits', async () => {
    const { id } = await commission();
    for (let index = 0; index < 5; index++) await begin(ours.owner, id, await picture(), { name: `HL_${index}.jpg` });
    const names: string[] = [];
    let after = '';
    do {
      const { body } = await ours.owner.agent.get(`/api/commissions/${id}/uploads?limit=2&purpose=frame&state=receiving${after}`);
      expect(body.limits).toEqual({ fileBytes: 500_000_000, pixels: 300_000_000, partSize: PART });
      names.push(...body.items.map(({ name }: { name: string }) => name));
      after = body.next ? `&after=${body.next}` : '';
    } while (after);
    expect(names).toEqual(['HL_4.jpg', 'HL_3.jpg', 'HL_2.jpg', 'HL_1.jpg', 'HL_0.jpg']);
    expect((await ours.owner.agent.get(`/api/commissions/${id}/uploads?purpose=final`)).body.items).toEqual([]);
  });
});

describe('clearing away', () => {
  it('gives up what nobody touched for a week, with its parts, and leaves the rest', async () => {
    const { id } = await commission();
    const file = await picture();
    const { body: old } = await begin(ours.owner, id, file);
    await sendPart(ours.owner, old, file, 1);
    const { body: young } = await begin(ours.owner, id, await picture());
    const { multipartId, storageKey } = await Upload.query().findById(old.id).throwIfNotFound();
    await Upload.query()
      .findById(old.id)
      .patch({ updatedAt: new Date(Date.now() - 8 * 24 * 60 * 60 * 1000) });
    const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
    await cleanUploads.run(house.ctx, {}, tools);
    await cleanUploads.run(house.ctx, {}, tools);
    await house.runJobs();
    expect((await stateOf(old.id)).state).toBe('cancelled');
    expect((await stateOf(young.id)).state).toBe('receiving');
    await expect(house.ctx.store.listParts(storageKey, multipartId ?? '')).rejects.toMatchObject({ name: 'NoSuchUpload' });
  });

  it('frees the file of an upload that was given up by hand', async () => {
    const { id } = await commission();
    const file = await picture();
    const { body: upload } = await begin(ours.owner, id, file);
    await sendPart(ours.owner, upload, file, 1);
    expect((await ours.owner.agent.delete(`/api/uploads/${upload.id}`)).status).toBe(204);
    expect((await ours.owner.agent.delete(`/api/uploads/${upload.id}`)).status).toBe(204);
    await house.runJobs();
    expect((await Upload.query().findById(upload.id).throwIfNotFound()).multipartId).toBeNull();
    expect((await begin(ours.owner, id, file)).status).toBe(201);
  });

  it('does not give up a file that is being taken in', async () => {
    const { id } = await commission();
    const upload = await bringUp(ours.owner, id, await picture());
    expect((await ours.owner.agent.delete(`/api/uploads/${upload.id}`)).status).toBe(409);
  });
});
