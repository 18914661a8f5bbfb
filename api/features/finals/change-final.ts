import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import type { ChangeFinal } from '../../contract/finals.ts';
import { announce } from '../../db/live.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Final } from '../../models/Final.ts';
import { FinalVersion } from '../../models/FinalVersion.ts';
import { lockOpenCommission } from '../commissions/find-commission.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { currentPicks, type CurrentPick } from './current-picks.ts';

/**
 * Says which pick a final belongs to (or that it belongs to none), or changes its title. Where the pick has a final
 * already, the versions of this one become that one's newest.
 * @returns the commission it is in
 * @throws Problem 404, 409 where the commission is closed, 412, 422 where the frame is no pick
 */
export async function changeFinal(ctx: Context, actor: StaffActor, finalId: string, version: number, change: ChangeFinal): Promise<string> {
  const { commissionId } = await findFinal(actor, finalId);
  await ctx.knex.transaction(async (trx) => {
    await lockOpenCommission(actor, commissionId, trx);
    const final = await findFinal(actor, finalId, trx);
    if (final.version !== version) throw problem(412);
    if (change.title !== undefined) await Final.query(trx).findById(finalId).patch({ title: change.title });
    if (change.frameId !== undefined) await rematch(trx, actor, final, change.frameId);
    await Final.query(trx)
      .findById(finalId)
      .patch({ version: version + 1 });
    await announce(trx, `commission:${commissionId}`, { what: 'finals-changed' });
  });
  return commissionId;
}

/** A final of the studio that was not removed. @throws Problem 404 */
export async function findFinal(actor: StaffActor, finalId: string, trx?: Transaction): Promise<Final> {
  const final = await Final.within(actor, trx).findById(finalId).whereNull('deletedAt');
  if (!final) throw problem(404);
  return final;
}

async function rematch(trx: Transaction, actor: StaffActor, final: Final, frameId: string | null): Promise<void> {
  if (frameId === null) {
    await Final.query(trx).findById(final.id).patch({ match: 'none', frameId: null, candidates: [] });
    return tell(trx, actor, final, 'Said that a final belongs to none of the picks');
  }
  const pick = (await currentPicks(actor, final.commissionId, trx)).find((one) => one.frameId === frameId);
  if (!pick) throw invalid([{ path: 'frameId', message: 'That is not one of the picks.' }]);
  const there = await Final.within(actor, trx).findOne({ commissionId: final.commissionId, frameId }).whereNull('deletedAt');
  if (there && there.id !== final.id) return join(trx, actor, final, there, pick);
  await Final.query(trx).findById(final.id).patch({ match: 'by-hand', frameId, candidates: [] });
  await tell(trx, actor, final, `Matched a final to pick ${pick.number}, ${pick.frameName}, by hand`);
}

/** The versions of a final become the newest of another; the emptied one goes. */
async function join(trx: Transaction, actor: StaffActor, from: Final, into: Final, pick: CurrentPick): Promise<void> {
  const last = await FinalVersion.query(trx).where({ finalId: into.id }).max('number as number').first();
  const moving = await FinalVersion.query(trx).where({ finalId: from.id }).orderBy('number');
  let number = last?.number ?? 0;
  for (const version of moving) await FinalVersion.query(trx).findById(version.id).patch({ finalId: into.id, number: ++number });
  await Final.query(trx).findById(from.id).patch({ deletedAt: new Date() });
  await tell(trx, actor, into, `Made a final the newest version of pick ${pick.number}, ${pick.frameName}`);
}

async function tell(trx: Transaction, actor: StaffActor, final: Final, says: string): Promise<void> {
  const { studioId, commissionId } = final;
  await addToRecord(trx, { studioId, commissionId, actor, did: 'final.matched', says, about: { finalId: final.id } });
}
