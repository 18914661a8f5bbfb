import { Router } from 'express';
import { ChangeBracket, JoinFrames, TakeOutFrames } from '../../contract/brackets.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids } from '../../middleware/validation.ts';
import { changeBracket } from './change-bracket.ts';
import { joinFrames } from './join-frames.ts';
import { listBrackets, readBracket } from './list-brackets.ts';
import { splitBracket, takeOutFrames } from './split-bracket.ts';

/** The brackets of a commission: seen, joined, split and changed by hand. */
export function bracketRoutes({ ctx, gates: { staff } }: RouteContext): Router {
  const router = Router();

  router.get('/commissions/:commissionId/brackets', staff(), ids('commissionId'), async (req, res) => {
    res.json({ items: await listBrackets(ctx, staffOf(req), req.params.commissionId) });
  });
  router.post('/commissions/:commissionId/brackets', staff(), ids('commissionId'), body(JoinFrames), async (req, res) => {
    const input: JoinFrames = req.body;
    const bracket = await joinFrames(staffOf(req), req.params.commissionId, input);
    res.status(201).json(await readBracket(ctx, staffOf(req), bracket.id));
  });

  router.patch('/brackets/:bracketId', staff(), ids('bracketId'), body(ChangeBracket), async (req, res) => {
    const change: ChangeBracket = req.body;
    await changeBracket(staffOf(req), req.params.bracketId, change);
    res.json(await readBracket(ctx, staffOf(req), req.params.bracketId));
  });
  router.post('/brackets/:bracketId/split', staff(), ids('bracketId'), async (req, res) => {
    res.json({ frameIds: await splitBracket(staffOf(req), req.params.bracketId) });
  });
  router.post('/brackets/:bracketId/take-out', staff(), ids('bracketId'), body(TakeOutFrames), async (req, res) => {
    const { frameIds }: TakeOutFrames = req.body;
    res.json(await takeOutFrames(ctx, staffOf(req), req.params.bracketId, frameIds));
  });

  return router;
}
