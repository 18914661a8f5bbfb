import { Router } from 'express';
import {
  AddProofs,
  ChangeSheet,
  HangProofs,
  InviteGuests,
  MakeSheet,
  OrderProofs,
  ReopenSheet,
  TakeProofs,
  WriteToGuests,
} from '../../contract/sheets.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids, ifMatch } from '../../middleware/validation.ts';
import { changeSheet } from './change-sheet.ts';
import { findSheet } from './find-sheet.ts';
import { inviteGuests } from './invite-to-sheet.ts';
import { issueSheet } from './issue-sheet.ts';
import { listSheets } from './list-sheets.ts';
import { makeSheet } from './make-sheet.ts';
import { hangProofs, orderProofs } from './order-proofs.ts';
import { presentSheet } from './presenter.ts';
import { putFrames } from './put-frames.ts';
import { reopenSheet } from './reopen-sheet.ts';
import { takeProofs } from './take-proofs.ts';
import { removeSheet, withdrawSheet } from './withdraw-sheet.ts';
import { remindGuests, sendLinkAgain, withdrawGuest } from './write-to-guests.ts';

/** The studio's side of proof sheets. */
export function sheetRoutes({ ctx, gates: { staff }, limits: { limit } }: RouteContext): Router {
  const router = Router();

  router.get('/commissions/:commissionId/sheets', staff(), ids('commissionId'), async (req, res) => {
    res.json({ items: await listSheets(ctx.knex, staffOf(req), req.params.commissionId) });
  });
  router.post('/commissions/:commissionId/sheets', staff(), ids('commissionId'), body(MakeSheet), async (req, res) => {
    const input: MakeSheet = req.body;
    const sheet = await makeSheet(ctx, staffOf(req), req.params.commissionId, input.frameIds);
    res.status(201).json(await presentSheet(ctx, staffOf(req), sheet));
  });

  router.get('/sheets/:sheetId', staff(), ids('sheetId'), async (req, res) => {
    res.json(await presentSheet(ctx, staffOf(req), await findSheet(staffOf(req), req.params.sheetId)));
  });
  router.patch('/sheets/:sheetId', staff(), ids('sheetId'), ifMatch(), body(ChangeSheet), async (req, res) => {
    const input: ChangeSheet = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await changeSheet(ctx, staffOf(req), req.params.sheetId, req.version ?? 0, input)));
  });
  router.delete('/sheets/:sheetId', staff(), ids('sheetId'), async (req, res) => {
    await removeSheet(ctx, staffOf(req), req.params.sheetId);
    res.status(204).end();
  });

  router.post('/sheets/:sheetId/proofs', staff(), ids('sheetId'), body(AddProofs), async (req, res) => {
    const input: AddProofs = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await putFrames(ctx, staffOf(req), req.params.sheetId, input.frameIds)));
  });
  router.post('/sheets/:sheetId/take-off', staff(), ids('sheetId'), body(TakeProofs), async (req, res) => {
    const input: TakeProofs = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await takeProofs(ctx, staffOf(req), req.params.sheetId, input.proofIds)));
  });
  router.put('/sheets/:sheetId/order', staff(), ids('sheetId'), body(OrderProofs), async (req, res) => {
    const input: OrderProofs = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await orderProofs(ctx, staffOf(req), req.params.sheetId, input.proofIds)));
  });
  router.post('/sheets/:sheetId/hang', staff(), ids('sheetId'), body(HangProofs), async (req, res) => {
    const input: HangProofs = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await hangProofs(ctx, staffOf(req), req.params.sheetId, input.proofIds, input.viewId)));
  });

  router.post('/sheets/:sheetId/issue', staff(), ids('sheetId'), limit('send'), body(InviteGuests), async (req, res) => {
    const input: InviteGuests = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await issueSheet(ctx, staffOf(req), req.params.sheetId, input.guests, input.words)));
  });
  router.post('/sheets/:sheetId/guests', staff(), ids('sheetId'), limit('send'), body(InviteGuests), async (req, res) => {
    const input: InviteGuests = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await inviteGuests(ctx, staffOf(req), req.params.sheetId, input.guests, input.words)));
  });
  router.post(
    '/sheets/:sheetId/guests/:guestId/send-again',
    staff(),
    ids('sheetId', 'guestId'),
    limit('send'),
    body(WriteToGuests),
    async (req, res) => {
      const { words }: WriteToGuests = req.body;
      res.json(
        await presentSheet(ctx, staffOf(req), await sendLinkAgain(ctx, staffOf(req), req.params.sheetId, req.params.guestId, words)),
      );
    },
  );
  router.post('/sheets/:sheetId/guests/:guestId/withdraw', staff(), ids('sheetId', 'guestId'), async (req, res) => {
    res.json(await presentSheet(ctx, staffOf(req), await withdrawGuest(ctx, staffOf(req), req.params.sheetId, req.params.guestId, true)));
  });
  router.post('/sheets/:sheetId/guests/:guestId/restore', staff(), ids('sheetId', 'guestId'), async (req, res) => {
    res.json(await presentSheet(ctx, staffOf(req), await withdrawGuest(ctx, staffOf(req), req.params.sheetId, req.params.guestId, false)));
  });
  router.post('/sheets/:sheetId/remind', staff(), ids('sheetId'), limit('send'), body(WriteToGuests), async (req, res) => {
    const { words }: WriteToGuests = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await remindGuests(ctx, staffOf(req), req.params.sheetId, words)));
  });

  router.post('/sheets/:sheetId/withdraw', staff(), ids('sheetId'), async (req, res) => {
    res.json(await presentSheet(ctx, staffOf(req), await withdrawSheet(ctx, staffOf(req), req.params.sheetId, true)));
  });
  router.post('/sheets/:sheetId/restore', staff(), ids('sheetId'), async (req, res) => {
    res.json(await presentSheet(ctx, staffOf(req), await withdrawSheet(ctx, staffOf(req), req.params.sheetId, false)));
  });
  router.post('/sheets/:sheetId/reopen', staff(), ids('sheetId'), limit('send'), body(ReopenSheet), async (req, res) => {
    const input: ReopenSheet = req.body;
    res.json(await presentSheet(ctx, staffOf(req), await reopenSheet(ctx, staffOf(req), req.params.sheetId, input)));
  });
  return router;
}
