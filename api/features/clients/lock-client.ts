import type { Transaction } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Client } from '../../models/Client.ts';

/**
 * A client that was not deleted, locked until the transaction ends: it cannot be deleted while it gets a commission or a
 * contact, nor get one while it is deleted. @throws Problem 404
 */
export async function lockClient(scope: StudioScope, clientId: string, trx: Transaction): Promise<Client> {
  const client = await Client.within(scope, trx).findById(clientId).whereNull('deletedAt').forUpdate();
  if (!client) throw problem(404);
  return client;
}
