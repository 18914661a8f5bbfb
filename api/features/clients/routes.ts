import { Router } from 'express';
import { AddClient, AddContact, ChangeClient, ChangeContact, ListClients } from '../../contract/clients.ts';
import { staffOf } from '../../middleware/actor.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { body, ids, ifMatch, query } from '../../middleware/validation.ts';
import { addClient } from './add-client.ts';
import { changeClient } from './change-client.ts';
import { addContact, changeContact, deleteContact } from './contacts.ts';
import { deleteClient, restoreClient } from './delete-client.ts';
import { listClients } from './list-clients.ts';
import { readClient } from './read-client.ts';

export function clientRoutes(routes: RouteContext): Router {
  const { ctx, gates } = routes;
  const router = Router();

  router.get('/clients', gates.staff(), query(ListClients), async (req, res) => {
    res.json(await listClients(ctx.knex, staffOf(req), res.locals.query as ListClients));
  });
  router.post('/clients', gates.staff(), body(AddClient), async (req, res) => {
    res.status(201).json(await addClient(ctx, staffOf(req), req.body as AddClient));
  });
  router.get('/clients/:clientId', gates.staff(), ids('clientId'), async (req, res) => {
    res.json(await readClient(staffOf(req), req.params.clientId));
  });
  router.patch('/clients/:clientId', gates.staff(), ids('clientId'), ifMatch(), body(ChangeClient), async (req, res) => {
    const input = req.body as ChangeClient;
    res.json(await changeClient(ctx, staffOf(req), { ...input, clientId: req.params.clientId, version: req.version ?? 0 }));
  });
  router.delete('/clients/:clientId', gates.staff(), ids('clientId'), async (req, res) => {
    await deleteClient(ctx, staffOf(req), req.params.clientId);
    res.status(204).end();
  });
  router.post('/clients/:clientId/restore', gates.staff(), ids('clientId'), async (req, res) => {
    res.json(await restoreClient(ctx, staffOf(req), req.params.clientId));
  });
  router.use(contactRoutes(routes));
  return router;
}

function contactRoutes({ ctx, gates }: RouteContext): Router {
  const router = Router();
  const one = '/clients/:clientId/contacts/:contactId';

  router.post('/clients/:clientId/contacts', gates.staff(), ids('clientId'), body(AddContact), async (req, res) => {
    res.status(201).json(await addContact(ctx, staffOf(req), req.params.clientId, req.body as AddContact));
  });
  router.patch(one, gates.staff(), ids('clientId', 'contactId'), ifMatch(), body(ChangeContact), async (req, res) => {
    const { clientId, contactId } = req.params;
    const input = req.body as ChangeContact;
    res.json(await changeContact(ctx, staffOf(req), { ...input, clientId, contactId, version: req.version ?? 0 }));
  });
  router.delete(one, gates.staff(), ids('clientId', 'contactId'), async (req, res) => {
    await deleteContact(ctx, staffOf(req), req.params.clientId, req.params.contactId);
    res.status(204).end();
  });
  return router;
}
