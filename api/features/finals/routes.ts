import { Router } from 'express';
import { ChangeFinal } from '../../contract/finals.ts';
import { staffOf, type StaffActor } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids, ifMatch } from '../../middleware/validation.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { changeFinal } from './change-final.ts';
import { detachVersion, removeVersion, restoreVersion } from './final-versions.ts';
import { presentFinals } from './presenter.ts';

/** Finals of a commission. Every change answers with the whole list, since one match may move others. */
export function finalRoutes({ ctx, gates: { staff } }: RouteContext): Router {
  const router = Router();
  const list = async (actor: StaffActor, commissionId: string) => presentFinals(ctx, actor, await findCommission(actor, commissionId));

  router.get('/commissions/:commissionId/finals', staff(), ids('commissionId'), async (req, res) => {
    res.json(await list(staffOf(req), req.params.commissionId));
  });
  router.patch('/finals/:finalId', staff(), ids('finalId'), ifMatch(), body(ChangeFinal), async (req, res) => {
    const input: ChangeFinal = req.body;
    const actor = staffOf(req);
    res.json(await list(actor, await changeFinal(ctx, actor, req.params.finalId, req.version ?? 0, input)));
  });
  const onVersions = { detach: detachVersion, remove: removeVersion, restore: restoreVersion };
  for (const [verb, act] of Object.entries(onVersions)) {
    router.post(`/final-versions/:versionId/${verb}`, staff(), ids('versionId'), async (req, res) => {
      const actor = staffOf(req);
      res.json(await list(actor, await act(ctx, actor, req.params.versionId ?? '')));
    });
  }
  return router;
}
