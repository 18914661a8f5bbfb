import type { Transaction } from 'objection';
import type { AddClient, ClientDetail } from '../../contract/clients.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid } from '../../middleware/problem.ts';
import { Client } from '../../models/Client.ts';
import { Contact } from '../../models/Contact.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { readClient } from './read-client.ts';

/** Adds a client with the contacts known so far. */
export async function addClient(ctx: Context, actor: StaffActor, input: AddClient): Promise<ClientDetail> {
  return ctx.knex.transaction(async (trx) => readClient(actor, await insertClient(trx, actor, input), trx));
}

/** The same within a transaction of the caller, for a client made together with its first commission. Returns the id. */
export async function insertClient(trx: Transaction, actor: StaffActor, { contacts, ...columns }: AddClient, path = ''): Promise<string> {
  refuseDoubles(contacts, path);
  const client = await Client.query(trx).insert({ ...columns, studioId: actor.studioId });
  for (const contact of contacts) await Contact.query(trx).insert({ ...contact, studioId: actor.studioId, clientId: client.id });
  await addToRecord(trx, {
    studioId: actor.studioId,
    actor,
    did: 'client.added',
    says: `Added the client ${client.name}`,
    about: { clientId: client.id },
  });
  return client.id;
}

function refuseDoubles(contacts: AddClient['contacts'], path: string): void {
  const seen = new Set<string>();
  const doubles = contacts.flatMap(({ email }, at) => {
    const isDouble = seen.has(email);
    seen.add(email);
    return isDouble ? [{ path: `${path}contacts.${at}.email`, message: 'Two contacts have this address.' }] : [];
  });
  if (doubles.length > 0) throw invalid(doubles);
}
