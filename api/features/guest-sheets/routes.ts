import { Router } from 'express';
import { InviteReviewer } from '../../contract/guest-sheets.ts';
import { guestOf, invitationOf, staffOf } from '../../middleware/actor.ts';
import { streamEvents } from '../../middleware/event-stream.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids } from '../../middleware/validation.ts';
import { Account } from '../../models/Account.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { findSheet } from '../sheets/find-sheet.ts';
import { inviteReviewer } from './invite-reviewer.ts';
import { loadGuestProofs, proofsBody } from './load-proofs.ts';
import { loadGuestSheet, loadSheetForLooker } from './load-sheet.ts';

/** The studio reads "seen 10 minutes ago"; more exact is nobody's business. */
const SEEN_EVERY_MS = 5 * 60 * 1000;

async function noteSeen(invitation: SheetGuest): Promise<void> {
  if (invitation.lastSeenAt && Date.now() - invitation.lastSeenAt.getTime() < SEEN_EVERY_MS) return;
  await SheetGuest.query().findById(invitation.id).patch({ lastSeenAt: new Date() });
}

/** The sheet as its guests see it. */
export function guestSheetRoutes({ ctx, gates: { guestOfSheet, looksAtSheet, staff }, limits: { limit } }: RouteContext): Router {
  const router = Router();

  router.get('/guest/sheets/:sheetId', ids('sheetId'), looksAtSheet(), async (req, res) => {
    if (req.looker) return void res.json(await loadSheetForLooker(req.looker));
    const { accountId, email } = guestOf(req);
    const { name, role } = invitationOf(req);
    await noteSeen(invitationOf(req));
    const account = await Account.query().findById(accountId).select('shortcuts');
    res.json(await loadGuestSheet(req.params.sheetId, { accountId, email, name, role, shortcuts: account?.shortcuts ?? true }));
  });

  router.get('/guest/sheets/:sheetId/proofs', ids('sheetId'), looksAtSheet(), async (req, res) => {
    const { etag, plain, gzipped } = await proofsBody(ctx, req.params.sheetId);
    res.set({ 'Cache-Control': 'private, no-cache', ETag: etag, Vary: 'Accept-Encoding, Cookie' });
    if (req.header('if-none-match') === etag) return void res.status(304).end();
    const packed = req.acceptsEncodings('gzip') === 'gzip';
    if (packed) res.set('Content-Encoding', 'gzip');
    res.type('application/json').end(packed ? gzipped : plain);
  });

  const gate = looksAtSheet();
  router.get('/guest/sheets/:sheetId/events', ids('sheetId'), gate, (req, res) => {
    const stillMay = async () => gate(req, res, () => undefined);
    streamEvents(ctx.live, `sheet:${req.params.sheetId}`, { res, stillMay });
  });

  router.post(
    '/guest/sheets/:sheetId/guests',
    ids('sheetId'),
    guestOfSheet('lead'),
    limit('send'),
    body(InviteReviewer),
    async (req, res) => {
      const input: InviteReviewer = req.body;
      const { accountId, email } = guestOf(req);
      const { name, role } = invitationOf(req);
      await inviteReviewer(ctx, guestOf(req), invitationOf(req), input);
      res.status(201).json(await loadGuestSheet(req.params.sheetId, { accountId, email, name, role, shortcuts: true }));
    },
  );

  router.get('/sheets/:sheetId/preview', staff(), ids('sheetId'), async (req, res) => {
    const { accountId, name, email } = staffOf(req);
    const sheet = await findSheet(staffOf(req), req.params.sheetId);
    const seen = await loadGuestSheet(sheet.id, { accountId, name, email, role: 'reviewer', shortcuts: true });
    res.json({
      sheet: { ...seen, can: { mark: false, ask: false, send: false, invite: false } },
      proofs: await loadGuestProofs(ctx, sheet),
    });
  });
  return router;
}
