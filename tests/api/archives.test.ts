import { execFile } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import type { ArchiveState } from '../../api/contract/deliveries.ts';
import { archiveFiles } from '../../api/features/archives/archive-files.ts';
import { buildArchive } from '../../api/features/archives/build-archive.job.ts';
import { planArchive } from '../../api/features/archives/plan-archive.ts';
import { storeArchive } from '../../api/features/archives/store-archive.ts';
import { Archive } from '../../api/models/Archive.ts';
import { Frame } from '../../api/models/Frame.ts';
import { RecordEntry } from '../../api/models/RecordEntry.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeSentDelivery } from '../support/factories/delivery.ts';
import { makePickList } from '../support/factories/final.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

vi.setConfig({ testTimeout: 180_000 });
const run = promisify(execFile);
const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
let house: House;
let made: MadeStudio;
let dir: string;

beforeAll(async () => {
  dir = mkdtempSync(path.join(tmpdir(), 'oriel-archives-'));
  house = await startHouse();
  made = await makeStudio(house);
});
afterAll(async () => {
  await house.stop();
  rmSync(dir, { recursive: true });
});

const sha256 = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex');

/** A frame whose row names the hash of the bytes that the store has. */
async function trueFrame(commission: { id: string; studioId: string }, name: string): Promise<Frame> {
  const frame = await makeFrame(house, commission, { name });
  const bytes = await house.ctx.store.getBuffer(frame.storageKey);
  return Frame.query().patchAndFetchById(frame.id, { sha256: sha256(bytes), sizeBytes: bytes.length });
}

async function unpack(zip: Buffer): Promise<string> {
  const folder = mkdtempSync(path.join(dir, 'zip-'));
  writeFileSync(path.join(folder, 'a.zip'), zip);
  await run('unzip', ['-q', 'a.zip'], { cwd: folder, env: { ...process.env, LC_ALL: 'C.UTF-8' } });
  const [inside = ''] = readdirSync(folder).filter((name) => name !== 'a.zip');
  const unpacked = path.join(folder, inside);
  await run('sha256sum', ['-c', '--strict', 'SHA256SUMS.txt'], { cwd: unpacked });
  return unpacked;
}

describe('the originals of a pick list', () => {
  it('are one archive, built once, that can be fetched in pieces', async () => {
    const commission = await makeCommission(made.studio, { title: 'Ropewalk Library' });
    const frames = [];
    for (const name of ['Brücke.jpg', 'HL_0412.jpg', 'hl_0412.JPG']) frames.push(await trueFrame(commission, name));
    const list = await makePickList(commission, frames);
    const address = `/api/pick-lists/${list.id}/archive`;
    const { agent } = made.assistant;
    await agent.get(address).expect(404);
    const asked = await Promise.all([1, 2, 3].map(() => agent.post(address).expect(202)));
    expect(asked.map((answer) => (answer.body as ArchiveState).state)).toEqual(['building', 'building', 'building']);
    await agent.get(`${address}/download`).expect(409);
    expect(await Archive.query().where({ pickListId: list.id }).resultSize()).toBe(1);
    await house.runJobs();
    const state = (await agent.get(address).expect(200)).body as ArchiveState;
    expect(state).toMatchObject({ kind: 'picks', state: 'ready', files: 3, name: 'Ropewalk Library – pick list 1', written: state.size });
    expect((await agent.post(address).expect(202)).body).toMatchObject({ state: 'ready' });

    const whole = await agent.get(`${address}/download`).buffer(true).expect(200).parse(bytesOf);
    const zip = whole.body as Buffer;
    expect(whole.headers['content-length']).toBe(String(zip.length));
    expect(whole.headers.etag).toBe(`"${sha256(zip)}"`);
    expect(whole.headers['content-disposition']).toContain("filename*=UTF-8''Ropewalk%20Library%20%E2%80%93%20pick%20list%201.zip");
    const rest = await agent
      .get(`${address}/download`)
      .set({ Range: 'bytes=1000-', 'If-Range': whole.headers.etag ?? '' })
      .buffer(true)
      .expect(206)
      .parse(bytesOf);
    expect(zip.subarray(1000).equals(rest.body as Buffer)).toBe(true);
    const unpacked = await unpack(zip);
    expect(readdirSync(unpacked).sort()).toEqual(['Brücke.jpg', 'HL_0412.jpg', 'SHA256SUMS.txt', 'hl_0412 (2).JPG']);
    frames.forEach((frame, at) => {
      const name = ['Brücke.jpg', 'HL_0412.jpg', 'hl_0412 (2).JPG'][at] ?? '';
      expect(sha256(readFileSync(path.join(unpacked, name)))).toBe(frame.sha256);
    });
    const fetched = await RecordEntry.query().where({ commissionId: commission.id, did: 'pick-list.fetched' });
    expect(fetched.map((entry) => [entry.byName, entry.says])).toEqual([['Petra Thorn', 'Fetched the originals of pick list 1']]);
  });

  it('are for the studio alone', async () => {
    const commission = await makeCommission(made.studio);
    const list = await makePickList(commission, [await trueFrame(commission, 'One.jpg')]);
    const stranger = await makeStudio(house, { name: 'Other Studio' });
    const address = `/api/pick-lists/${list.id}/archive`;
    for (const [agent, status] of [
      [stranger.owner.agent, 404],
      [house.agent(), 401],
    ] as const) {
      await agent.post(address).expect(status);
      await agent.get(address).expect(status);
      await agent.get(`${address}/download`).expect(status);
    }
  });
});

describe('the archives of a delivery', () => {
  it('hold the files as they came, and each as a JPEG of at most 2048 px in sRGB', async () => {
    const { guest, delivery } = await makeSentDelivery(house, made, { names: ['Brücke.jpg', 'Quay.tif'], title: 'Corn Exchange' });
    const fetch = async (kind: string) =>
      (await guest.agent.get(`/api/deliveries/${delivery.id}/archives/${kind}/download`).buffer(true).expect(200).parse(bytesOf))
        .body as Buffer;
    const full = await unpack(await fetch('full'));
    expect(path.basename(full)).toBe('Corn Exchange – delivery 1');
    expect(readdirSync(full).sort()).toEqual(['Brücke.jpg', 'Quay.tif', 'SHA256SUMS.txt']);
    const web = await unpack(await fetch('web'));
    expect(path.basename(web)).toBe('Corn Exchange – delivery 1, web size');
    expect(readdirSync(web).sort()).toEqual(['Brücke.jpg', 'Quay.jpg', 'SHA256SUMS.txt']);
    const { default: sharp } = await import('sharp');
    const meta = await sharp(path.join(web, 'Quay.jpg')).metadata();
    expect([meta.format, meta.space, meta.hasProfile, Math.max(meta.width, meta.height) <= 2048]).toEqual(['jpeg', 'srgb', true, true]);
  });

  it('are the same, byte for byte, however often they are built', async () => {
    const { delivery, commission } = await makeSentDelivery(house, made, { names: ['One.jpg', 'Two.jpg'] });
    const before = await Archive.query().findOne({ deliveryId: delivery.id, kind: 'web' }).throwIfNotFound();
    await house.ctx.store.remove(before.storageKey);
    await Archive.query().findById(before.id).patch({ state: 'building', sizeBytes: null, sha256: null, readyAt: null });
    await Promise.all([1, 2].map(() => buildArchive.run(house.ctx, { archiveId: before.id }, tools)));
    const after = await Archive.query().findById(before.id).throwIfNotFound();
    expect([after.sha256, after.sizeBytes, after.state]).toEqual([before.sha256, before.sizeBytes, 'ready']);
    expect(sha256(await house.ctx.store.getBuffer(after.storageKey))).toBe(before.sha256);
    expect(commission.id).toBeTruthy();
  });

  it('leave nothing in the store when they are broken off, and go through the next time', async () => {
    const { delivery, commission } = await makeSentDelivery(house, made, { names: ['One.jpg'] });
    const archive = await Archive.query().findOne({ deliveryId: delivery.id, kind: 'full' }).throwIfNotFound();
    const plan = planArchive('x', await archiveFiles(house.ctx, archive, commission.id, tools.signal), archive.createdAt);
    const stop = new AbortController();
    house.store.faults.failNext({ method: 'PUT', keyPattern: 'broken.zip', delayMs: 2000 });
    const storing = storeArchive(house.ctx.store, 'broken.zip', plan, { signal: stop.signal });
    setTimeout(() => stop.abort(new Error('the worker is stopping')), 100);
    await expect(storing).rejects.toThrow(/worker is stopping|aborted/);
    house.store.faults.clear();
    expect(await house.ctx.store.head('broken.zip')).toBeUndefined();
    house.store.faults.failNext({ method: 'PUT', keyPattern: 'broken.zip', status: 500, times: 10 });
    await expect(storeArchive(house.ctx.store, 'broken.zip', plan, tools)).rejects.toThrow();
    house.store.faults.clear();
    expect(await house.ctx.store.head('broken.zip')).toBeUndefined();
    const { size, sha256: hash } = await storeArchive(house.ctx.store, 'broken.zip', plan, tools);
    expect([size, hash]).toEqual([plan.length, sha256(await house.ctx.store.getBuffer('broken.zip'))]);
  });
});

type Answer = { on(event: 'data' | 'end', hear: (chunk: Buffer) => void): unknown };
function bytesOf(answer: unknown, done: (error: Error | null, body: Buffer) => void): void {
  const chunks: Buffer[] = [];
  (answer as Answer).on('data', (chunk) => chunks.push(chunk));
  (answer as Answer).on('end', () => done(null, Buffer.concat(chunks)));
}
