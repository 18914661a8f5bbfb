import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Final } from '../../models/Final.ts';
import { FinalVersion } from '../../models/FinalVersion.ts';
import { lockOpenCommission } from '../commissions/find-commission.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { currentPicks } from './current-picks.ts';
import { findMatch } from './find-match.ts';
import { deliveriesOfVersions } from './load-finals.ts';

type Work = (trx: Transaction, version: FinalVersion, final: Final) => Promise<{ did: `final.${string}`; says: string } | null>;

/** Finds a version with its final, holds the commission, works, and tells record and pages. Returns the commission's id. */
async function onVersion(ctx: Context, actor: StaffActor, versionId: string, work: Work): Promise<string> {
  const found = await versionWithFinal(actor, versionId);
  const { commissionId } = found.final;
  await ctx.knex.transaction(async (trx) => {
    await lockOpenCommission(actor, commissionId, trx);
    const { version, final } = await versionWithFinal(actor, versionId, trx);
    const done = await work(trx, version, final);
    if (!done) return;
    await addToRecord(trx, { studioId: actor.studioId, commissionId, actor, ...done, about: { finalId: final.id, versionId } });
    await announce(trx, `commission:${commissionId}`, { what: 'finals-changed' });
  });
  return commissionId;
}

async function versionWithFinal(actor: StaffActor, versionId: string, trx?: Transaction): Promise<{ version: FinalVersion; final: Final }> {
  const version = await FinalVersion.within(actor, trx).findById(versionId);
  const final = version && (await Final.within(actor, trx).findById(version.finalId));
  if (!version || !final) throw problem(404);
  return { version, final };
}

async function othersOf(trx: Transaction, version: FinalVersion): Promise<number> {
  return FinalVersion.query(trx).where({ finalId: version.finalId }).whereNull('deletedAt').whereNot({ id: version.id }).resultSize();
}

/** Removes a version; the final goes with its last one. @throws Problem 409 where a delivery holds it */
export function removeVersion(ctx: Context, actor: StaffActor, versionId: string): Promise<string> {
  return onVersion(ctx, actor, versionId, async (trx, version, final) => {
    if (version.deletedAt) return null;
    const [delivery] = (await deliveriesOfVersions(actor, final.commissionId, trx)).get(versionId) ?? [];
    if (delivery) throw problem(409, `“${version.name}” is part of delivery ${delivery} and stays.`, { code: 'delivered' });
    await FinalVersion.query(trx).findById(versionId).patch({ deletedAt: new Date() });
    if ((await othersOf(trx, version)) === 0) await Final.query(trx).findById(final.id).patch({ deletedAt: new Date() });
    return { did: 'final.removed', says: `Removed “${version.name}”, version ${version.number} of a final` };
  });
}

/** Restores a removed version. Where its pick has another final meanwhile, its own pick is asked again. */
export function restoreVersion(ctx: Context, actor: StaffActor, versionId: string): Promise<string> {
  return onVersion(ctx, actor, versionId, async (trx, version, final) => {
    if (!version.deletedAt) return null;
    await FinalVersion.query(trx).findById(versionId).patch({ deletedAt: null });
    if (final.deletedAt) {
      const { commissionId, frameId } = final;
      const taken = frameId && (await Final.within(actor, trx).findOne({ commissionId, frameId }).whereNull('deletedAt'));
      await Final.query(trx)
        .findById(final.id)
        .patch({ deletedAt: null, ...(taken ? { match: 'ask' as const, frameId: null } : {}) });
    }
    return { did: 'final.restored', says: `Restored “${version.name}”, version ${version.number} of a final` };
  });
}

/** Makes a version a final of its own whose pick is asked, for a file that was taken for a newer version wrongly. */
export function detachVersion(ctx: Context, actor: StaffActor, versionId: string): Promise<string> {
  return onVersion(ctx, actor, versionId, async (trx, version, final) => {
    if (version.deletedAt) throw problem(404);
    if ((await othersOf(trx, version)) === 0) {
      throw problem(409, 'This file is a final of its own already. Choose another pick for it instead.', { code: 'alone' });
    }
    const picks = await currentPicks(actor, final.commissionId, trx);
    const { candidates } = findMatch(version, picks);
    const own = await Final.query(trx)
      .insert({ studioId: actor.studioId, commissionId: final.commissionId, match: 'ask', candidates })
      .returning('*');
    await FinalVersion.query(trx).findById(versionId).patch({ finalId: own.id, number: 1 });
    return { did: 'final.detached', says: `Made “${version.name}” a final of its own` };
  });
}
