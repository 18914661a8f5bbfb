import { Router } from 'express';
import { ChangeGuest, ListMine, NewLink, OpenLink } from '../../contract/guests.ts';
import { guestOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, query } from '../../middleware/validation.ts';
import { askNewLink } from './ask-new-link.ts';
import { changeGuest, readGuest } from './change-guest.ts';
import { listMine } from './list-mine.ts';
import { openLink } from './open-link.ts';
import { hashToken } from './tokens.ts';

const SENT_PERHAPS =
  'If this link was ever good and what it opens is still there, a new one is on its way to the address the first one went to.';

/** Links in mails, the guest's session, and what a guest was ever invited to. */
export function guestRoutes({ ctx, gates, limits, sessions }: RouteContext): Router {
  const router = Router();

  router.post('/open', limits.limit('token'), body(OpenLink), async (req, res) => {
    const { token }: OpenLink = req.body;
    const { accountId, goTo } = await openLink(ctx, token);
    await sessions.open(req, res, 'guest', accountId);
    res.json({ goTo });
  });

  router.post('/new-link', limits.limit('token'), body(NewLink), async (req, res) => {
    const { token }: NewLink = req.body;
    await limits.count('new-link', hashToken(token));
    await askNewLink(ctx, token);
    res.status(202).json({ says: SENT_PERHAPS });
  });

  router.get('/guest', gates.guest(), async (req, res) => {
    res.json(await readGuest(ctx, guestOf(req)));
  });

  router.patch('/guest', gates.guest(), body(ChangeGuest), async (req, res) => {
    const change: ChangeGuest = req.body;
    res.json(await changeGuest(ctx, guestOf(req), change));
  });

  router.post('/guest/sign-out', async (req, res) => {
    await sessions.close(req, res, 'guest');
    res.status(204).end();
  });

  router.get('/mine', gates.guest(), query(ListMine), async (req, res) => {
    res.json(await listMine(ctx, guestOf(req), res.locals.query as ListMine));
  });

  return router;
}
