import { Router } from 'express';
import { ListMails } from '../../contract/mail.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { ids, query } from '../../middleware/validation.ts';
import { readMail, sendMailAgain, withdrawMail } from './decide-mail.ts';
import { listMails } from './list-mails.ts';

/** The studio's outbox. */
export function mailRoutes({ ctx, gates, limits }: RouteContext): Router {
  const router = Router();

  router.get('/mails', gates.staff(), query(ListMails), async (req, res) => {
    res.json(await listMails(ctx, staffOf(req), res.locals.query as ListMails));
  });

  router.get('/mails/:mailId', gates.staff(), ids('mailId'), async (req, res) => {
    res.json(await readMail(ctx, staffOf(req), String(req.params.mailId)));
  });

  router.post('/mails/:mailId/send-again', gates.staff(), ids('mailId'), limits.limit('mail'), async (req, res) => {
    res.json(await sendMailAgain(ctx, staffOf(req), String(req.params.mailId)));
  });

  router.post('/mails/:mailId/withdraw', gates.staff(), ids('mailId'), async (req, res) => {
    res.json(await withdrawMail(ctx, staffOf(req), String(req.params.mailId)));
  });

  return router;
}
