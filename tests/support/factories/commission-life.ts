import { randomUUID } from 'node:crypto';
import { Bracket } from '../../../api/models/Bracket.ts';
import { Delivery } from '../../../api/models/Delivery.ts';
import { DeliveryFile } from '../../../api/models/DeliveryFile.ts';
import { Final } from '../../../api/models/Final.ts';
import { FinalVersion } from '../../../api/models/FinalVersion.ts';
import { Frame } from '../../../api/models/Frame.ts';
import { Pick } from '../../../api/models/Pick.ts';
import { PickList } from '../../../api/models/PickList.ts';
import { Proof } from '../../../api/models/Proof.ts';
import { Sheet } from '../../../api/models/Sheet.ts';

/**
 * Rows alone, without files, jobs or mails: for questions that read the whole life of a commission (states, figures, the desk)
 * and do not care how it came about.
 */
export interface LifeOf {
  id: string;
  studioId: string;
}

let counter = 0;
const sha256 = () => (counter += 1).toString(16).padStart(64, '0');

export async function rowOfFrame({ id: commissionId, studioId }: LifeOf, values: Partial<Frame> = {}): Promise<Frame> {
  const hash = sha256();
  return Frame.query().insertAndFetch({
    studioId,
    commissionId,
    state: 'ready',
    originalName: `HL_${counter}.jpg`,
    name: `HL_${counter}.jpg`,
    mediaType: 'image/jpeg',
    sizeBytes: 1_000_000,
    sha256: hash,
    storageKey: `originals/${hash}`,
    width: 6000,
    height: 4000,
    recipe: 1,
    ...values,
  });
}

/** A bracket of so many frames that nothing else is known of. */
export async function rowOfBracket(commission: LifeOf, count = 2): Promise<Bracket> {
  const { id: commissionId, studioId } = commission;
  const frames = [await rowOfFrame(commission)];
  while (frames.length < count) frames.push(await rowOfFrame(commission));
  const bracket = await Bracket.query().insertAndFetch({ studioId, commissionId, leadFrameId: frames[0]?.id ?? '', wanted: 'nothing yet' });
  for (const { id } of frames) await Frame.query().findById(id).patch({ bracketId: bracket.id });
  return bracket;
}

export async function rowOfSheet(
  { id: commissionId, studioId }: LifeOf,
  frames: Frame[] = [],
  values: Partial<Sheet> = {},
): Promise<Sheet> {
  const number = (await Sheet.query().where({ commissionId }).resultSize()) + 1;
  const sheet = await Sheet.query().insertAndFetch({
    studioId,
    commissionId,
    number,
    allowance: 12,
    extraPrice: 8500,
    currency: 'GBP',
    watermark: { kind: 'none', text: '', opacity: 0.3, size: 0.5, tiled: false },
    ...values,
  });
  for (const [at, frame] of frames.entries()) {
    await Proof.query().insert({ studioId, sheetId: sheet.id, frameId: frame.id, number: at + 1, position: at + 1 });
  }
  return sheet;
}

/** A pick list with the first `count` proofs of a sheet; the sheet counts as sent. */
export async function rowOfPickList(sheet: Sheet, count: number, extraCount = 0): Promise<PickList> {
  const { studioId, commissionId } = sheet;
  const number = (await PickList.query().where({ sheetId: sheet.id }).resultSize()) + 1;
  const list = await PickList.query().insertAndFetch({
    studioId,
    commissionId,
    sheetId: sheet.id,
    number,
    sentByName: 'Oskar Lind',
    pickCount: count,
    allowance: sheet.allowance,
    extraCount,
    extraPrice: sheet.extraPrice,
    currency: sheet.currency,
  });
  const proofs = await Proof.query().where({ sheetId: sheet.id }).orderBy('position').limit(count);
  for (const [at, proof] of proofs.entries()) {
    await Pick.query().insert({
      studioId,
      pickListId: list.id,
      number: at + 1,
      proofId: proof.id,
      proofNumber: proof.number,
      frameId: proof.frameId,
      frameName: `HL_${at + 1}.jpg`,
      extra: at >= count - extraCount,
      markedBy: [],
    });
  }
  await Sheet.query().findById(sheet.id).patch({ sentAt: new Date() });
  return list;
}

/** A final with one version, of a picked frame or of none. */
export async function rowOfFinal(
  { id: commissionId, studioId }: LifeOf,
  frame?: Frame,
  values: Partial<Final> = {},
): Promise<FinalVersion> {
  const final = await Final.query().insertAndFetch({
    studioId,
    commissionId,
    frameId: frame?.id ?? null,
    match: frame ? 'by-name' : 'none',
    candidates: [],
    ...values,
  });
  const hash = sha256();
  return FinalVersion.query().insertAndFetch({
    studioId,
    finalId: final.id,
    number: 1,
    originalName: 'final.jpg',
    name: 'final.jpg',
    mediaType: 'image/jpeg',
    sizeBytes: 2_000_000,
    sha256: hash,
    storageKey: `originals/${hash}`,
    width: 6000,
    height: 4000,
    recipe: 1,
  });
}

export async function rowOfDelivery(
  { id: commissionId, studioId }: LifeOf,
  versions: FinalVersion[],
  values: Partial<Delivery> = {},
): Promise<Delivery & { files: DeliveryFile[] }> {
  const number = (await Delivery.query().where({ commissionId }).resultSize()) + 1;
  const ends = new Date(Date.now() + 20 * 24 * 60 * 60 * 1000);
  const delivery = await Delivery.query().insertAndFetch({
    studioId,
    commissionId,
    number,
    fetchBy: ends.toISOString().slice(0, 10),
    endsAt: ends,
    sentAt: new Date(),
    ...values,
  });
  const files: DeliveryFile[] = [];
  for (const [at, version] of versions.entries()) {
    const name = `${randomUUID()}.jpg`;
    files.push(
      await DeliveryFile.query().insertAndFetch({
        studioId,
        deliveryId: delivery.id,
        finalVersionId: version.id,
        position: at + 1,
        name,
        title: '',
      }),
    );
  }
  return Object.assign(delivery, { files });
}
