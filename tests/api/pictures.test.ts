import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import sharp from 'sharp';
import type { Frame } from '../../api/models/Frame.ts';
import { pictureAddress, sealHolds, windowAt, WINDOW_SECONDS } from '../../api/services/picture-address.ts';
import { archiveKey, finalKey, frameKey, proofKey, watermarkKey, webSizeKey } from '../../api/services/storage-keys.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { drawPicture, makeFrame } from '../support/factories/frame.ts';
import { makeStudio } from '../support/factories/studio.ts';
import { startHouse, type House } from '../support/house.ts';

let house: House;
let frame: Frame;
const HOUR = 60 * 60 * 1000;

beforeAll(async () => {
  house = await startHouse();
  const { studio } = await makeStudio(house);
  frame = await makeFrame(house, await makeCommission(studio));
});
afterAll(() => house.stop());

const address = (key: string, now?: number) => pictureAddress(house.ctx, key, now);

describe('a picture by its signed address', () => {
  it('comes without a session, whole, and may be kept by the browser alone until the address ends', async () => {
    const answer = await house.request.get(await address(frameKey(frame, 960)));
    expect(answer.status).toBe(200);
    expect(answer.body.equals(await house.ctx.store.getBuffer(frameKey(frame, 960)))).toBe(true);
    expect((await sharp(answer.body).metadata()).format).toBe('jpeg');
    expect(answer.headers).toMatchObject({
      'content-type': 'image/jpeg',
      'x-content-type-options': 'nosniff',
      'cross-origin-resource-policy': 'same-origin',
    });
    const [, seconds] = /^private, max-age=(\d+), immutable$/.exec(answer.headers['cache-control'] ?? '') ?? [];
    expect(Number(seconds)).toBeGreaterThan(WINDOW_SECONDS - 60);
    expect(Number(seconds)).toBeLessThanOrEqual(2 * WINDOW_SECONDS);
    expect(answer.headers['set-cookie']).toBeUndefined();
  });

  it('keeps its address within a window, so that it is fetched once', async () => {
    const start = windowAt(Date.now()).from * 1000;
    const key = frameKey(frame, 480);
    expect(await address(key, start)).toBe(await address(key, start + 5 * HOUR));
    expect(await address(key, start)).not.toBe(await address(key, start + 6 * HOUR));
  });

  it('opens all sizes of one picture by one seal', async () => {
    const [small, large] = [await address(frameKey(frame, 480)), await address(frameKey(frame, 2560))];
    expect(small.replace('-480.jpg', '-2560.jpg')).toBe(large);
    expect((await house.request.get(large)).status).toBe(200);
  });

  it('ends with the window after its own', async () => {
    const answer = await house.request.get(await address(frameKey(frame, 480), Date.now() - 13 * HOUR));
    expect(answer.status).toBe(403);
    expect(answer.headers['content-type']).toContain('application/problem+json');
    expect(answer.body.detail).toBe('This address has ended or was never given out. Reload the page.');
  });

  it('is refused with another seal, another key, another end, or none', async () => {
    const good = await address(frameKey(frame, 480));
    const { until } = windowAt(Date.now());
    const wrong = [
      good.replace(/seal=(.)/, (_all, first: string) => `seal=${first === 'A' ? 'B' : 'A'}`),
      good.replace(frame.id, frame.commissionId),
      good.replace(String(until), String(until + 1)),
      good.replace(/until=\d+/, 'until=abc'),
      good.replace(/&seal=.*/, ''),
      good.replace(/\?.*/, ''),
      `${good}&seal=x`,
    ];
    for (const each of wrong) expect((await house.request.get(each)).status).toBe(403);
    expect(sealHolds('another-secret-that-is-just-as-long-as-it-must', frameKey(frame, 480), until, good.split('seal=')[1] ?? '')).toBe(
      false,
    );
  });

  it('is never an original, a web size or an archive, even where the seal holds', async () => {
    const { studioId, commissionId } = frame;
    for (const key of [
      frame.storageKey,
      webSizeKey({ studioId, id: frame.id }, commissionId),
      archiveKey(studioId, commissionId),
      `studios/${studioId}/commissions/${commissionId}/pictures/../originals/x.jpg`,
    ]) {
      expect((await house.request.get(await address(key))).status).toBe(403);
    }
  });

  it('may be a proof, a final or a watermark', async () => {
    const { studioId, commissionId, id } = frame;
    const sha256 = 'ab'.repeat(32);
    const png = await sharp({ create: { width: 9, height: 9, channels: 4, background: '#fff' } })
      .png()
      .toBuffer();
    const keys: [string, Buffer, string][] = [
      [proofKey({ studioId, sheetId: id, id, watermarkHash: '0123456789abcdef' }, commissionId, 960), await drawPicture(), 'image/jpeg'],
      [finalKey({ studioId, id }, commissionId, 2560), await drawPicture(), 'image/jpeg'],
      [watermarkKey(studioId, sha256), png, 'image/png'],
    ];
    for (const [key, bytes, type] of keys) {
      await house.ctx.store.put(key, bytes, type);
      const answer = await house.request.get(await address(key));
      expect(answer.status).toBe(200);
      expect(answer.headers['content-type']).toBe(type);
    }
  });

  it('that is gone answers 404', async () => {
    expect((await house.request.get(await address(frameKey({ ...frame, id: frame.commissionId }, 480)))).status).toBe(404);
  });
});
