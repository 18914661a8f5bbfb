import { Router } from 'express';
import { AskPasswordReset, ConfirmEmail, FinishPasswordReset, LookAtLink } from '../../contract/sign-in.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body } from '../../middleware/validation.ts';
import { hashToken } from '../guests/tokens.ts';
import { confirmAgain, confirmEmail, lookAtConfirmation } from './confirm-email.ts';
import { readMe } from './read-me.ts';
import { askPasswordReset, finishPasswordReset, lookAtReset } from './reset-password.ts';

const RESET_SENT = 'If this address has a password with us, a mail with a link to choose a new one is on its way to it.';
const CONFIRM_SENT = 'If this link was ever good and still has a use, a new one is on its way to the address the first one went to.';

/** What the links in our own mails lead to. Tokens travel in the body, since addresses end up in logs. */
export function linkRoutes({ ctx, limits, sessions }: RouteContext): Router {
  const router = Router();

  router.post('/password-resets', limits.limit('reset-address'), body(AskPasswordReset), async (req, res) => {
    const { email }: AskPasswordReset = req.body;
    await limits.count('reset-account', hashToken(email));
    await askPasswordReset(ctx, email);
    res.status(202).json({ says: RESET_SENT });
  });

  router.post('/password-resets/look', limits.limit('token'), body(LookAtLink), async (req, res) => {
    const { token }: LookAtLink = req.body;
    res.json(await lookAtReset(ctx, token));
  });

  router.post('/password-resets/finish', limits.limit('token'), body(FinishPasswordReset), async (req, res) => {
    const input: FinishPasswordReset = req.body;
    await finishPasswordReset(ctx, input);
    await sessions.close(req, res, 'staff');
    res.status(204).end();
  });

  router.post('/confirm-email/look', limits.limit('token'), body(LookAtLink), async (req, res) => {
    const { token }: LookAtLink = req.body;
    res.json(await lookAtConfirmation(ctx, token));
  });

  router.post('/confirm-email/again', limits.limit('token'), body(LookAtLink), async (req, res) => {
    const { token }: LookAtLink = req.body;
    await limits.count('new-link', hashToken(token));
    await confirmAgain(ctx, token);
    res.status(202).json({ says: CONFIRM_SENT });
  });

  router.post('/confirm-email', limits.limit('token'), body(ConfirmEmail), async (req, res) => {
    const input: ConfirmEmail = req.body;
    await limits.count('sign-in-account', hashToken(input.token));
    const accountId = await confirmEmail(ctx, input);
    await sessions.open(req, res, 'staff', accountId);
    res.json(await readMe(ctx, accountId));
  });

  return router;
}
