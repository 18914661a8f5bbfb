import { Router } from 'express';
import { FrameIds, FrameQuery, HangFrames } from '../../contract/frames.ts';
import { staffOf } from '../../middleware/actor.ts';
import { streamEvents } from '../../middleware/event-stream.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids, query } from '../../middleware/validation.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { hangFrames, hideFrames, showFrames } from './change-frames.ts';
import { deleteFrames } from './delete-frames.ts';
import { findFrame } from './find-frame.ts';
import { listFrames } from './list-frames.ts';
import { presentFrame } from './presenter.ts';
import { restoreFrames } from './restore-frames.ts';
import { summariseFrames } from './summarise-frames.ts';

/** The frames of a commission: seen, hidden, hung under views, deleted and restored, many at once. */
export function frameRoutes({ ctx, gates: { staff } }: RouteContext): Router {
  const router = Router();
  const many = '/commissions/:commissionId/frames';

  router.get(many, staff(), ids('commissionId'), query(FrameQuery), async (req, res) => {
    const input: FrameQuery = res.locals.query;
    res.json(await listFrames(ctx, staffOf(req), req.params.commissionId, input));
  });
  router.get(`${many}/summary`, staff(), ids('commissionId'), async (req, res) => {
    res.json(await summariseFrames(staffOf(req), req.params.commissionId));
  });

  router.post(`${many}/hide`, staff(), ids('commissionId'), body(FrameIds), async (req, res) => {
    const input: FrameIds = req.body;
    res.json({ frameIds: await hideFrames(staffOf(req), req.params.commissionId, input.frameIds) });
  });
  router.post(`${many}/show`, staff(), ids('commissionId'), body(FrameIds), async (req, res) => {
    const input: FrameIds = req.body;
    res.json({ frameIds: await showFrames(staffOf(req), req.params.commissionId, input.frameIds) });
  });
  router.post(`${many}/hang`, staff(), ids('commissionId'), body(HangFrames), async (req, res) => {
    const input: HangFrames = req.body;
    res.json({ frameIds: await hangFrames(staffOf(req), req.params.commissionId, input.frameIds, input.viewId) });
  });
  router.post(`${many}/delete`, staff(), ids('commissionId'), body(FrameIds), async (req, res) => {
    const input: FrameIds = req.body;
    res.json(await deleteFrames(staffOf(req), req.params.commissionId, input.frameIds));
  });
  router.post(`${many}/restore`, staff(), ids('commissionId'), body(FrameIds), async (req, res) => {
    const input: FrameIds = req.body;
    res.json(await restoreFrames(staffOf(req), req.params.commissionId, input.frameIds));
  });

  router.get('/frames/:frameId', staff(), ids('frameId'), async (req, res) => {
    res.json(await presentFrame(ctx, staffOf(req), await findFrame(staffOf(req), req.params.frameId)));
  });
  const gate = staff();
  router.get('/commissions/:commissionId/events', gate, ids('commissionId'), async (req, res) => {
    const find = () => findCommission(staffOf(req), req.params.commissionId);
    const { id } = await find();
    const stillMay = async () => {
      await gate(req, res, () => undefined);
      await find();
    };
    streamEvents(ctx.live, `commission:${id}`, { res, stillMay });
  });

  return router;
}
