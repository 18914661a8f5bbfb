import { randomBytes } from 'node:crypto';
import { createServer, request as httpRequest, type ClientRequest, type IncomingMessage } from 'node:http';
import type { AddressInfo } from 'node:net';
import { pino } from 'pino';
import supertest from 'supertest';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { buildApp } from '../../api/app.ts';
import type { Upload as UploadAnswer } from '../../api/contract/uploads.ts';
import { takeInUpload } from '../../api/features/uploads/take-in-upload.job.ts';
import { openHouse } from '../../api/house.ts';
import { createGates } from '../../api/middleware/actor.ts';
import { createLimits } from '../../api/middleware/limits.ts';
import { Sessions } from '../../api/middleware/sessions.ts';
import { Frame } from '../../api/models/Frame.ts';
import { Upload } from '../../api/models/Upload.ts';
import { begin, bringUp, sendPart } from '../support/bring-in.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { drawPicture } from '../support/factories/frame.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

const PART = 8 * 1024 * 1024;
let house: House;
let ours: MadeStudio;
let seed = 500;

beforeAll(async () => {
  house = await startHouse();
  ours = await makeStudio(house);
});
afterAll(() => house.stop());
afterEach(() => house.store.faults.clear());

const commission = () => makeCommission(ours.studio);
const picture = () => drawPicture(900, 600, ++seed);
const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };

async function beginOne(file: Buffer, by = ours): Promise<UploadAnswer> {
  return (await begin(by.owner, (await makeCommission(by.studio)).id, file)).body as UploadAnswer;
}
const ask = async (id: string) => (await ours.owner.agent.get(`/api/uploads/${id}`)).body as UploadAnswer;
const complete = (id: string) => ours.owner.agent.post(`/api/uploads/${id}/complete`);

/** Begins to send a part by hand and leaves the rest to the test. */
function openPart(
  upload: UploadAnswer,
  number: number,
  bytes: Buffer,
  by = ours,
): { request: ClientRequest; answer: Promise<IncomingMessage> } {
  const head = Buffer.from(
    '--edge\r\nContent-Disposition: form-data; name="part"; filename="part"\r\nContent-Type: application/octet-stream\r\n\r\n',
  );
  const request = httpRequest(`${house.address}/api/uploads/${upload.id}/parts/${number}`, {
    method: 'PUT',
    headers: {
      'Content-Type': 'multipart/form-data; boundary=edge',
      'Content-Length': head.length + bytes.length + '\r\n--edge--\r\n'.length,
      Cookie: by.owner.cookie.split(';')[0],
    },
  });
  const answer = new Promise<IncomingMessage>((resolve, reject) => {
    request.once('response', resolve);
    request.once('error', reject);
  });
  answer.catch(() => undefined);
  request.write(head);
  return { request, answer };
}
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

describe('while the store fails', () => {
  it('asks the browser to come again, and goes on when the store is back', async () => {
    const file = await picture();
    const upload = await beginOne(file);
    house.store.faults.failNext({ method: 'PUT', status: 500, times: 20 });
    const refused = await sendPart(ours.owner, upload, file, 1);
    expect(refused.status).toBe(503);
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    house.store.faults.clear();
    expect((await ask(upload.id)).partsThere).toEqual([]);
    expect((await sendPart(ours.owner, upload, file, 1)).status).toBe(200);
    expect((await complete(upload.id)).status).toBe(200);
  });

  it('sends a part again whose connection to the store was cut', async () => {
    const file = randomBytes(PART + 10);
    const upload = await beginOne(file);
    house.store.faults.failNext({ method: 'PUT', dropConnectionAfterBytes: 100_000 });
    expect((await sendPart(ours.owner, upload, file, 1)).status).toBe(200);
    expect(house.store.faults.met).toHaveLength(1);
    expect((await ask(upload.id)).partsThere).toEqual([1]);
  });

  it('notices that the parts were joined although the answer was lost', async () => {
    const file = await picture();
    const upload = await beginOne(file);
    await sendPart(ours.owner, upload, file, 1);
    house.store.faults.failNext({ method: 'POST', loseAnswer: true });
    const answer = await complete(upload.id);
    expect(house.store.faults.met).toHaveLength(1);
    expect(answer.status).toBe(200);
    await house.runJobs();
    expect((await ask(upload.id)).state).toBe('done');
  });

  it('keeps the upload where beginning was cut off, and opens it later', async () => {
    const { id } = await commission();
    const file = await picture();
    house.store.faults.failNext({ method: 'POST', status: 503, times: 20 });
    const refused = await begin(ours.owner, id, file);
    expect(refused.status).toBe(503);
    house.store.faults.clear();
    const upload = (await begin(ours.owner, id, file)).body as UploadAnswer;
    expect((await sendPart(ours.owner, upload, file, 1)).status).toBe(200);
    expect((await complete(upload.id)).status).toBe(200);
  });

  it('begins anew where the store has lost the parts', async () => {
    const file = await picture();
    const upload = await beginOne(file);
    await sendPart(ours.owner, upload, file, 1);
    const { storageKey, multipartId } = await Upload.query().findById(upload.id).throwIfNotFound();
    await house.ctx.store.abortMultipart(storageKey, multipartId ?? '');
    const lost = await sendPart(ours.owner, upload, file, 1);
    expect(lost.status).toBe(409);
    expect(lost.body.code).toBe('parts-lost');
    expect((await ask(upload.id)).partsThere).toEqual([]);
    expect((await sendPart(ours.owner, upload, file, 1)).status).toBe(200);
    expect((await complete(upload.id)).status).toBe(200);
  });

  it('takes a file in at the second try where the first was cut off while reading', async () => {
    const upload = await bringUp(ours.owner, (await commission()).id, await picture());
    house.store.faults.failNext({ method: 'GET', dropConnectionAfterBytes: 1000, times: 1 });
    await expect(takeInUpload.run(house.ctx, { uploadId: upload.id }, tools)).rejects.toThrow();
    expect((await ask(upload.id)).state).toBe('checking');
    await takeInUpload.run(house.ctx, { uploadId: upload.id }, { ...tools, attempt: 2 });
    expect((await ask(upload.id)).state).toBe('done');
  });

  it('makes no frame while its pictures cannot be written', async () => {
    const { id } = await commission();
    const upload = await bringUp(ours.owner, id, await picture());
    house.store.faults.failNext({ method: 'PUT', keyPattern: '-960.jpg', status: 500, times: 20 });
    await expect(takeInUpload.run(house.ctx, { uploadId: upload.id }, tools)).rejects.toThrow();
    expect(await Frame.query().where({ commissionId: id }).resultSize()).toBe(0);
    house.store.faults.clear();
    await house.runJobs();
    expect(await Frame.query().where({ commissionId: id, state: 'ready' }).resultSize()).toBe(1);
  });

  it('tells the person at the last try', async () => {
    const upload = await bringUp(ours.owner, (await commission()).id, await picture());
    house.store.faults.failNext({ method: 'GET', status: 500, times: 20 });
    await takeInUpload.run(house.ctx, { uploadId: upload.id }, { ...tools, attempt: 8, lastAttempt: true });
    expect(await ask(upload.id)).toMatchObject({ state: 'failed', problem: expect.stringContaining('Upload it again.') });
  });
});

describe('while the line to the browser fails', () => {
  it('does not count a part that broke off, and leaves its room to others', async () => {
    const file = randomBytes(PART);
    const upload = await beginOne(file);
    for (let time = 0; time < 15; time++) {
      const { request } = openPart(upload, 1, file);
      request.write(file.subarray(0, 50_000));
      await pause(20);
      request.destroy();
    }
    await pause(100);
    expect((await ask(upload.id)).partsThere).toEqual([]);
    expect((await sendPart(ours.owner, upload, file, 1)).status).toBe(200);
  });

  it('holds no more parts in memory than it may, and asks the next to wait', async () => {
    const file = randomBytes(PART);
    const theirs = await makeStudio(house, { name: 'Quay Street Pictures' });
    const [upload, another] = [await beginOne(file), await beginOne(file, theirs)];
    const hold = async (made: MadeStudio, to: UploadAnswer, count: number) => {
      const begun = Array.from({ length: count }, () => openPart(to, 1, file, made));
      for (const { request } of begun) request.write(file.subarray(0, 1000));
      await pause(1500);
      const refused = await sendPart(made.owner, to, file, 1);
      expect(refused.status).toBe(503);
      expect(refused.headers['retry-after']).toBe('1');
      return begun;
    };
    // One studio never has them all: what it leaves is the others'.
    const open = [...(await hold(ours, upload, 8)), ...(await hold(theirs, another, 4))];
    for (const { request } of open) {
      request.write(file.subarray(1000));
      request.end('\r\n--edge--\r\n');
    }
    const statuses = await Promise.all(open.map(async ({ answer }) => (await answer).statusCode));
    expect(statuses).toEqual(Array.from({ length: 12 }, () => 200));
    expect((await sendPart(ours.owner, upload, file, 1)).status).toBe(200);
  });
});

describe('after the server was started anew', () => {
  it('goes on where it stopped', async () => {
    const { id } = await commission();
    const file = Buffer.concat([await picture(), Buffer.alloc(PART)]);
    const upload = (await begin(ours.owner, id, file)).body as UploadAnswer;
    await sendPart(ours.owner, upload, file, 2);

    const { ctx, close } = await openHouse(house.ctx.config, pino({ level: 'silent' }));
    const sessions = new Sessions(ctx.config);
    const server = createServer(buildApp({ ctx, sessions, gates: createGates(sessions), limits: createLimits(ctx.knex, 1000) }));
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    const address = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
    const agent = supertest.agent(address).set('Cookie', ours.owner.cookie.split(';')[0] ?? '');
    try {
      const again = await begin({ agent, cookie: '' }, id, file);
      expect(again.status).toBe(200);
      expect(again.body).toMatchObject({ id: upload.id, partCount: 2, partsThere: [2] });
      expect((await sendPart({ agent, cookie: '' }, upload, file, 1)).status).toBe(200);
      expect((await agent.post(`/api/uploads/${upload.id}/complete`)).body.state).toBe('checking');
    } finally {
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      await sessions.stop();
      await close();
    }
  });
});
