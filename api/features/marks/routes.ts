import { Router } from 'express';
import { guestOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { ids } from '../../middleware/validation.ts';
import { listMarks } from './list-marks.ts';
import { setMark } from './set-mark.ts';

/** Marks of guests. The rights to mark are asked by the statement that marks, so the chain needs the guest alone. */
export function markRoutes({ ctx, gates: { guest, looksAtSheet }, limits: { limit } }: RouteContext): Router {
  const router = Router();

  router.get('/guest/sheets/:sheetId/marks', ids('sheetId'), looksAtSheet(), async (req, res) => {
    res.json(await listMarks(ctx, req.params.sheetId));
  });

  const mark = '/guest/sheets/:sheetId/proofs/:proofId/mark';
  router.put(mark, ids('sheetId', 'proofId'), guest(), limit('mark'), async (req, res) => {
    const { sheetId, proofId } = req.params;
    await setMark(ctx, guestOf(req), sheetId, proofId, true);
    res.json({ proofId, marked: true });
  });
  router.delete(mark, ids('sheetId', 'proofId'), guest(), limit('mark'), async (req, res) => {
    const { sheetId, proofId } = req.params;
    await setMark(ctx, guestOf(req), sheetId, proofId, false);
    res.json({ proofId, marked: false });
  });
  return router;
}
