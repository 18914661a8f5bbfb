import { raw } from 'objection';
import type { AddContact, ChangeContact, Contact as ContactAnswer } from '../../contract/clients.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Contact } from '../../models/Contact.ts';
import { lockClient } from './lock-client.ts';
import { presentContact } from './presenter.ts';

/** Adds a person at a client. @throws Problem 404, 422 where the address is there already */
export async function addContact(ctx: Context, actor: StaffActor, clientId: string, input: AddContact): Promise<ContactAnswer> {
  return ctx.knex.transaction(async (trx) => {
    await lockClient(actor, clientId, trx);
    const there = await Contact.within(actor, trx).findOne({ clientId, email: input.email });
    if (there) throw taken(there);
    return presentContact(await Contact.query(trx).insertAndFetch({ ...input, studioId: actor.studioId, clientId }));
  });
}

/** Changes the version of a contact the person saw. @throws Problem 404, 412, 422 */
export async function changeContact(
  ctx: Context,
  actor: StaffActor,
  input: ChangeContact & { clientId: string; contactId: string; version: number },
): Promise<ContactAnswer> {
  const { clientId, contactId, version, ...columns } = input;
  return ctx.knex.transaction(async (trx) => {
    await lockClient(actor, clientId, trx);
    const contact = await Contact.within(actor, trx).findOne({ id: contactId, clientId });
    if (!contact) throw problem(404);
    if (contact.version !== version) throw problem(412);
    const there =
      columns.email && (await Contact.within(actor, trx).findOne({ clientId, email: columns.email }).whereNot({ id: contactId }));
    if (there) throw taken(there);
    return presentContact(await contact.$query(trx).patchAndFetch({ ...columns, version: raw('version + 1') }));
  });
}

/** Removes a contact. Guests invited under that address keep their invitations. @throws Problem 404 */
export async function deleteContact(ctx: Context, actor: StaffActor, clientId: string, contactId: string): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    await lockClient(actor, clientId, trx);
    const removed = await Contact.within(actor, trx).where({ id: contactId, clientId }).delete();
    if (!removed) throw problem(404);
  });
}

function taken(there: Contact) {
  return invalid([{ path: 'email', message: `${there.name} has this address already.` }]);
}
