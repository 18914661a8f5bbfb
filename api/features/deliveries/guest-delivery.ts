import type { Context } from '../../context.ts';
import type { GuestDelivery } from '../../contract/deliveries.ts';
import { problem } from '../../middleware/problem.ts';
import { Client } from '../../models/Client.ts';
import { Commission } from '../../models/Commission.ts';
import { Delivery } from '../../models/Delivery.ts';
import { DeliveryRecipient } from '../../models/DeliveryRecipient.ts';
import { Studio } from '../../models/Studio.ts';
import { fetchedOf, type Fetched } from '../downloads/fetched.ts';
import { versionPictures } from '../finals/presenter.ts';
import { usesOf } from '../studios/studio-uses.ts';
import { fileFacts, loadFiles, type LoadedDelivery, type LoadedFile } from './presenter.ts';

/** The delivery of a recipient; the gate has seen that it was sent and not withdrawn. @throws Problem 404 */
export async function deliveryOf(recipient: DeliveryRecipient): Promise<Delivery> {
  const delivery = await Delivery.within(recipient).findById(recipient.deliveryId);
  if (!delivery) throw problem(404);
  return delivery;
}

/** The same, while its time lasts. @throws Problem 410 that says whom to ask */
export async function openDeliveryOf(recipient: DeliveryRecipient): Promise<Delivery> {
  const delivery = await deliveryOf(recipient);
  if (delivery.endsAt > new Date()) return delivery;
  const studio = await Studio.query().findById(delivery.studioId).throwIfNotFound();
  throw problem(410, `The time to fetch these pictures is over. Write to ${studio.name} at ${studio.replyTo} if you still need them.`, {
    code: 'ended',
  });
}

/** What a recipient sees. After the last date there are no files, only whom to ask. */
export async function readGuestDelivery(ctx: Context, recipient: DeliveryRecipient): Promise<GuestDelivery> {
  const delivery = await deliveryOf(recipient);
  const [studio, commission] = [
    await Studio.query().findById(delivery.studioId).throwIfNotFound(),
    await Commission.within(delivery).findById(delivery.commissionId).throwIfNotFound(),
  ];
  const client = await Client.within(delivery).findById(commission.clientId).throwIfNotFound();
  await noteSeen(recipient);
  const ended = delivery.endsAt <= new Date();
  const content = ended ? { files: [], archives: [] } : await contentOf(ctx, delivery, recipient);
  return {
    id: delivery.id,
    state: ended ? 'Ended' : 'Sent',
    number: delivery.number,
    studio: { name: studio.name, replyTo: studio.replyTo, timeZone: studio.timeZone },
    commission: commission.title,
    client: client.name,
    recipient: recipient.name,
    words: delivery.words,
    sentAt: (delivery.sentAt ?? delivery.createdAt).toISOString(),
    fetchBy: delivery.fetchBy,
    endsAt: delivery.endsAt.toISOString(),
    uses: usesOf(studio),
    ...content,
  };
}

async function noteSeen(recipient: DeliveryRecipient): Promise<void> {
  const now = new Date();
  await DeliveryRecipient.query()
    .findById(recipient.id)
    .patch({ lastSeenAt: now, ...(recipient.firstOpenedAt ? {} : { firstOpenedAt: now }) });
}

async function contentOf(
  ctx: Context,
  delivery: Delivery,
  recipient: DeliveryRecipient,
): Promise<Pick<GuestDelivery, 'files' | 'archives'>> {
  const [loaded] = await loadFiles([delivery]);
  const fetched = (await fetchedOf(ctx, [delivery.id], recipient.accountId)).filter((one) => one.finished);
  if (!loaded) throw problem(404);
  return {
    files: await Promise.all(loaded.files.map((file) => guestFile(ctx, loaded, file, fetched))),
    archives: guestArchives(loaded, fetched),
  };
}

async function guestFile(
  ctx: Context,
  delivery: LoadedDelivery,
  file: LoadedFile,
  fetched: Fetched[],
): Promise<GuestDelivery['files'][number]> {
  return {
    ...fileFacts(file),
    pictures: await versionPictures(ctx, file.finalVersion, delivery.commissionId),
    download: `/api/deliveries/${delivery.id}/files/${file.id}/download`,
    fetched: fetched.some((one) => one.deliveryFileId === file.id || one.what === 'full'),
  };
}

function guestArchives(delivery: LoadedDelivery, fetched: Fetched[]): GuestDelivery['archives'] {
  return delivery.archives.flatMap(({ kind, state, fileCount: files, sizeBytes: size, sha256 }) => {
    if (state !== 'ready' || kind === 'picks' || size === null || sha256 === null) return [];
    const download = `/api/deliveries/${delivery.id}/archives/${kind}/download`;
    return [{ kind, files, size, sha256, download, fetched: fetched.some((one) => one.what === kind) }];
  });
}
