import { Router } from 'express';
import { AskToMark, BeginMarking, Look, OpenLinkTerms } from '../../contract/open-links.ts';
import { staffOf } from '../../middleware/actor.ts';
import { endLooking } from '../../middleware/lookers.ts';
import { problem } from '../../middleware/problem.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids } from '../../middleware/validation.ts';
import { hashToken } from '../guests/tokens.ts';
import { presentSheet } from '../sheets/presenter.ts';
import { askToMark } from './ask-to-mark.ts';
import { beginMarking } from './begin-marking.ts';
import { changeOpenLink, switchOpenLinkOn, withdrawOpenLink } from './change-open-link.ts';
import { look } from './look.ts';

/** The open link of a sheet: switched on by the studio, opened by whoever has it, and the way from looking to marking. */
export function openLinkRoutes(routes: RouteContext): Router {
  const { ctx, gates, limits, sessions } = routes;
  const router = Router();

  const ofSheet = '/sheets/:sheetId/open-link';
  router.post(ofSheet, gates.staff(), ids('sheetId'), body(OpenLinkTerms), async (req, res) => {
    const terms: OpenLinkTerms = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await switchOpenLinkOn(ctx, staffOf(req), req.params.sheetId, terms)));
  });
  router.patch(ofSheet, gates.staff(), ids('sheetId'), body(OpenLinkTerms), async (req, res) => {
    const terms: OpenLinkTerms = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await changeOpenLink(ctx, staffOf(req), req.params.sheetId, terms)));
  });
  router.post(`${ofSheet}/withdraw`, gates.staff(), ids('sheetId'), async (req, res) => {
    res.json(await presentSheet(ctx, staffOf(req), await withdrawOpenLink(ctx, staffOf(req), req.params.sheetId)));
  });

  router.post('/look', limits.limit('look'), body(Look), async (req, res) => {
    const input: Look = req.body;
    res.json(await look(routes, req, res, input));
  });

  router.post(
    '/guest/sheets/:sheetId/ask-to-mark',
    ids('sheetId'),
    gates.looksAtSheet(),
    limits.limit('ask-to-mark'),
    body(AskToMark),
    async (req, res) => {
      const input: AskToMark = req.body;
      if (!req.looker) throw problem(409, 'You have a place on this sheet and can mark already.', { code: 'has-place' });
      await limits.count('ask-to-mark-person', hashToken(input.email));
      await askToMark(ctx, req.looker, input);
      res.status(202).json({ says: `A link to begin marking is on its way to ${input.email}. It works once, within a day.` });
    },
  );

  router.post('/begin', limits.limit('token'), body(BeginMarking), async (req, res) => {
    const { token }: BeginMarking = req.body;
    const { accountId, goTo } = await beginMarking(ctx, token, await sessions.read(req, res, 'guest'));
    await sessions.open(req, res, 'guest', accountId);
    await endLooking(req, res, goTo.slice('/sheets/'.length));
    res.json({ goTo });
  });
  return router;
}
