import { Router } from 'express';
import { JoinStudio, LookAtLink } from '../../contract/sign-in.ts';
import { InviteAssistant } from '../../contract/team.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids } from '../../middleware/validation.ts';
import { hashToken } from '../guests/tokens.ts';
import { readMe } from '../sign-in/read-me.ts';
import { inviteAssistant, sendInvitationAgain, withdrawInvitation } from './invite-assistant.ts';
import { joinStudio, lookAtInvitation } from './join-studio.ts';
import { readTeam } from './presenter.ts';
import { leaveStudio, removeAssistant } from './remove-assistant.ts';

/** The people of a studio: the owner's, except for joining and leaving. */
export function teamRoutes({ ctx, gates, limits, sessions }: RouteContext): Router {
  const router = Router();

  router.get('/team', gates.staff('owner'), async (req, res) => {
    res.json(await readTeam(ctx, staffOf(req)));
  });

  router.post('/team/invitations', gates.staff('owner'), limits.limit('mail'), body(InviteAssistant), async (req, res) => {
    const input: InviteAssistant = req.body;
    await inviteAssistant(ctx, staffOf(req), input);
    res.status(201).json(await readTeam(ctx, staffOf(req)));
  });

  const invitation = '/team/invitations/:invitationId';
  router.post(`${invitation}/send-again`, gates.staff('owner'), ids('invitationId'), limits.limit('mail'), async (req, res) => {
    await sendInvitationAgain(ctx, staffOf(req), String(req.params.invitationId));
    res.json(await readTeam(ctx, staffOf(req)));
  });

  router.delete(invitation, gates.staff('owner'), ids('invitationId'), async (req, res) => {
    await withdrawInvitation(ctx, staffOf(req), String(req.params.invitationId));
    res.json(await readTeam(ctx, staffOf(req)));
  });

  router.delete('/team/members/:accountId', gates.staff('owner'), ids('accountId'), async (req, res) => {
    await removeAssistant(ctx, staffOf(req), String(req.params.accountId));
    res.json(await readTeam(ctx, staffOf(req)));
  });

  router.post('/team/leave', gates.staff(), async (req, res) => {
    await leaveStudio(ctx, staffOf(req));
    await sessions.close(req, res, 'staff');
    res.status(204).end();
  });

  router.post('/join/look', limits.limit('token'), body(LookAtLink), async (req, res) => {
    const { token }: LookAtLink = req.body;
    res.json(await lookAtInvitation(ctx, token));
  });

  router.post('/join', limits.limit('token'), body(JoinStudio), async (req, res) => {
    const input: JoinStudio = req.body;
    await limits.count('sign-in-account', hashToken(input.token));
    const accountId = await joinStudio(ctx, input);
    await sessions.open(req, res, 'staff', accountId);
    res.json(await readMe(ctx, accountId));
  });

  return router;
}
