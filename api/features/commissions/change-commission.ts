import { raw } from 'objection';
import type { ChangeCommission, CommissionDetail } from '../../contract/commissions.ts';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Commission } from '../../models/Commission.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { checkClient } from './add-commission.ts';
import { checkPrice } from './check-price.ts';
import { lockOpenCommission } from './find-commission.ts';
import { readCommission } from './read-commission.ts';

const WORDS: Record<keyof ChangeCommission, string> = {
  title: 'title',
  clientId: 'client',
  brief: 'brief',
  shotOn: 'shoot date',
  dueOn: 'due date',
  allowance: 'allowance',
  extraPrice: 'price of an extra',
  currency: 'currency',
};

/** Changes the version of a commission the person saw; what is the same already is left out. @throws Problem 403, 404, 409, 412, 422 */
export async function changeCommission(
  ctx: Context,
  actor: StaffActor,
  input: ChangeCommission & { commissionId: string; version: number },
): Promise<CommissionDetail> {
  const { commissionId, version, ...wanted } = input;
  return ctx.knex.transaction(async (trx) => {
    const before = await lockOpenCommission(actor, commissionId, trx);
    if (before.version !== version) throw problem(412);
    const changes = differing(before, wanted);
    checkPrice(actor, changes);
    if (changes.clientId) await checkClient(trx, actor, changes.clientId);
    const changed = Object.keys(changes) as (keyof ChangeCommission)[];
    if (changed.length > 0) {
      await Commission.within(actor, trx)
        .findById(commissionId)
        .patch({ ...changes, updatedAt: new Date(), version: raw('version + 1') });
      await addToRecord(trx, {
        studioId: actor.studioId,
        commissionId,
        actor,
        did: 'commission.changed',
        says: `Changed the ${listed(changed.map((field) => WORDS[field]))}`,
        about: { changed },
      });
      await announce(trx, `commission:${commissionId}`, { what: 'commission-changed' });
    }
    return readCommission(trx, actor, commissionId);
  });
}

function differing(before: Commission, wanted: ChangeCommission): ChangeCommission {
  const pairs = Object.entries(wanted).filter(([field, value]) => value !== undefined && value !== before[field as keyof ChangeCommission]);
  return Object.fromEntries(pairs);
}

function listed(words: string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}
