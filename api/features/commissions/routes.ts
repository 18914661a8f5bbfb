import { Router } from 'express';
import { AddCommission, ChangeCommission, ListCommissions } from '../../contract/commissions.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids, ifMatch, query } from '../../middleware/validation.ts';
import { addCommission } from './add-commission.ts';
import { changeCommission } from './change-commission.ts';
import { closeCommission, reopenCommission } from './close-commission.ts';
import { countContents } from './count-contents.ts';
import { deleteCommission, restoreCommission } from './delete-commission.ts';
import { listCommissions } from './list-commissions.ts';
import { readCommission } from './read-commission.ts';

export function commissionRoutes(routes: RouteContext): Router {
  const { ctx, gates } = routes;
  const router = Router();
  const one = '/commissions/:commissionId';

  router.get('/commissions', gates.staff(), query(ListCommissions), async (req, res) => {
    res.json(await listCommissions(ctx.knex, staffOf(req), res.locals.query as ListCommissions));
  });
  router.post('/commissions', gates.staff(), body(AddCommission), async (req, res) => {
    res.status(201).json(await addCommission(ctx, staffOf(req), req.body as AddCommission));
  });
  router.get(one, gates.staff(), ids('commissionId'), async (req, res) => {
    res.json(await readCommission(ctx.knex, staffOf(req), req.params.commissionId));
  });
  router.patch(one, gates.staff(), ids('commissionId'), ifMatch(), body(ChangeCommission), async (req, res) => {
    const input = req.body as ChangeCommission;
    res.json(await changeCommission(ctx, staffOf(req), { ...input, commissionId: req.params.commissionId, version: req.version ?? 0 }));
  });
  router.post(`${one}/close`, gates.staff(), ids('commissionId'), async (req, res) => {
    res.json(await closeCommission(ctx, staffOf(req), req.params.commissionId));
  });
  router.post(`${one}/reopen`, gates.staff(), ids('commissionId'), async (req, res) => {
    res.json(await reopenCommission(ctx, staffOf(req), req.params.commissionId));
  });
  router.use(deletionRoutes(routes));
  return router;
}

function deletionRoutes({ ctx, gates }: RouteContext): Router {
  const router = Router();
  const one = '/commissions/:commissionId';

  router.get(`${one}/contents`, gates.staff('owner'), ids('commissionId'), async (req, res) => {
    res.json(await countContents(ctx.knex, staffOf(req), req.params.commissionId));
  });
  router.delete(one, gates.staff('owner'), ids('commissionId'), async (req, res) => {
    await deleteCommission(ctx, staffOf(req), req.params.commissionId);
    res.status(204).end();
  });
  router.post(`${one}/restore`, gates.staff('owner'), ids('commissionId'), async (req, res) => {
    res.json(await restoreCommission(ctx, staffOf(req), req.params.commissionId));
  });
  return router;
}
