import { createHash, randomUUID } from 'node:crypto';
import sharp from 'sharp';
import { takeInFinal } from '../../../api/features/finals/take-in-final.ts';
import type { Frame } from '../../../api/models/Frame.ts';
import { FinalVersion } from '../../../api/models/FinalVersion.ts';
import { Pick } from '../../../api/models/Pick.ts';
import { PickList } from '../../../api/models/PickList.ts';
import { Proof } from '../../../api/models/Proof.ts';
import { Sheet } from '../../../api/models/Sheet.ts';
import { Upload } from '../../../api/models/Upload.ts';
import { originalKey } from '../../../api/services/storage-keys.ts';
import type { House } from '../house.ts';

type Place = { id: string; studioId: string };
let counter = 0;

/** A sheet whose picks, these frames in this order, were sent; by row, without guests. */
export async function makePickList(
  commission: Place,
  frames: readonly Frame[],
  values: { viewTitles?: (string | null)[]; allowance?: number } = {},
): Promise<PickList & { picks: Pick[] }> {
  const { studioId, id: commissionId } = commission;
  const allowance = values.allowance ?? 12;
  const money = { allowance, extraPrice: 8500, currency: 'GBP' };
  const number = (await Sheet.query().where({ commissionId }).resultSize()) + 1;
  const watermark = { kind: 'text', text: '', opacity: 0.35, size: 0.5, tiled: false } as unknown as Sheet['watermark'];
  const sheet = await Sheet.query().insertAndFetch({
    studioId,
    commissionId,
    number,
    ...money,
    watermark,
    issuedAt: new Date(),
    sentAt: new Date(),
  });
  const extraCount = Math.max(0, frames.length - allowance);
  const sent = { sentByName: 'Oskar Lind', pickCount: frames.length, extraCount };
  const list = await PickList.query().insertAndFetch({ studioId, commissionId, sheetId: sheet.id, number: 1, ...sent, ...money });
  const picks: Pick[] = [];
  for (const [index, frame] of frames.entries()) {
    const place = index + 1;
    const proof = await Proof.query().insertAndFetch({ studioId, sheetId: sheet.id, frameId: frame.id, number: place, position: place });
    const copied = { frameId: frame.id, frameName: frame.name, viewTitle: values.viewTitles?.[index] ?? null };
    const row = {
      studioId,
      pickListId: list.id,
      number: place,
      proofId: proof.id,
      proofNumber: place,
      ...copied,
      extra: place > allowance,
      markedBy: [],
    };
    picks.push(await Pick.query().insertAndFetch(row));
  }
  return Object.assign(list, { picks });
}

/** A picture with detail, so that sizes differ from one another as real files' do. */
export async function drawFinal(width: number, height: number, seed: number): Promise<Buffer> {
  const noise = { type: 'gaussian' as const, mean: 90 + (seed % 80), sigma: 25 };
  return sharp({ create: { width, height, channels: 3, background: '#808080', noise } })
    .jpeg({ quality: 85 })
    .toBuffer();
}

/** A finished file that was uploaded, judged and taken in; its pictures are made by `house.runJobs()`. */
export async function makeFinal(
  house: House,
  commission: Place,
  values: { name?: string; takenLocal?: string | null; width?: number; height?: number } = {},
): Promise<FinalVersion> {
  counter += 1;
  const { name = `Final ${counter}.jpg`, takenLocal = null, width = 300, height = 200 } = values;
  const file = await drawFinal(width, height, counter);
  const storageKey = originalKey(commission.studioId, commission.id);
  await house.ctx.store.put(storageKey, file, 'image/jpeg');
  const upload = await Upload.query().insertAndFetch({
    id: randomUUID(),
    studioId: commission.studioId,
    commissionId: commission.id,
    purpose: 'final',
    state: 'done',
    originalName: name,
    name,
    sizeBytes: file.length,
    partSize: 8 * 1024 * 1024,
    sha256: createHash('sha256').update(file).digest('hex'),
    storageKey,
  });
  return FinalVersion.transaction((trx) => takeInFinal(trx, upload, { mediaType: 'image/jpeg', width, height, takenLocal }));
}
