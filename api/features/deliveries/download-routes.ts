import { Router, type Request, type Response } from 'express';
import type { Context } from '../../context.ts';
import { guestOf, recipientOf } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { ids } from '../../middleware/validation.ts';
import { Archive } from '../../models/Archive.ts';
import type { Delivery } from '../../models/Delivery.ts';
import { DeliveryFile } from '../../models/DeliveryFile.ts';
import type { FinalVersion } from '../../models/FinalVersion.ts';
import { archiveObject } from '../archives/archive-object.ts';
import { sendObject, type StoredObject } from '../downloads/send-object.ts';
import { trackDownload, type Fetching } from '../downloads/track-download.ts';
import { openDeliveryOf } from './guest-delivery.ts';

type Thing = Pick<Fetching, 'what' | 'deliveryFileId' | 'called'> & { object: StoredObject };

async function fileThing(delivery: Delivery, fileId: string): Promise<Thing> {
  const file = await DeliveryFile.within(delivery).findOne({ id: fileId, deliveryId: delivery.id }).withGraphFetched('finalVersion');
  if (!file) throw problem(404);
  const { storageKey: key, sizeBytes: size, sha256, createdAt: modified, mediaType } = file.finalVersion as FinalVersion;
  return {
    what: 'file',
    deliveryFileId: file.id,
    called: `“${file.name}”`,
    object: { key, size, sha256, modified, name: file.name, mediaType },
  };
}

async function archiveThing(delivery: Delivery, kind: string): Promise<Thing> {
  if (kind !== 'full' && kind !== 'web') throw problem(404);
  const archive = await Archive.within(delivery).findOne({ deliveryId: delivery.id, kind });
  if (!archive) throw problem(404);
  const called = kind === 'full' ? 'everything in full resolution' : 'everything in web size';
  return { what: kind, deliveryFileId: null, called, object: archiveObject(archive) };
}

async function send(ctx: Context, req: Request, res: Response, find: (delivery: Delivery) => Promise<Thing>): Promise<void> {
  const recipient = recipientOf(req);
  const delivery = await openDeliveryOf(recipient);
  const { object, ...thing } = await find(delivery);
  const watch = trackDownload(ctx, { actor: guestOf(req), recipient, delivery, size: object.size, ...thing });
  await sendObject(req, res, ctx.store, object, watch);
}

/** The downloads of a delivery's recipients: one file, or everything. */
export function deliveryDownloadRoutes({ ctx, gates: { guestOfDelivery }, limits: { limit } }: RouteContext): Router {
  const router = Router();
  const chain = [ids('deliveryId'), guestOfDelivery(), limit('download')];
  router.get('/deliveries/:deliveryId/files/:fileId/download', ...chain, ids('fileId'), async (req, res) => {
    await send(ctx, req, res, (delivery) => fileThing(delivery, req.params.fileId ?? ''));
  });
  router.get('/deliveries/:deliveryId/archives/:kind/download', ...chain, async (req, res) => {
    await send(ctx, req, res, (delivery) => archiveThing(delivery, req.params.kind ?? ''));
  });
  return router;
}
