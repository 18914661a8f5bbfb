import { createHash } from 'node:crypto';
import sharp from 'sharp';
import { Frame } from '../../../api/models/Frame.ts';
import { frameKey, originalKey, RECIPE } from '../../../api/services/storage-keys.ts';
import type { House } from '../house.ts';

let counter = 0;

/** A small picture that no other frame has. */
export async function drawPicture(width = 960, height = 640, seed = counter): Promise<Buffer> {
  const background = { r: (seed * 53) % 200, g: (seed * 97) % 200, b: (seed * 31) % 200 };
  return sharp({ create: { width, height, channels: 3, background } })
    .jpeg()
    .toBuffer();
}

type Values = Partial<
  Pick<
    Frame,
    'name' | 'viewId' | 'takenLocal' | 'fNumber' | 'exposureTime' | 'iso' | 'focalLength' | 'width' | 'height' | 'hiddenAt' | 'state'
  >
>;

/** A frame that was taken in and read: row, original and pictures in the store. */
export async function makeFrame(house: House, commission: { id: string; studioId: string }, values: Values = {}): Promise<Frame> {
  counter += 1;
  const { width = 6000, height = 4000 } = values;
  const picture = await drawPicture(960, Math.round((960 * height) / width));
  const storageKey = originalKey(commission.studioId, commission.id);
  const name = values.name ?? `HL_${String(400 + counter).padStart(4, '0')}.jpg`;
  const frame = await Frame.query().insertAndFetch({
    studioId: commission.studioId,
    commissionId: commission.id,
    state: 'ready',
    originalName: name,
    mediaType: 'image/jpeg',
    sizeBytes: picture.length,
    sha256: createHash('sha256').update(picture).update(String(counter)).digest('hex'),
    storageKey,
    recipe: RECIPE,
    takenLocal: `2026-10-28T17:${String(counter % 60).padStart(2, '0')}:12`,
    fNumber: 11,
    exposureTime: 1 / 125,
    iso: 100,
    focalLength: 35,
    ...values,
    name,
    width,
    height,
  });
  await house.ctx.store.put(storageKey, picture, 'image/jpeg');
  for (const size of [480, 960, 2560] as const) await house.ctx.store.put(frameKey(frame, size), picture, 'image/jpeg');
  return frame;
}
