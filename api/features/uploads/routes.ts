import { Router } from 'express';
import { NewUpload, UploadQuery } from '../../contract/uploads.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids, query } from '../../middleware/validation.ts';
import { beginUpload } from './begin-upload.ts';
import { cancelUpload } from './cancel-upload.ts';
import { completeUpload } from './complete-upload.ts';
import { findUpload } from './find-upload.ts';
import { listUploads } from './list-uploads.ts';
import { presentUpload } from './presenter.ts';
import { sendPart } from './send-part.ts';
import { readParts } from './upload-parts.ts';
import { withStore } from './with-store.ts';

/** How files come in: begun, sent in parts, completed; all of it can be asked about and gone on with. */
export function uploadRoutes({ ctx, gates: { staff }, limits: { limit } }: RouteContext): Router {
  const router = Router();

  router.get('/commissions/:commissionId/uploads', staff(), ids('commissionId'), query(UploadQuery), async (req, res) => {
    const input: UploadQuery = res.locals.query;
    res.json(await listUploads(ctx, staffOf(req), req.params.commissionId, input));
  });
  router.post('/commissions/:commissionId/uploads', staff(), ids('commissionId'), limit('upload'), body(NewUpload), async (req, res) => {
    const input: NewUpload = req.body;
    const begun = await withStore(ctx, () => beginUpload(ctx, staffOf(req), req.params.commissionId, input));
    if ('known' in begun) return void res.json(begun.known);
    const { upload, parts } = await withStore(ctx, () => readParts(ctx, begun.upload));
    res.status(begun.isNew ? 201 : 200).json(presentUpload(upload, parts));
  });

  router.get('/uploads/:uploadId', staff(), ids('uploadId'), async (req, res) => {
    const found = await findUpload(staffOf(req), req.params.uploadId);
    const { upload, parts } = await withStore(ctx, () => readParts(ctx, found));
    res.json(presentUpload(upload, parts));
  });
  router.put('/uploads/:uploadId/parts/:number', staff(), ids('uploadId'), limit('upload'), async (req, res) => {
    const upload = await findUpload(staffOf(req), req.params.uploadId);
    res.json(await sendPart(ctx, upload, Number(req.params.number), req));
  });
  router.post('/uploads/:uploadId/complete', staff(), ids('uploadId'), limit('upload'), async (req, res) => {
    const found = await findUpload(staffOf(req), req.params.uploadId);
    const upload = await withStore(ctx, () => completeUpload(ctx, found));
    res.json(presentUpload(upload, []));
  });
  router.delete('/uploads/:uploadId', staff(), ids('uploadId'), async (req, res) => {
    await cancelUpload(await findUpload(staffOf(req), req.params.uploadId));
    res.status(204).end();
  });

  return router;
}
