import { randomUUID } from 'node:crypto';
import { AccountToken } from '../../api/models/AccountToken.ts';
import { Archive } from '../../api/models/Archive.ts';
import { DeliveryRecipient } from '../../api/models/DeliveryRecipient.ts';
import { Mail } from '../../api/models/Mail.ts';
import { Proof } from '../../api/models/Proof.ts';
import { Upload } from '../../api/models/Upload.ts';
import { archiveKey } from '../../api/services/storage-keys.ts';
import { makeClient } from './factories/client.ts';
import { rowOfBracket, rowOfDelivery, rowOfFinal, rowOfPickList, rowOfSheet } from './factories/commission-life.ts';
import { makeLooker, switchOn } from './factories/open-link.ts';
import { makeOpenSheet, type SheetPerson } from './factories/sheet.ts';
import { type GuestPerson, makeGuestAgent, type MadeStudio } from './factories/studio.ts';
import type { House } from './house.ts';

/** One of everything a studio can hold, with the people who may see it. */
export interface FullLife {
  /** By the name that the API gives it in an address: `{sheetId}` is ids.sheetId. */
  ids: Record<string, string>;
  lead: SheetPerson;
  reviewer: SheetPerson;
  recipient: GuestPerson;
  /** At a browser that looks at the sheet by its open link. */
  looker: Awaited<ReturnType<typeof makeLooker>>;
}

/** Builds it by rows, with the files that addresses lead to in the store. */
export async function makeFullLife(house: House, made: MadeStudio): Promise<FullLife> {
  const { studio } = made;
  const client = await makeClient(studio);
  const { commission, frames, sheet, lead, reviewer } = await makeOpenSheet(house, made, { proofs: 2 });
  const proof = await Proof.query().where({ sheetId: sheet.id }).first().throwIfNotFound();
  const sentSheet = await rowOfSheet(commission, frames, { issuedAt: new Date() });
  const pickList = await rowOfPickList(sentSheet, 2);
  const version = await rowOfFinal(commission, frames[0]);
  const delivery = await rowOfDelivery(commission, [version]);
  const recipient = await makeGuestAgent(house);
  const place = await DeliveryRecipient.query().insertAndFetch({
    studioId: studio.id,
    deliveryId: delivery.id,
    accountId: recipient.account.id,
    name: recipient.account.name,
  });
  await house.ctx.store.put(version.storageKey, Buffer.alloc(version.sizeBytes), 'image/jpeg');
  for (const kind of ['full', 'web'] as const) await makeArchive(house, commission, { deliveryId: delivery.id, kind });
  await makeArchive(house, commission, { pickListId: pickList.id, kind: 'picks' });
  return {
    ids: {
      clientId: client.id,
      contactId: client.contacts[0]?.id ?? '',
      commissionId: commission.id,
      viewId: commission.views[0]?.id ?? '',
      uploadId: await uploadUnderWay(commission),
      frameId: frames[0]?.id ?? '',
      bracketId: (await rowOfBracket(commission)).id,
      sheetId: sheet.id,
      guestId: reviewer.guest.id,
      proofId: proof.id,
      pickListId: pickList.id,
      finalId: version.finalId,
      versionId: version.id,
      deliveryId: delivery.id,
      fileId: delivery.files[0]?.id ?? '',
      recipientId: place.id,
      mailId: await mailOf(commission),
      invitationId: await invitationTo(studio.id),
      accountId: made.assistant.account.id,
      number: '1',
      kind: 'full',
    },
    lead,
    reviewer,
    recipient,
    looker: await makeLooker(house, await switchOn(made, sheet.id)),
  };
}

interface Row {
  id: string;
  studioId: string;
}

async function makeArchive(house: House, { id, studioId }: Row, values: Partial<Archive>): Promise<void> {
  const storageKey = archiveKey(studioId, id);
  await house.ctx.store.put(storageKey, Buffer.from('an archive'), 'application/zip');
  await Archive.query().insert({
    studioId,
    state: 'ready',
    name: 'archive.zip',
    fileCount: 1,
    sizeBytes: 10,
    sha256: 'a'.repeat(64),
    storageKey,
    readyAt: new Date(),
    ...values,
  });
}

async function uploadUnderWay({ id: commissionId, studioId }: Row): Promise<string> {
  const upload = await Upload.query().insert({
    studioId,
    commissionId,
    purpose: 'frame',
    originalName: 'HL_0999.jpg',
    name: 'HL_0999.jpg',
    sizeBytes: 1000,
    partSize: 8 * 1024 * 1024,
    sha256: randomUUID().replaceAll('-', '').padEnd(64, '0'),
    storageKey: `studios/${studioId}/commissions/${commissionId}/originals/${randomUUID()}`,
  });
  return upload.id;
}

async function mailOf({ id: commissionId, studioId }: Row): Promise<string> {
  const mail = await Mail.query().insert({
    studioId,
    commissionId,
    kind: 'sheet-invitation',
    toAddress: 'oskar@tarn.test',
    fromName: 'Harrow Lane Studio',
    subject: 'Proofs',
    text: 'Text',
    html: '<p>Text</p>',
    state: 'failed',
  });
  return mail.id;
}

async function invitationTo(studioId: string): Promise<string> {
  const token = await AccountToken.query().insert({
    purpose: 'join-studio',
    tokenHash: randomUUID(),
    email: 'new@harrow-lane.test',
    studioId,
    expiresAt: new Date(Date.now() + 60_000_000),
  });
  return token.id;
}
