import http from 'node:http';
import { randomUUID } from 'node:crypto';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { FrameItem, FrameList } from '../../api/contract/frames.ts';
import { announce } from '../../api/db/live.ts';
import { purgeFrames } from '../../api/features/frames/purge-frames.job.ts';
import { Final } from '../../api/models/Final.ts';
import { Frame } from '../../api/models/Frame.ts';
import { RecordEntry } from '../../api/models/RecordEntry.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import type { Commission } from '../../api/models/Commission.ts';
import type { View } from '../../api/models/View.ts';
import { frameKey } from '../../api/services/storage-keys.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeSheet } from '../../api/features/sheets/make-sheet.ts';
import { makeGuestAgent, makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

let house: House;
let ours: MadeStudio;
let theirs: MadeStudio;
let commission: Commission & { views: View[] };

beforeAll(async () => {
  house = await startHouse();
  ours = await makeStudio(house);
  theirs = await makeStudio(house);
});
beforeEach(async () => {
  commission = await makeCommission(ours.studio, { views: ['East front across the basin, dusk', 'Reading room, axis'] });
});
afterAll(() => house.stop());
afterEach(() => expect(house.logged.splice(0)).toEqual([]));

const path = (rest = '') => `/api/commissions/${commission.id}/frames${rest}`;
const post = (what: string, body: object, person = ours.owner) => person.agent.post(path(`/${what}`)).send(body);

async function all(query = '', limit = 2): Promise<FrameItem[]> {
  const items: FrameItem[] = [];
  let after = '';
  do {
    const { body } = (await ours.assistant.agent.get(path(`?limit=${limit}${query}${after}`))) as { body: FrameList };
    items.push(...body.items);
    after = body.next ? `&after=${body.next}` : '';
  } while (after);
  return items;
}
const names = async (query = '') => (await all(query)).map(({ name }) => name);

/** Rows without files, for lists that never open one. */
async function rowsOf(values: Partial<Frame>[]): Promise<void> {
  const rows = values.map((row, index) => ({
    studioId: ours.studio.id,
    commissionId: commission.id,
    state: 'ready' as const,
    name: `HL_${String(index).padStart(5, '0')}.jpg`,
    originalName: 'x',
    mediaType: 'image/jpeg',
    sizeBytes: 1,
    sha256: index.toString(16).padStart(64, '0'),
    storageKey: 'none',
    width: 6000,
    height: 4000,
    recipe: 1,
    ...row,
  }));
  await house.ctx.knex.batchInsert('frames', rows, 1000);
}

describe('the list', () => {
  it('shows what a row of pictures needs', async () => {
    const frame = await makeFrame(house, commission, { takenLocal: '2026-10-28T17:06:12.34', viewId: commission.views[0]?.id ?? null });
    const [item] = await all();
    expect(item).toEqual({
      id: frame.id,
      name: frame.name,
      state: 'ready',
      problem: null,
      width: 6000,
      height: 4000,
      placeholder: null,
      pictures: { '480': expect.stringContaining('/pictures/'), '960': expect.stringContaining('/pictures/') },
      viewId: commission.views[0]?.id,
      hidden: false,
      takenLocal: '2026-10-28T17:06:12.34',
      fNumber: 11,
      exposureTime: 1 / 125,
      iso: 100,
      focalLength: 35,
      bracketId: null,
      checks: [],
      alike: null,
    });
    const address = item?.pictures?.['480'] ?? '';
    expect((await house.request.get(address)).status).toBe(200);
    expect(JSON.stringify(item).length).toBeLessThan(1200);
  });

  it('says that there is none', async () => {
    expect((await ours.owner.agent.get(path())).body).toEqual({ items: [], next: null });
  });

  it('sorts by the time taken, to the microsecond, and puts what is unknown last in both directions', async () => {
    await rowsOf([
      { name: 'c', takenLocal: '2026-10-28T17:06:12.340001' },
      { name: 'unknown-b', takenLocal: null },
      { name: 'a', takenLocal: '2026-10-28T17:06:12.34' },
      { name: 'unknown-a', takenLocal: null },
      { name: 'b', takenLocal: '2026-10-28T17:06:12.34' },
      { name: 'd', takenLocal: '2026-10-29T00:00:00' },
    ]);
    expect(await names()).toEqual(['a', 'b', 'c', 'd', 'unknown-a', 'unknown-b']);
    expect(await names('&order=desc')).toEqual(['d', 'c', 'a', 'b', 'unknown-a', 'unknown-b']);
  });

  it('sorts by every setting across pages', async () => {
    await rowsOf([
      { name: 'a', fNumber: 8, exposureTime: 1 / 125, iso: 400, focalLength: 24 },
      { name: 'b', fNumber: 5.6, exposureTime: 30, iso: 100, focalLength: 135 },
      { name: 'c', fNumber: null, exposureTime: 1 / 8000, iso: null, focalLength: 17 },
      { name: 'd', fNumber: 11, exposureTime: null, iso: 6400, focalLength: null },
    ]);
    expect(await names('&sort=f-number')).toEqual(['b', 'a', 'd', 'c']);
    expect(await names('&sort=f-number&order=desc')).toEqual(['d', 'a', 'b', 'c']);
    expect(await names('&sort=exposure-time')).toEqual(['c', 'a', 'b', 'd']);
    expect(await names('&sort=iso&order=desc')).toEqual(['d', 'a', 'b', 'c']);
    expect(await names('&sort=focal-length')).toEqual(['c', 'a', 'b', 'd']);
    expect(await names('&sort=name&order=desc')).toEqual(['d', 'c', 'b', 'a']);
    expect((await names('&sort=added')).sort()).toEqual(['a', 'b', 'c', 'd']);
  });

  it('filters by view, hidden, state and part of the name', async () => {
    const viewId = commission.views[1]?.id ?? '';
    await rowsOf([
      { name: 'HL_0412.jpg', viewId },
      { name: 'HL_0415.jpg', hiddenAt: new Date() },
      { name: 'east_100%.jpg' },
      { name: 'reading.jpg', state: 'reading', recipe: null },
    ]);
    expect(await names(`&view=${viewId}`)).toEqual(['HL_0412.jpg']);
    expect(await names('&view=none')).toEqual(['HL_0415.jpg', 'east_100%.jpg', 'reading.jpg']);
    expect(await names('&hidden=only')).toEqual(['HL_0415.jpg']);
    expect(await names('&hidden=without')).toEqual(['HL_0412.jpg', 'east_100%.jpg', 'reading.jpg']);
    expect(await names('&state=reading')).toEqual(['reading.jpg']);
    expect((await all('&state=reading'))[0]?.pictures).toBeNull();
    expect(await names('&text=hl_04')).toEqual(['HL_0412.jpg', 'HL_0415.jpg']);
    expect(await names('&text=%25')).toEqual(['east_100%.jpg']);
    expect(await names('&text=_0')).toEqual(['HL_0412.jpg', 'HL_0415.jpg']);
  });

  it('pages through ten thousand without missing or repeating one', async () => {
    const taken = (index: number) => (index % 7 === 0 ? null : `2026-10-28T${String(index % 24).padStart(2, '0')}:00:00`);
    await rowsOf(Array.from({ length: 10_000 }, (_, index) => ({ takenLocal: taken(index) })));
    for (const query of ['', '&sort=taken&order=desc', '&sort=name', '&sort=added']) {
      const found = await all(query, 1000);
      expect(new Set(found.map(({ id }) => id)).size).toBe(10_000);
      expect(found).toHaveLength(10_000);
    }
  });

  it('refuses an order it does not know, and begins anew for a cursor it did not give', async () => {
    await rowsOf([{}]);
    expect((await ours.owner.agent.get(path('?sort=colour'))).status).toBe(422);
    expect((await ours.owner.agent.get(path('?limit=1001'))).status).toBe(422);
    expect((await ours.owner.agent.get(path('?after=nonsense'))).body.items).toHaveLength(1);
  });

  it('answers a cursor with a forged key without breaking', async () => {
    const forged = Buffer.from(JSON.stringify(['not a time', 'x', 'no-id'])).toString('base64url');
    const answer = await ours.owner.agent.get(path(`?after=${forged}`));
    expect(answer.status).toBe(422);
  });
});

describe('one frame', () => {
  it('is shown with everything known of it', async () => {
    const frame = await makeFrame(house, commission);
    const { body } = await ours.assistant.agent.get(`/api/frames/${frame.id}`);
    expect(body).toMatchObject({ id: frame.id, commissionId: commission.id, sha256: frame.sha256, size: frame.sizeBytes });
    expect(Object.keys(body.pictures)).toEqual(['480', '960', '2560']);
    expect(JSON.stringify(body)).not.toContain(frame.storageKey);
  });

  it('is not there for another studio, a guest or nobody', async () => {
    const frame = await makeFrame(house, commission);
    expect((await theirs.owner.agent.get(`/api/frames/${frame.id}`)).status).toBe(404);
    expect((await (await makeGuestAgent(house)).agent.get(`/api/frames/${frame.id}`)).status).toBe(401);
    expect((await house.request.get(`/api/frames/${frame.id}`)).status).toBe(401);
    expect((await theirs.owner.agent.get(path())).status).toBe(404);
    expect((await theirs.owner.agent.get(path('/summary'))).status).toBe(404);
    expect((await theirs.owner.agent.get(`/api/commissions/${commission.id}/events`)).status).toBe(404);
  });
});

describe('the figures', () => {
  it('count by state and view', async () => {
    const viewId = commission.views[0]?.id ?? '';
    await rowsOf([{ viewId }, { viewId }, { hiddenAt: new Date() }, { state: 'reading' }, { deletedAt: new Date() }]);
    const { body } = await ours.owner.agent.get(path('/summary'));
    expect(body).toEqual({
      ...{ total: 4, ready: 3, reading: 1, failed: 0, hidden: 1, deleted: 1, bytes: 4, underNoView: 2 },
      ...{ brackets: 0, single: 4, toCheck: 0, alike: 0 },
      views: [{ viewId, count: 2 }],
      can: { upload: true, change: true },
    });
  });
});

describe('changing many', () => {
  it('hides and shows, and says which were changed', async () => {
    const [one, two] = [await makeFrame(house, commission), await makeFrame(house, commission)];
    const frameIds = [one.id, two.id, randomUUID()];
    expect((await post('hide', { frameIds: [one.id] })).body).toEqual({ frameIds: [one.id] });
    expect((await post('hide', { frameIds }, ours.assistant)).body).toEqual({ frameIds: [two.id] });
    expect((await all('&hidden=only')).map(({ id }) => id).sort()).toEqual([one.id, two.id].sort());
    expect((await post('show', { frameIds })).body.frameIds.sort()).toEqual([one.id, two.id].sort());
  });

  it('hangs frames under a view of the commission and takes them down', async () => {
    const frame = await makeFrame(house, commission);
    const viewId = commission.views[0]?.id;
    expect((await post('hang', { frameIds: [frame.id], viewId })).body).toEqual({ frameIds: [frame.id] });
    expect((await post('hang', { frameIds: [frame.id], viewId })).body).toEqual({ frameIds: [] });
    expect((await all())[0]?.viewId).toBe(viewId);
    expect((await post('hang', { frameIds: [frame.id], viewId: null })).body).toEqual({ frameIds: [frame.id] });
  });

  it('refuses a view of another commission', async () => {
    const frame = await makeFrame(house, commission);
    const other = await makeCommission(ours.studio, { views: ['North'] });
    const answer = await post('hang', { frameIds: [frame.id], viewId: other.views[0]?.id });
    expect(answer.status).toBe(422);
    expect(answer.body.detail).toBe('This view is no longer in the brief.');
  });

  it('leaves the frames of other commissions and studios alone', async () => {
    const elsewhere = await makeFrame(house, await makeCommission(ours.studio));
    const foreign = await makeFrame(house, await makeCommission(theirs.studio));
    const frameIds = [elsewhere.id, foreign.id];
    for (const what of ['hide', 'delete']) expect((await post(what, { frameIds })).body.frameIds).toEqual([]);
    for (const what of ['hide', 'show', 'delete', 'restore']) expect((await post(what, { frameIds }, theirs.owner)).status).toBe(404);
    expect(await Frame.query().whereIn('id', frameIds).whereNull('hiddenAt').whereNull('deletedAt').resultSize()).toBe(2);
  });

  it('refuses none, and more than a thousand', async () => {
    expect((await post('hide', { frameIds: [] })).status).toBe(422);
    expect((await post('hide', { frameIds: Array.from({ length: 1001 }, () => randomUUID()) })).status).toBe(422);
  });

  it('changes nothing in a closed commission', async () => {
    const closed = await makeCommission(ours.studio, { closedAt: new Date() });
    const frame = await makeFrame(house, closed);
    for (const what of ['hide', 'delete']) {
      const answer = await ours.owner.agent.post(`/api/commissions/${closed.id}/frames/${what}`).send({ frameIds: [frame.id] });
      expect(answer.status).toBe(409);
    }
    expect((await ours.owner.agent.get(`/api/commissions/${closed.id}/frames/summary`)).body.can).toEqual({ upload: false, change: false });
  });
});

describe('deleting', () => {
  it('can be undone, with view and all', async () => {
    const frame = await makeFrame(house, commission, { viewId: commission.views[0]?.id ?? null });
    expect((await post('delete', { frameIds: [frame.id] }, ours.assistant)).body).toEqual({ frameIds: [frame.id], refused: [] });
    expect(await all()).toEqual([]);
    expect((await all('&deleted=only')).map(({ id }) => id)).toEqual([frame.id]);
    expect((await post('restore', { frameIds: [frame.id] })).body).toEqual({ frameIds: [frame.id], refused: [] });
    expect((await all())[0]).toMatchObject({ id: frame.id, viewId: commission.views[0]?.id });
    const says = (await RecordEntry.query().where({ commissionId: commission.id }).orderBy('id')).map((line) => line.says);
    expect(says).toEqual([`Deleted the frame “${frame.name}”`, 'Restored a frame']);
  });

  it('is refused for frames that a client has, each with its reason, and takes the others', async () => {
    const loose = await makeFrame(house, commission);
    const finished = await makeFrame(house, commission);
    await Final.query().insert({
      studioId: ours.studio.id,
      commissionId: commission.id,
      frameId: finished.id,
      match: 'by-hand',
      candidates: [],
    });
    const onSheet = (await makeFrame(house, commission)).id;
    const sheet = await makeSheet(house.ctx, ours.owner.actor, commission.id, [onSheet]);
    const { body } = await post('delete', { frameIds: [loose.id, finished.id, onSheet] });
    expect(body.frameIds).toEqual([loose.id]);
    const why = Object.fromEntries(body.refused.map((one: { frameId: string; why: string }) => [one.frameId, one.why]));
    expect(why[finished.id]).toBe('It has a finished file. Delete that first.');
    expect(why[onSheet]).toBe('It is on proof sheet 1. Take it off the sheet first.');
    await Sheet.query().findById(sheet.id).patch({ issuedAt: new Date() });
    const issued = await post('delete', { frameIds: [onSheet] });
    expect(issued.body.refused[0].why).toBe('It is on proof sheet 1, which your client has.');
  });

  it('is not undone where the same file was brought in again', async () => {
    const frame = await makeFrame(house, commission);
    await post('delete', { frameIds: [frame.id] });
    await rowsOf([{ sha256: frame.sha256 }]);
    const { body } = await post('restore', { frameIds: [frame.id] });
    expect(body).toEqual({
      frameIds: [],
      refused: [{ frameId: frame.id, name: frame.name, why: 'The same file has been brought in again.' }],
    });
  });

  it('becomes final after thirty days: files and row go, what a proof names stays', async () => {
    const [old, recent] = [await makeFrame(house, commission), await makeFrame(house, commission)];
    const kept = await makeFrame(house, commission);
    await makeSheet(house.ctx, ours.owner.actor, commission.id, [kept.id]);
    const days = (count: number) => new Date(Date.now() - count * 24 * 60 * 60 * 1000);
    await Frame.query()
      .whereIn('id', [old.id, kept.id])
      .patch({ deletedAt: days(32) });
    await Frame.query()
      .findById(recent.id)
      .patch({ deletedAt: days(29) });
    expect((await post('restore', { frameIds: [old.id] })).body.refused[0].why).toBe('It was deleted too long ago.');
    const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
    await purgeFrames.run(house.ctx, {}, tools);
    await purgeFrames.run(house.ctx, {}, tools);
    expect(await Frame.query().findById(old.id)).toBeUndefined();
    for (const key of [old.storageKey, frameKey(old, 480), frameKey(old, 2560)]) expect(await house.ctx.store.head(key)).toBeUndefined();
    for (const frame of [recent, kept]) {
      expect(await Frame.query().findById(frame.id)).toBeDefined();
      expect(await house.ctx.store.head(frame.storageKey)).toBeDefined();
    }
  });
});

describe('events', () => {
  it('tell an open page of changes, its own commission alone', async () => {
    const events: string[] = [];
    const request = http.get(`${house.address}/api/commissions/${commission.id}/events`, {
      headers: { cookie: ours.owner.cookie.split(';')[0] ?? '' },
    });
    const heard = new Promise<void>((resolve, reject) => {
      request.on('error', reject);
      request.on('response', (response) => {
        expect(response.headers['content-type']).toBe('text/event-stream; charset=utf-8');
        void announce(house.ctx.knex, 'commission:other', { what: 'frames-changed' }).then(() =>
          announce(house.ctx.knex, `commission:${commission.id}`, { what: 'frames-changed' }),
        );
        response.on('data', (chunk: Buffer) => {
          events.push(
            ...chunk
              .toString()
              .split('\n')
              .filter((line) => line.startsWith('data:')),
          );
          if (events.length > 0) resolve();
        });
      });
    });
    await heard;
    request.destroy();
    expect(events).toEqual(['data: {"what":"frames-changed"}']);
  });
});
