import { Router } from 'express';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { readDesk } from './read-desk.ts';

export function deskRoutes({ ctx, gates }: RouteContext): Router {
  const router = Router();
  router.get('/desk', gates.staff(), async (req, res) => {
    res.json(await readDesk(ctx, staffOf(req)));
  });
  return router;
}
