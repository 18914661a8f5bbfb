import { Router, type Request, type Response } from 'express';
import { AddRecipients, ChangeDelivery, MakeDelivery } from '../../contract/deliveries.ts';
import { recipientOf, staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids, ifMatch } from '../../middleware/validation.ts';
import { extendDelivery, retryDelivery, withdrawDelivery } from './change-delivery.ts';
import { readGuestDelivery } from './guest-delivery.ts';
import { listDeliveries, readDelivery } from './list-deliveries.ts';
import { makeDelivery } from './make-delivery.ts';
import { addRecipients, sendAgain, withdrawRecipient, type RecipientPlace } from './recipients.ts';

/** Deliveries as the studio makes and follows them, and the page of their recipients. */
export function deliveryRoutes({ ctx, gates: { staff, guestOfDelivery }, limits: { limit } }: RouteContext): Router {
  const router = Router();
  const many = '/commissions/:commissionId/deliveries';
  const one = `${many}/:deliveryId`;
  const person = `${one}/recipients/:recipientId`;
  const placeOf = (req: Request) => req.params as unknown as RecipientPlace;
  const answer = async (req: Request, res: Response) => {
    const { commissionId, deliveryId } = placeOf(req);
    res.json(await readDelivery(ctx, staffOf(req), commissionId, deliveryId));
  };

  router.get(many, staff(), ids('commissionId'), async (req, res) => {
    res.json(await listDeliveries(ctx, staffOf(req), req.params.commissionId ?? ''));
  });
  router.post(many, staff(), ids('commissionId'), limit('send'), body(MakeDelivery), async (req, res) => {
    const input: MakeDelivery = req.body;
    const { id, commissionId } = await makeDelivery(ctx, staffOf(req), req.params.commissionId ?? '', input);
    res.status(201).json(await readDelivery(ctx, staffOf(req), commissionId, id));
  });
  router.get(one, staff(), ids('commissionId', 'deliveryId'), answer);
  router.patch(one, staff(), ids('commissionId', 'deliveryId'), ifMatch(), body(ChangeDelivery), async (req, res) => {
    const { fetchBy }: ChangeDelivery = req.body;
    const { commissionId, deliveryId } = placeOf(req);
    await extendDelivery(ctx, staffOf(req), commissionId, deliveryId, req.version ?? 0, fetchBy);
    await answer(req, res);
  });
  router.post(`${one}/retry`, staff(), ids('commissionId', 'deliveryId'), async (req, res) => {
    const { commissionId, deliveryId } = placeOf(req);
    await retryDelivery(ctx, staffOf(req), commissionId, deliveryId);
    await answer(req, res);
  });
  for (const verb of ['withdraw', 'restore'] as const) {
    router.post(`${one}/${verb}`, staff(), ids('commissionId', 'deliveryId'), async (req, res) => {
      const { commissionId, deliveryId } = placeOf(req);
      await withdrawDelivery(ctx, staffOf(req), commissionId, deliveryId, verb === 'withdraw');
      await answer(req, res);
    });
    router.post(`${person}/${verb}`, staff(), ids('commissionId', 'deliveryId', 'recipientId'), async (req, res) => {
      await withdrawRecipient(ctx, staffOf(req), placeOf(req), verb === 'withdraw');
      await answer(req, res);
    });
  }
  router.post(`${one}/recipients`, staff(), ids('commissionId', 'deliveryId'), limit('send'), body(AddRecipients), async (req, res) => {
    const { recipients }: AddRecipients = req.body;
    const { commissionId, deliveryId } = placeOf(req);
    await addRecipients(ctx, staffOf(req), commissionId, deliveryId, recipients);
    await answer(req, res);
  });
  router.post(`${person}/send-again`, staff(), ids('commissionId', 'deliveryId', 'recipientId'), limit('send'), async (req, res) => {
    await sendAgain(ctx, staffOf(req), placeOf(req));
    await answer(req, res);
  });

  router.get('/deliveries/:deliveryId', ids('deliveryId'), guestOfDelivery(), async (req, res) => {
    res.json(await readGuestDelivery(ctx, recipientOf(req)));
  });
  return router;
}
