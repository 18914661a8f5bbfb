import type { Knex } from 'knex';
import type { Context } from '../../context.ts';
import { type StaffActor } from '../../middleware/actor.ts';
import { invalid } from '../../middleware/problem.ts';
import { Frame } from '../../models/Frame.ts';
import type { Sheet } from '../../models/Sheet.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { changeProofs } from './change-proofs.ts';

/** Lays frames on a sheet as proofs, behind those that are there; frames that lie there already stay where they are. */
export async function putFrames(ctx: Context, actor: StaffActor, sheetId: string, frameIds: string[]): Promise<Sheet> {
  return changeProofs(ctx, actor, sheetId, async (trx, sheet) => {
    const put = await layFrames(trx, sheet, frameIds);
    if (put === 0) return;
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: sheet.commissionId,
      actor,
      did: 'sheet.frames-put',
      says: `Put ${put} ${put === 1 ? 'frame' : 'frames'} on proof sheet ${sheet.number}`,
      about: { sheetId, frames: put },
    });
  });
}

/** Inserts the proofs in the order of view, time and name. Returns how many are new. */
export async function layFrames(trx: Knex.Transaction, sheet: Sheet, frameIds: string[]): Promise<number> {
  const wanted = [...new Set(frameIds)];
  const frames = await Frame.within(sheet, trx)
    .alias('frames')
    .leftJoin('views', 'views.id', 'frames.viewId')
    .whereIn('frames.id', wanted)
    .where({ 'frames.commissionId': sheet.commissionId })
    .whereNull('frames.deletedAt')
    .orderByRaw('views.position nulls last, frames.taken_local nulls last, frames.name, frames.id')
    .select('frames.id', 'frames.viewId', 'frames.state');
  if (frames.length < wanted.length)
    throw invalid([{ path: 'frameIds', message: 'Some of these frames are no longer in this commission.' }]);
  const unread = frames.filter((frame) => frame.state !== 'ready').length;
  if (unread > 0) {
    throw invalid([
      {
        path: 'frameIds',
        message: `${unread} of these frames ${unread === 1 ? 'is' : 'are'} still being read. Wait a moment and try again.`,
      },
    ]);
  }
  const last = await trx('proofs').where({ sheetId: sheet.id }).max({ position: 'position', number: 'number' }).first();
  const rows = frames.map((frame, index) => ({
    studioId: sheet.studioId,
    sheetId: sheet.id,
    frameId: frame.id,
    viewId: frame.viewId,
    position: (last?.position ?? 0) + index + 1,
    number: (last?.number ?? 0) + index + 1,
  }));
  const made = await trx('proofs').insert(rows).onConflict(['sheetId', 'frameId']).ignore().returning('id');
  return made.length;
}
