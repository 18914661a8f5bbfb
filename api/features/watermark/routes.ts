import { Router } from 'express';
import multer from 'multer';
import { PreviewWatermark, Watermark } from '../../contract/watermark.ts';
import { staffOf } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body } from '../../middleware/validation.ts';
import { Studio } from '../../models/Studio.ts';
import { changeWatermark } from './change-watermark.ts';
import { keepImage } from './keep-image.ts';
import { previewWatermark } from './preview-watermark.ts';

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
    await changeWatermark(ctx, staffOf(req), watermark);
    res.json(watermark);
  });

  router.post('/studio/watermark-images', staff(), limit('watermark-picture'), image, async (req, res) => {
    if (!req.file) throw problem(422, 'Choose a PNG.');
    res.status(201).json(await keepImage(ctx, staffOf(req), req.file.buffer));
  });
  router.post('/studio/watermark-previews', staff(), limit('watermark-picture'), body(PreviewWatermark), async (req, res) => {
    const wish: PreviewWatermark = req.body;
    res.type('image/jpeg').end(await previewWatermark(ctx, staffOf(req), wish));
  });
  return router;
}
