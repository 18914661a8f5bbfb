import { Router } from 'express';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { ids } from '../../middleware/validation.ts';
import { sendObject } from '../downloads/send-object.ts';
import { archiveObject } from './archive-object.ts';
import { findPicksArchive, notePicksFetched, requestPicksArchive } from './picks-archive.ts';
import { presentArchive } from './request-archive.ts';

/** The originals of a pick list as an archive. */
export function archiveRoutes({ ctx, gates: { staff }, limits: { limit } }: RouteContext): Router {
  const router = Router();
  const address = '/pick-lists/:pickListId/archive';
  router.post(address, staff(), ids('pickListId'), limit('download'), async (req, res) => {
    res.status(202).json(presentArchive(await requestPicksArchive(ctx, staffOf(req), req.params.pickListId ?? '')));
  });
  router.get(address, staff(), ids('pickListId'), async (req, res) => {
    res.json(presentArchive(await findPicksArchive(staffOf(req), req.params.pickListId ?? '')));
  });
  router.get(`${address}/download`, staff(), ids('pickListId'), limit('download'), async (req, res) => {
    const actor = staffOf(req);
    const archive = await findPicksArchive(actor, req.params.pickListId ?? '');
    // A download that goes on is not another one.
    const begin = (ranges: readonly { start: number }[]) => (ranges[0]?.start === 0 ? notePicksFetched(ctx, actor, archive) : undefined);
    await sendObject(req, res, ctx.store, archiveObject(archive), { begin });
  });
  return router;
}
