import { Router } from 'express';
import { AddView, ChangeView, OrderViews } from '../../contract/commissions.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids, ifMatch } from '../../middleware/validation.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { addView } from './add-view.ts';
import { changeView } from './change-view.ts';
import { deleteView } from './delete-view.ts';
import { listViews } from './list-views.ts';
import { orderViews } from './order-views.ts';

export function viewRoutes({ ctx, gates }: RouteContext): Router {
  const router = Router();
  const many = '/commissions/:commissionId/views';

  router.get(many, gates.staff(), ids('commissionId'), async (req, res) => {
    const actor = staffOf(req);
    await findCommission(actor, req.params.commissionId);
    res.json({ items: await listViews(ctx.knex, actor, req.params.commissionId) });
  });
  router.post(many, gates.staff(), ids('commissionId'), body(AddView), async (req, res) => {
    res.status(201).json(await addView(ctx, staffOf(req), req.params.commissionId, req.body as AddView));
  });
  router.put(`${many}/order`, gates.staff(), ids('commissionId'), body(OrderViews), async (req, res) => {
    const { viewIds } = req.body as OrderViews;
    res.json({ items: await orderViews(ctx, staffOf(req), req.params.commissionId, viewIds) });
  });
  router.patch(`${many}/:viewId`, gates.staff(), ids('commissionId', 'viewId'), ifMatch(), body(ChangeView), async (req, res) => {
    const { commissionId, viewId } = req.params;
    res.json(await changeView(ctx, staffOf(req), { ...(req.body as ChangeView), commissionId, viewId, version: req.version ?? 0 }));
  });
  router.delete(`${many}/:viewId`, gates.staff(), ids('commissionId', 'viewId'), async (req, res) => {
    await deleteView(ctx, staffOf(req), req.params.commissionId, req.params.viewId);
    res.status(204).end();
  });
  return router;
}
