import { connect } from 'node:net';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import type { StudioDelivery } from '../../api/contract/deliveries.ts';
import { trackDownload } from '../../api/features/downloads/track-download.ts';
import { Archive } from '../../api/models/Archive.ts';
import type { Commission } from '../../api/models/Commission.ts';
import type { Delivery } from '../../api/models/Delivery.ts';
import type { DeliveryRecipient } from '../../api/models/DeliveryRecipient.ts';
import { Download } from '../../api/models/Download.ts';
import { RecordEntry } from '../../api/models/RecordEntry.ts';
import { makeSentDelivery } from '../support/factories/delivery.ts';
import { makeStudio, type GuestPerson, type MadeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

vi.setConfig({ testTimeout: 180_000 });
let house: House;
let made: MadeStudio;
let sent: { commission: Commission; delivery: Delivery; recipient: DeliveryRecipient; guest: GuestPerson };
let address: string;
let size: number;

beforeAll(async () => {
  house = await startHouse();
  made = await makeStudio(house);
  sent = await makeSentDelivery(house, made, { names: ['East front.jpg', 'Quay.jpg'] });
  address = `/api/deliveries/${sent.delivery.id}/archives/full/download`;
  size = (await Archive.query().findOne({ deliveryId: sent.delivery.id, kind: 'full' }).throwIfNotFound()).sizeBytes ?? 0;
});
afterAll(() => house.stop());

const rows = (what = 'full') => Download.query().where({ deliveryId: sent.delivery.id, what }).orderBy('startedAt');
const forget = () => Download.query().delete().where({ deliveryId: sent.delivery.id });
/** What was written down once the last bytes are through: that comes after the answer. */
const settled = (expected: unknown[][]) =>
  expect.poll(async () => (await rows()).map((row) => [row.sentBytes, row.finishedAt !== null]), { timeout: 30_000 }).toEqual(expected);
const said = async () =>
  (await RecordEntry.query().where({ commissionId: sent.commission.id }).where('did', 'like', 'download.%').orderBy('id')).map(
    (entry) => entry.says,
  );
const get = (range?: string) => {
  const asked = sent.guest.agent.get(address).buffer(true);
  return range ? asked.set('Range', range) : asked;
};
const studio = async () =>
  (await made.owner.agent.get(`/api/commissions/${sent.commission.id}/deliveries/${sent.delivery.id}`).expect(200)).body as StudioDelivery;
const fetching = () => ({
  actor: { kind: 'guest' as const, accountId: sent.recipient.accountId, name: 'x', email: 'x@y.test', sessionId: 's' },
  recipient: sent.recipient,
  delivery: sent.delivery,
  what: 'full' as const,
  deliveryFileId: null,
  size: 1000,
  called: 'everything in full resolution',
});

describe('a download', () => {
  it('is written down from its beginning to its end, with who, what, when and how much', async () => {
    await forget();
    await get().expect(200);
    await settled([[size, true]]);
    const [row] = await rows();
    expect(row).toMatchObject({ accountId: sent.recipient.accountId, what: 'full', sizeBytes: size, sentBytes: size });
    expect(row?.finishedAt).toBeInstanceOf(Date);
    const lines = (await said()).slice(-2);
    expect(lines[0]).toMatch(/^Began to fetch everything in full resolution, .+ \(delivery 1\)$/);
    expect(lines[1]).toMatch(/^Fetched everything in full resolution, .+ \(delivery 1\)$/);
    const [entry] = await RecordEntry.query().where({ commissionId: sent.commission.id, did: 'download.finished' }).orderBy('id', 'desc');
    expect([entry?.byKind, entry?.byName]).toEqual(['guest', 'Oskar Lind']);
  });

  it('in five pieces, in any order, is one', async () => {
    await forget();
    const step = Math.ceil(size / 5);
    const pieces = [0, 3, 1, 4, 2].map((n) => `bytes=${n * step}-${Math.min((n + 1) * step, size) - 1}`);
    await get(pieces[0]).expect(206);
    for (const piece of pieces.slice(1, -1)) await get(piece).expect(206);
    await settled([[expect.any(Number), false]]);
    await get(pieces.at(-1)).expect(206);
    await settled([[size, true]]);
  });

  it('of the same piece twice is not finished by it', async () => {
    await forget();
    const half = Math.ceil(size / 2);
    for (let again = 0; again < 3; again += 1) await get(`bytes=0-${half - 1}`).expect(206);
    await settled([[half, false]]);
  });

  it('begun anew a while after it broke off is another one; continued it is the same', async () => {
    await forget();
    await get('bytes=0-99').expect(206);
    await settled([[100, false]]);
    await Download.query()
      .where({ deliveryId: sent.delivery.id })
      .patch({ lastAt: new Date(Date.now() - 11 * 60_000) });
    await get('bytes=100-199').expect(206);
    await settled([[200, false]]);
    await Download.query()
      .where({ deliveryId: sent.delivery.id })
      .patch({ lastAt: new Date(Date.now() - 11 * 60_000) });
    await get('bytes=0-99').expect(206);
    expect(await rows()).toHaveLength(2);
  });

  it('is not begun by asking for its head, nor where nothing is sent', async () => {
    await forget();
    await sent.guest.agent.head(address).expect(200);
    const { headers } = await sent.guest.agent.head(address);
    await sent.guest.agent
      .get(address)
      .set('If-None-Match', headers.etag ?? '')
      .expect(304);
    await get(`bytes=${size}-`).expect(416);
    expect(await rows()).toEqual([]);
  });

  it('of two connections at once is one', async () => {
    await forget();
    const half = Math.floor(size / 2);
    await Promise.all([get(`bytes=0-${half - 1}`).expect(206), get(`bytes=${half}-`).expect(206)]);
    await settled([[size, true]]);
  });

  it('that the client breaks off says how far it came', async () => {
    await forget();
    const watch = trackDownload(house.ctx, fetching());
    await watch.begin?.([{ start: 0, end: 999 }]);
    watch.sent?.({ start: 0, end: 99 });
    watch.sent?.({ start: 100, end: 199 });
    await watch.end?.();
    await settled([[200, false]]);
    const [person] = (await studio()).recipients;
    expect(person?.full).toMatchObject({ finished: false, sent: 200, times: 1 });
    const client = connect(Number(new URL(house.address).port), '127.0.0.1');
    client.write(`GET ${address} HTTP/1.1\r\nHost: a\r\nCookie: ${sent.guest.cookie.split(';')[0]}\r\n\r\n`);
    await new Promise((resolve) => client.once('data', resolve));
    client.destroy();
    await expect.poll(async () => (await rows()).length, { timeout: 20_000 }).toBe(1);
  });
});

describe('the studio sees of each recipient', () => {
  it('which files they have and which not', async () => {
    await forget();
    const { files } = await studio();
    const file = `/api/deliveries/${sent.delivery.id}/files/${files[0]?.id}/download`;
    await sent.guest.agent.get(file).buffer(true).expect(200).expect('content-type', 'image/jpeg');
    await expect.poll(async () => (await studio()).recipients[0]?.filesFetched, { timeout: 30_000 }).toBe(1);
    const [person] = (await studio()).recipients;
    expect(person).toMatchObject({ filesFetched: 1, full: null, web: null });
    expect(Object.keys(person?.files ?? {})).toEqual([files[0]?.id]);
    await get().expect(200);
    await settled([[size, true]]);
    expect((await studio()).recipients[0]).toMatchObject({ filesFetched: 2, full: { finished: true, times: 1 } });
    const page = (await sent.guest.agent.get(`/api/deliveries/${sent.delivery.id}`)).body as {
      files: { fetched: boolean }[];
      archives: { fetched: boolean }[];
    };
    expect([page.files.map((one) => one.fetched), page.archives.map((one) => one.fetched)]).toEqual([
      [true, true],
      [true, false],
    ]);
  });
});
