import type { Transaction } from 'objection';
import type { AddCommission, CommissionDetail } from '../../contract/commissions.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Client } from '../../models/Client.ts';
import { Commission } from '../../models/Commission.ts';
import { Studio } from '../../models/Studio.ts';
import { View } from '../../models/View.ts';
import { insertClient } from '../clients/add-client.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { checkPrice } from './check-price.ts';
import { readCommission } from './read-commission.ts';

/** Begins a commission for a client of the studio, or for one who is added with it. @throws Problem 403, 422 */
export async function addCommission(ctx: Context, actor: StaffActor, input: AddCommission): Promise<CommissionDetail> {
  checkPrice(actor, input);
  const { client: _client, clientId: _clientId, views, ...columns } = input;
  return ctx.knex.transaction(async (trx) => {
    const clientId = await clientOf(trx, actor, input);
    const currency = columns.currency ?? (await Studio.query(trx).findById(actor.studioId))?.currency ?? 'GBP';
    const commission = await Commission.query(trx).insert({ ...columns, currency, clientId, studioId: actor.studioId });
    for (const [at, view] of views.entries()) {
      await View.query(trx).insert({ ...view, studioId: actor.studioId, commissionId: commission.id, position: at + 1 });
    }
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: commission.id,
      actor,
      did: 'commission.begun',
      says: `Began the commission ${commission.title}`,
    });
    return readCommission(trx, actor, commission.id);
  });
}

async function clientOf(trx: Transaction, actor: StaffActor, { client, clientId }: AddCommission): Promise<string> {
  if (client && clientId) throw problem(422, 'Choose a client or add one, not both.');
  if (client) return insertClient(trx, actor, client, 'client.');
  return checkClient(trx, actor, clientId);
}

/** The client's id once it is sure that it is there; locked, so that it is not deleted meanwhile. @throws Problem 422 */
export async function checkClient(trx: Transaction, actor: StaffActor, clientId: string | undefined): Promise<string> {
  const found = clientId && (await Client.within(actor, trx).findById(clientId).whereNull('deletedAt').forUpdate());
  if (!found) throw invalid([{ path: 'clientId', message: clientId ? 'This client is not there any more.' : 'Choose the client.' }]);
  return found.id;
}
