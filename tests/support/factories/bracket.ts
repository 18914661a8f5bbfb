import { createHash } from 'node:crypto';
import sharp from 'sharp';
import { queueMeasuring } from '../../../api/features/frames/queue-measuring.ts';
import { Frame } from '../../../api/models/Frame.ts';
import { frameKey, originalKey, RECIPE } from '../../../api/services/storage-keys.ts';
import type { House } from '../house.ts';
import { photographPixels } from '../photograph.ts';

let counter = 0;

const WIDTH = 480;
const HEIGHT = 320;

/** One view at another exposure: a stop doubles its linear light, by the transfer function of IEC 61966-2-1 taken as a power of 2.2. */
async function exposed(seed: number, stops: number): Promise<Buffer> {
  const light = 2 ** (stops / 2.2);
  const pixels = photographPixels(WIDTH, HEIGHT, seed).map((value) => Math.min(255, Math.round(value * light)));
  return sharp(pixels, { raw: { width: WIDTH, height: HEIGHT, channels: 3 } })
    .jpeg({ quality: 92 })
    .toBuffer();
}

export interface Exposing {
  /** Exposures in the order they were taken. */
  stops?: number[];
  /** Minute of the hour at which the first begins. */
  minute?: number;
  /** What is photographed. */
  seed?: number;
  values?: Partial<Frame>;
}

/** Frames of one view from a tripod, taken in and waiting to be measured. Each begins half a second after the end of the one before. */
export async function makeExposures(house: House, commission: { id: string; studioId: string }, exposing: Exposing = {}): Promise<Frame[]> {
  const { stops = [0, -2, 2], minute = 5, seed = 1, values = {} } = exposing;
  const frames: Frame[] = [];
  let seconds = 12;
  for (const stop of stops) {
    const exposureTime = 2 ** (stop - 4);
    const at = `${String(Math.floor(seconds)).padStart(2, '0')}.${String(Math.round((seconds % 1) * 100)).padStart(2, '0')}`;
    const takenLocal = `2026-10-28T17:${String(minute).padStart(2, '0')}:${at}`;
    const exposure = { exposureTime, exposureBias: stop, exposureMode: stops.length > 1 ? 2 : 0, takenLocal };
    frames.push(await takeFrame(house, commission, await exposed(seed, stop), { ...exposure, ...values }));
    seconds += exposureTime + 0.5;
  }
  return frames;
}

async function takeFrame(house: House, { id, studioId }: { id: string; studioId: string }, picture: Buffer, values: Partial<Frame>) {
  counter += 1;
  // The same view at the same exposure twice is still two files.
  const original = Buffer.concat([picture, Buffer.from(String(counter))]);
  const name = `HL_${String(600 + counter).padStart(4, '0')}.jpg`;
  const frame = await Frame.query().insertAndFetch({
    studioId,
    commissionId: id,
    state: 'ready',
    originalName: name,
    name,
    mediaType: 'image/jpeg',
    sizeBytes: original.length,
    sha256: createHash('sha256').update(original).digest('hex'),
    storageKey: originalKey(studioId, id),
    width: WIDTH,
    height: HEIGHT,
    recipe: RECIPE,
    make: 'Vessmouth Optical',
    model: 'Quay 6',
    serial: '0042',
    lens: '24 mm',
    fNumber: 11,
    iso: 100,
    focalLength: 24,
    ...values,
  });
  await house.ctx.store.put(frame.storageKey, original, 'image/jpeg');
  for (const size of [480, 960, 2560] as const) await house.ctx.store.put(frameKey(frame, size), picture, 'image/jpeg');
  await queueMeasuring(house.ctx.knex, frame);
  return frame;
}
