import type { TransactionOrKnex } from 'objection';
import type { ClientDetail } from '../../contract/clients.ts';
import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Client } from '../../models/Client.ts';
import { Commission } from '../../models/Commission.ts';
import { Contact } from '../../models/Contact.ts';
import { presentClient } from './presenter.ts';

/** A client with its contacts, deleted ones too while they are kept. @throws Problem 404 */
export async function readClient(scope: StudioScope, clientId: string, trx?: TransactionOrKnex): Promise<ClientDetail> {
  const client = await Client.within(scope, trx).findById(clientId);
  if (!client) throw problem(404);
  const contacts = await Contact.within(scope, trx).where({ clientId }).orderBy(['createdAt', 'id']);
  const commissions = await Commission.within(scope, trx).where({ clientId }).whereNull('deletedAt').resultSize();
  return presentClient(client, contacts, commissions);
}
