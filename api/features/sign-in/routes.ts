import { Router } from 'express';
import { ChangeMe, ChangePassword, SignIn, SignUp } from '../../contract/sign-in.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body } from '../../middleware/validation.ts';
import { hashToken } from '../guests/tokens.ts';
import { changePassword } from './change-password.ts';
import { linkRoutes } from './link-routes.ts';
import { changeMe, readMe } from './read-me.ts';
import { refused, signIn, stillHolds } from './sign-in.ts';
import { signUp } from './sign-up.ts';

const SIGNED_UP = 'A mail is on its way to this address. Open the link in it to go on.';

/** Signing up, in and out, and the own account. */
export function signInRoutes(routes: RouteContext): Router {
  const { ctx, gates, limits, sessions } = routes;
  const router = Router();
  router.use(linkRoutes(routes));

  router.post('/sign-up', limits.limit('sign-up'), body(SignUp), async (req, res) => {
    const input: SignUp = req.body;
    await limits.count('reset-account', `sign-up:${hashToken(input.email)}`);
    await signUp(ctx, input);
    res.status(202).json({ says: SIGNED_UP });
  });

  router.post('/sign-in', limits.limit('sign-in-address'), body(SignIn), async (req, res) => {
    const input: SignIn = req.body;
    await limits.count('sign-in-account', hashToken(input.email));
    const known = await signIn(ctx, input);
    await sessions.open(req, res, 'staff', known.accountId);
    if (!(await stillHolds(ctx, known))) {
      await sessions.closeAll(known.accountId);
      throw refused();
    }
    res.json(await readMe(ctx, known.accountId));
  });

  router.post('/sign-out', async (req, res) => {
    await sessions.close(req, res, 'staff');
    res.status(204).end();
  });

  router.post('/sign-out-everywhere', gates.staff(), async (req, res) => {
    await sessions.closeAll(staffOf(req).accountId);
    await sessions.close(req, res, 'staff');
    res.status(204).end();
  });

  router.get('/me', gates.staff(), async (req, res) => {
    res.json(await readMe(ctx, staffOf(req).accountId));
  });

  router.patch('/me', gates.staff(), body(ChangeMe), async (req, res) => {
    const change: ChangeMe = req.body;
    res.json(await changeMe(ctx, staffOf(req).accountId, change));
  });

  router.put('/me/password', gates.staff(), body(ChangePassword), async (req, res) => {
    const input: ChangePassword = req.body;
    const actor = staffOf(req);
    await limits.count('sign-in-account', `change:${actor.accountId}`);
    await changePassword(ctx, actor, input);
    await sessions.open(req, res, 'staff', actor.accountId);
    res.status(204).end();
  });

  return router;
}
