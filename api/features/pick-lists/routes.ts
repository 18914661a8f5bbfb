import contentDisposition from 'content-disposition';
import { Router } from 'express';
import { SendPickList } from '../../contract/guest-sheets.ts';
import { guestOf, invitationOf, staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids } from '../../middleware/validation.ts';
import { listSent, presentSent } from './list-sent.ts';
import { listPickLists, loadPickList } from './load-pick-list.ts';
import { sendPickList } from './send-pick-list.ts';
import { pickListCsv, pickListNames } from './write-csv.ts';

/** Pick lists: sent by the lead, read by the studio and by the guests of their sheet. */
export function pickListRoutes({ ctx, gates: { staff, guestOfSheet }, limits: { limit } }: RouteContext): Router {
  const router = Router();

  router.get('/commissions/:commissionId/pick-lists', staff(), ids('commissionId'), async (req, res) => {
    res.json({ items: await listPickLists(ctx, staffOf(req), req.params.commissionId) });
  });
  router.get('/pick-lists/:pickListId', staff(), ids('pickListId'), async (req, res) => {
    res.json(await loadPickList(ctx, staffOf(req), req.params.pickListId));
  });
  router.get('/pick-lists/:pickListId/csv', staff(), ids('pickListId'), async (req, res) => {
    const list = await loadPickList(ctx, staffOf(req), req.params.pickListId);
    res.setHeader('Content-Disposition', contentDisposition(`pick-list-${list.sheetNumber}-${list.number}.csv`));
    res.type('text/csv').send(pickListCsv(list));
  });
  router.get('/pick-lists/:pickListId/names', staff(), ids('pickListId'), async (req, res) => {
    res.type('text/plain').send(pickListNames(await loadPickList(ctx, staffOf(req), req.params.pickListId)));
  });

  router.get('/guest/sheets/:sheetId/pick-lists', ids('sheetId'), guestOfSheet(), async (req, res) => {
    res.json({ items: await listSent(invitationOf(req)) });
  });
  router.post(
    '/guest/sheets/:sheetId/pick-lists',
    ids('sheetId'),
    guestOfSheet('lead'),
    limit('send'),
    body(SendPickList),
    async (req, res) => {
      const input: SendPickList = req.body;
      const list = await sendPickList(ctx, guestOf(req), invitationOf(req), input);
      res.status(201).json(presentSent(await list.$fetchGraph('picks')));
    },
  );
  return router;
}
