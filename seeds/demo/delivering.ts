import { randomUUID } from 'node:crypto';
import { makeDelivery } from '../../api/features/deliveries/make-delivery.ts';
import { sendAgain } from '../../api/features/deliveries/recipients.ts';
import { trackDownload } from '../../api/features/downloads/track-download.ts';
import { openLink } from '../../api/features/guests/open-link.ts';
import { Archive } from '../../api/models/Archive.ts';
import { Delivery } from '../../api/models/Delivery.ts';
import { DeliveryFile } from '../../api/models/DeliveryFile.ts';
import { DeliveryRecipient } from '../../api/models/DeliveryRecipient.ts';
import { FinalVersion } from '../../api/models/FinalVersion.ts';
import { guestActor } from './accounts.ts';
import { mailedToken } from './mailed-token.ts';
import type { Person } from './people.ts';
import { dayFromNow, type Stage, until } from './stage.ts';

/** Delivers the newest version of every final, and waits until the archives are built and the mails are out. */
export async function deliver(stage: Stage, commissionId: string, people: readonly Person[], words: string): Promise<Delivery> {
  const versions = await newestVersions(stage, commissionId);
  const made = await makeDelivery(stage.ctx, stage.owner, commissionId, {
    finalVersionIds: versions.map(({ id }) => id),
    recipients: people.map(({ name, email }) => ({ name, email })),
    fetchBy: dayFromNow(29),
    words,
    key: randomUUID(),
  });
  return until(stage, 'the archives of the delivery', async () => {
    const failed = await Archive.query().findOne({ deliveryId: made.id, state: 'failed' });
    if (failed) throw new Error(`An archive was not built: ${failed.problem}`);
    return Delivery.query().findById(made.id).whereNotNull('sentAt');
  });
}

/** The newest version of each final, once its pictures are there. */
function newestVersions(stage: Stage, commissionId: string): Promise<FinalVersion[]> {
  return until(stage, 'the pictures of the finals', async () => {
    const all = await FinalVersion.query()
      .joinRaw('join finals on finals.id = final_versions.final_id and finals.deleted_at is null')
      .where('finals.commissionId', commissionId)
      .orderBy(['final_versions.name', 'final_versions.number'])
      .select('final_versions.*');
    if (all.some(({ placeholder }) => placeholder === null)) return undefined;
    return all.filter((version) => !all.some((other) => other.finalId === version.finalId && other.number > version.number));
  });
}

/** A recipient opens their link, by a mail that the studio sends again. */
export async function openDelivery(stage: Stage, delivery: Delivery, person: Person): Promise<void> {
  const recipient = await recipientOf(delivery, person);
  const place = { commissionId: delivery.commissionId, deliveryId: delivery.id, recipientId: recipient.id };
  await openLink(stage.ctx, await mailedToken(stage.ctx, person.email, (within) => sendAgain(within, stage.owner, place)));
}

async function recipientOf(delivery: Delivery, person: Person): Promise<DeliveryRecipient> {
  const { accountId } = await guestActor(person);
  return DeliveryRecipient.query().findOne({ deliveryId: delivery.id, accountId }).throwIfNotFound();
}

/** Somebody fetches everything in full resolution. */
export async function fetchEverything({ ctx }: Stage, delivery: Delivery, person: Person): Promise<void> {
  const archive = await Archive.query().findOne({ deliveryId: delivery.id, kind: 'full' }).throwIfNotFound();
  const size = archive.sizeBytes ?? 0;
  const [actor, recipient] = [await guestActor(person), await recipientOf(delivery, person)];
  const called = 'everything in full resolution';
  await transfer(trackDownload(ctx, { actor, recipient, delivery, what: 'full', deliveryFileId: null, size, called }), size, 1);
}

/** Somebody fetches a single file, or the given share of it before the line breaks. */
export async function fetchFile({ ctx }: Stage, delivery: Delivery, person: Person, stem: string, share: number): Promise<void> {
  const files = await DeliveryFile.query().where({ deliveryId: delivery.id }).withGraphFetched('finalVersion');
  const file = files.find(({ name }) => name.startsWith(stem));
  if (!file?.finalVersion) throw new Error(`${stem} is not in the delivery.`);
  const size = file.finalVersion.sizeBytes;
  const [actor, recipient] = [await guestActor(person), await recipientOf(delivery, person)];
  await transfer(
    trackDownload(ctx, { actor, recipient, delivery, what: 'file', deliveryFileId: file.id, size, called: `“${file.name}”` }),
    size,
    share,
  );
}

async function transfer(watch: ReturnType<typeof trackDownload>, size: number, share: number): Promise<void> {
  await watch.begin?.([{ start: 0, end: size - 1 }]);
  watch.sent?.({ start: 0, end: Math.max(0, Math.floor(size * share) - 1) });
  await watch.end?.();
}
