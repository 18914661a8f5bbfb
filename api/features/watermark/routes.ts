import { createHash } from 'node:crypto';
import { Router } from 'express';
import multer from 'multer';
import sharp from 'sharp';
import { PreviewWatermark, Watermark } from '../../contract/watermark.ts';
import type { Context } from '../../context.ts';
import { staffOf, type StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body } from '../../middleware/validation.ts';
import { Frame } from '../../models/Frame.ts';
import { Studio } from '../../models/Studio.ts';
import { frameKey, watermarkKey } from '../../services/storage-keys.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { ownImage } from './own-image.ts';

/** A logo as PNG is small; more is a mistake. */
const image = multer({ storage: multer.memoryStorage(), limits: { fileSize: 5_000_000, files: 1, fields: 0 } }).single('image');

/** The studio's watermark: what new sheets begin with, uploaded pictures for it, and a look at it. */
export function watermarkRoutes({ ctx, gates: { staff }, limits: { limit } }: RouteContext): Router {
  const router = Router();

  router.get('/studio/watermark', staff(), async (req, res) => {
    const studio = await Studio.query().findById(staffOf(req).studioId).throwIfNotFound();
    res.json(studio.watermark);
  });

  router.put('/studio/watermark', staff(), body(Watermark), async (req, res) => {
    const watermark: Watermark = req.body;
    const actor = staffOf(req);
    ownImage(actor, watermark);
    await ctx.knex.transaction(async (trx) => {
      await Studio.query(trx).findById(actor.studioId).patch({ watermark });
      await addToRecord(trx, {
        studioId: actor.studioId,
        actor,
        did: 'studio.watermark-changed',
        says: 'Changed the watermark of new proof sheets',
      });
    });
    res.json(watermark);
  });

  router.post('/studio/watermark-images', staff(), limit('upload'), image, async (req, res) => {
    if (!req.file) throw problem(422, 'Choose a PNG.');
    const cleaned = await ctx.pixels.cleanWatermark(req.file.buffer);
    const imageKey = watermarkKey(staffOf(req).studioId, createHash('sha256').update(cleaned.data).digest('hex'));
    await ctx.store.put(imageKey, cleaned.data, 'image/png');
    res.status(201).json({ imageKey, width: cleaned.width, height: cleaned.height });
  });

  router.post('/studio/watermark-previews', staff(), limit('upload'), body(PreviewWatermark), async (req, res) => {
    const { watermark, frameId }: PreviewWatermark = req.body;
    const actor = staffOf(req);
    ownImage(actor, watermark);
    const picture = await pictureToTry(ctx, actor, frameId);
    const logo = watermark.kind === 'image' && watermark.imageKey ? await ctx.store.getBuffer(watermark.imageKey) : null;
    const [preview] = await ctx.pixels.watermark(picture, watermark, logo, [960]);
    res.type('image/jpeg').end(preview?.data);
  });
  return router;
}

async function pictureToTry(ctx: Context, actor: StaffActor, frameId: string | undefined): Promise<Buffer> {
  const frame = frameId ? await Frame.within(actor).findById(frameId).whereNull('deletedAt') : undefined;
  if (frame?.state === 'ready') return ctx.store.getBuffer(frameKey(frame, 2560));
  return sharp({ create: { width: 960, height: 640, channels: 3, background: '#777777' } })
    .jpeg()
    .toBuffer();
}
