import type { Context } from '../../context.ts';
import type { DeliveryFileItem, FetchState, RecipientItem, StudioDelivery } from '../../contract/deliveries.ts';
import { deliveryState } from '../../domain/delivery-state.ts';
import type { Archive } from '../../models/Archive.ts';
import { Delivery } from '../../models/Delivery.ts';
import type { DeliveryFile } from '../../models/DeliveryFile.ts';
import type { FinalVersion } from '../../models/FinalVersion.ts';
import { pictureAddress } from '../../services/picture-address.ts';
import { finalKey } from '../../services/storage-keys.ts';
import { presentArchive } from '../archives/request-archive.ts';
import { fetchedOf, type Fetched } from '../downloads/fetched.ts';
import { deliveryCan } from './policy.ts';
import { recipientRows, type RecipientRow } from './recipient-rows.ts';

/** A delivery with its files in order, their versions, and its archives. */
export type LoadedDelivery = Omit<Delivery, 'files' | 'archives'> & { files: LoadedFile[]; archives: Archive[] };
export type LoadedFile = Omit<DeliveryFile, 'finalVersion'> & { finalVersion: FinalVersion };

const iso = (moment: Date | null) => moment?.toISOString() ?? null;

/** Deliveries with everything the studio's Delivery page shows. */
export async function presentDeliveries(ctx: Context, deliveries: Delivery[]): Promise<StudioDelivery[]> {
  const loaded = await loadFiles(deliveries);
  const ids = deliveries.map((delivery) => delivery.id);
  const [rows, fetched] = await Promise.all([recipientRows(ctx, ids), fetchedOf(ctx, ids)]);
  return Promise.all(loaded.map((delivery) => present(ctx, delivery, rows, fetched)));
}

/** The files of deliveries in their order with their versions, and the archives, full resolution first. */
export async function loadFiles(deliveries: Delivery[]): Promise<LoadedDelivery[]> {
  await Delivery.fetchGraph(deliveries, '[files.finalVersion, archives]')
    .modifyGraph('files', (files) => void files.orderBy(['position', 'id']))
    .modifyGraph('archives', (archives) => void archives.orderBy('kind'));
  return deliveries as unknown as LoadedDelivery[];
}

async function present(ctx: Context, delivery: LoadedDelivery, rows: RecipientRow[], fetched: Fetched[]): Promise<StudioDelivery> {
  const state = deliveryState({ ...delivery, archives: delivery.archives.map((archive) => archive.state) }, new Date());
  const own = fetched.filter((one) => one.deliveryId === delivery.id);
  return {
    id: delivery.id,
    number: delivery.number,
    state,
    words: delivery.words,
    fetchBy: delivery.fetchBy,
    endsAt: delivery.endsAt.toISOString(),
    createdAt: delivery.createdAt.toISOString(),
    sentAt: iso(delivery.sentAt),
    withdrawnAt: iso(delivery.withdrawnAt),
    version: delivery.version,
    files: await Promise.all(delivery.files.map((file) => presentFile(ctx, file, delivery.commissionId))),
    bytes: delivery.files.reduce((sum, file) => sum + file.finalVersion.sizeBytes, 0),
    recipients: rows.filter((row) => row.deliveryId === delivery.id).map((row) => presentRecipient(row, delivery, own)),
    archives: delivery.archives.map(presentArchive),
    can: deliveryCan(state),
  };
}

async function presentFile(ctx: Context, file: LoadedFile, commissionId: string): Promise<DeliveryFileItem> {
  const { finalVersion: version } = file;
  const picture = version.recipe === null ? null : await pictureAddress(ctx, finalKey(version, commissionId, 480));
  return {
    ...fileFacts(file),
    finalId: version.finalId,
    finalVersionId: version.id,
    versionNumber: version.number,
    picture,
  };
}

/** What everybody may know of a file. */
export function fileFacts({ id, name, title, finalVersion: version }: LoadedFile) {
  const { mediaType, sizeBytes: size, sha256, width, height, placeholder } = version;
  return { id, name, title, mediaType, size, sha256, width, height, placeholder };
}

function fetchState({ finished, sent, times, lastAt }: Fetched): FetchState {
  return { finished, sent, times, lastAt };
}

function presentRecipient(row: RecipientRow, delivery: LoadedDelivery, fetched: Fetched[]): RecipientItem {
  const own = fetched.filter((one) => one.accountId === row.accountId);
  const archive = (what: 'full' | 'web') => {
    const found = own.find((one) => one.what === what);
    return found ? fetchState(found) : null;
  };
  const files = Object.fromEntries(own.flatMap((one) => (one.deliveryFileId ? [[one.deliveryFileId, fetchState(one)]] : [])));
  const all = archive('full')?.finished ?? false;
  return {
    id: row.id,
    name: row.name,
    email: row.email,
    invitedAt: iso(row.invitedAt),
    firstOpenedAt: iso(row.firstOpenedAt),
    lastSeenAt: iso(row.lastSeenAt),
    withdrawnAt: iso(row.withdrawnAt),
    mail: row.mail,
    full: archive('full'),
    web: archive('web'),
    files,
    filesFetched: all ? delivery.files.length : Object.values(files).filter((file) => file.finished).length,
  };
}
