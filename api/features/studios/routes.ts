import { Router } from 'express';
import { ChangeChecks, ChangeStudio, ChangeUses } from '../../contract/studios.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ifMatch } from '../../middleware/validation.ts';
import { changeStudio, readStudio } from './change-studio.ts';
import { chargeable } from './currencies.ts';
import { readStorage } from './read-storage.ts';
import { changeChecks, readChecks } from './studio-checks.ts';
import { changeUses, readUses } from './studio-uses.ts';

/** The studio's settings and what it stores. */
export function studioRoutes({ ctx, gates }: RouteContext): Router {
  const router = Router();

  router.get('/studio', gates.staff(), async (req, res) => {
    res.json(await readStudio(ctx, staffOf(req)));
  });

  router.patch('/studio', gates.staff('owner'), ifMatch(), body(ChangeStudio), async (req, res) => {
    const change: ChangeStudio = req.body;
    res.json(await changeStudio(ctx, staffOf(req), req.version ?? 0, change));
  });

  router.get('/currencies', gates.staff(), (_req, res) => {
    res.json({ items: chargeable() });
  });

  router.get('/studio/storage', gates.staff(), async (req, res) => {
    res.json(await readStorage(ctx, staffOf(req)));
  });

  router.get('/studio/checks', gates.staff(), async (req, res) => {
    res.json(await readChecks(staffOf(req)));
  });
  router.put('/studio/checks', gates.staff('owner'), body(ChangeChecks), async (req, res) => {
    const { thresholds }: ChangeChecks = req.body;
    res.json(await changeChecks(ctx, staffOf(req), thresholds));
  });

  router.get('/studio/uses', gates.staff(), async (req, res) => {
    res.json(await readUses(staffOf(req)));
  });
  router.put('/studio/uses', gates.staff('owner'), body(ChangeUses), async (req, res) => {
    const { uses }: ChangeUses = req.body;
    res.json(await changeUses(ctx, staffOf(req), uses));
  });

  return router;
}
