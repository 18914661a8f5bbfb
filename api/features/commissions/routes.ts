import { Router } from 'express';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { ids } from '../../middleware/validation.ts';
import { readCommission } from './read-commission.ts';

export function commissionRoutes({ ctx, gates }: RouteContext): Router {
  const router = Router();

  router.get('/commissions/:commissionId', gates.staff(), ids('commissionId'), async (req, res) => {
    res.json(await readCommission(ctx.knex, staffOf(req), req.params.commissionId ?? ''));
  });

  return router;
}
