import { raw } from 'objection';
import type { ChangeClient, ClientDetail } from '../../contract/clients.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Client } from '../../models/Client.ts';
import { lockClient } from './lock-client.ts';
import { readClient } from './read-client.ts';

/** Changes name or remarks of the version the person saw. @throws Problem 404, 412 */
export async function changeClient(
  ctx: Context,
  actor: StaffActor,
  input: ChangeClient & { clientId: string; version: number },
): Promise<ClientDetail> {
  const { clientId, version, ...columns } = input;
  return ctx.knex.transaction(async (trx) => {
    await lockClient(actor, clientId, trx);
    const changed = await Client.within(actor, trx)
      .findById(clientId)
      .where({ version })
      .patch({ ...columns, version: raw('version + 1') });
    if (!changed) throw problem(412);
    return readClient(actor, clientId, trx);
  });
}
