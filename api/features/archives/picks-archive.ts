import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import type { StudioScope } from '../../db/scope.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Archive } from '../../models/Archive.ts';
import { Pick } from '../../models/Pick.ts';
import { PickList } from '../../models/PickList.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { pickedIds } from '../pick-lists/picked-frames.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { requestArchive } from './request-archive.ts';

/** A pick list with its commission, which was not deleted. @throws Problem 404 */
async function findList(scope: StudioScope, pickListId: string, trx?: Transaction) {
  const list = await PickList.within(scope, trx).findById(pickListId);
  if (!list) throw problem(404);
  return { list, commission: await findCommission(scope, list.commissionId, trx) };
}

/** Has the archive of a pick list's originals built; a list never changes, so one archive serves for ever. @throws Problem 404 */
export async function requestPicksArchive(ctx: Context, actor: StaffActor, pickListId: string): Promise<Archive> {
  return ctx.knex.transaction(async (trx) => {
    const { list, commission } = await findList(actor, pickListId, trx);
    const name = `${commission.title} – pick list ${list.number}`;
    const { studioId, commissionId } = list;
    const picks = await Pick.within(actor, trx).where({ pickListId }).select('frameId', 'frameIds');
    const files = picks.reduce((sum, pick) => sum + pickedIds(pick).length, 0);
    return requestArchive(trx, { studioId, commissionId, of: { pickListId, kind: 'picks' }, name, files });
  });
}

/** The archive of a pick list. @throws Problem 404 where none was asked for */
export async function findPicksArchive(scope: StudioScope, pickListId: string): Promise<Archive> {
  await findList(scope, pickListId);
  const archive = await Archive.within(scope).findOne({ pickListId });
  if (!archive) throw problem(404, 'Nobody has asked for this archive yet.');
  return archive;
}

/** Writes down that somebody of the studio fetched the originals of a list. */
export async function notePicksFetched(ctx: Context, actor: StaffActor, archive: Archive): Promise<void> {
  const list = await PickList.within(actor).findById(archive.pickListId ?? '');
  if (!list) return;
  await ctx.knex.transaction((trx) =>
    addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: list.commissionId,
      actor,
      did: 'pick-list.fetched',
      says: `Fetched the originals of pick list ${list.number}`,
      about: { pickListId: list.id, bytes: archive.sizeBytes },
    }),
  );
}
