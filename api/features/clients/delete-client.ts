import type { Transaction } from 'objection';
import type { ClientDetail } from '../../contract/clients.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Client } from '../../models/Client.ts';
import { Commission } from '../../models/Commission.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { lockClient } from './lock-client.ts';
import { readClient } from './read-client.ts';

/** Deletes a client who has no commission; it can be restored for 30 days. @throws Problem 404, 409 */
export async function deleteClient(ctx: Context, actor: StaffActor, clientId: string): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const client = await lockClient(actor, clientId, trx);
    await refuseWithCommissions(trx, actor, client);
    await Client.within(actor, trx).findById(clientId).patch({ deletedAt: new Date() });
    await addToRecord(trx, {
      studioId: actor.studioId,
      actor,
      did: 'client.deleted',
      says: `Deleted the client ${client.name}`,
      about: { clientId },
    });
  });
}

async function refuseWithCommissions(trx: Transaction, actor: StaffActor, client: Client): Promise<void> {
  const commissions = await Commission.within(actor, trx).where({ clientId: client.id }).select('deletedAt');
  if (commissions.length === 0) return;
  const present = commissions.filter((commission) => commission.deletedAt === null).length;
  throw problem(
    409,
    present > 0
      ? `${client.name} has ${present === 1 ? 'a commission' : `${present} commissions`} and stays while there is one.`
      : `A deleted commission of ${client.name} can still be brought back, so the client stays until it is gone for good.`,
    { code: 'client-has-commissions' },
  );
}

/** Brings a deleted client back; doing it twice changes nothing. @throws Problem 404 */
export async function restoreClient(ctx: Context, actor: StaffActor, clientId: string): Promise<ClientDetail> {
  return ctx.knex.transaction(async (trx) => {
    const restored = await Client.within(actor, trx).findById(clientId).whereNotNull('deletedAt').patch({ deletedAt: null });
    const client = await readClient(actor, clientId, trx);
    if (restored) {
      const says = `Brought the client ${client.name} back`;
      await addToRecord(trx, { studioId: actor.studioId, actor, did: 'client.restored', says, about: { clientId } });
    }
    return client;
  });
}
