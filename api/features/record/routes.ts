import { Router } from 'express';
import { ListRecord } from '../../contract/record.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { ids, query } from '../../middleware/validation.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { listRecord } from './list-record.ts';

export function recordRoutes({ gates }: RouteContext): Router {
  const router = Router();
  router.get('/commissions/:commissionId/record', gates.staff(), ids('commissionId'), query(ListRecord), async (req, res) => {
    const actor = staffOf(req);
    await findCommission(actor, req.params.commissionId);
    res.json(await listRecord(actor, req.params.commissionId, res.locals.query as ListRecord));
  });
  return router;
}
