import type { Knex } from 'knex';
import type { Context } from '../../context.ts';
import { type StaffActor } from '../../middleware/actor.ts';
import { invalid } from '../../middleware/problem.ts';
import { Bracket } from '../../models/Bracket.ts';
import { Frame } from '../../models/Frame.ts';
import type { Proof } from '../../models/Proof.ts';
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

type LaidFrame = Pick<Proof, 'frameId' | 'viewId' | 'bracketId'>;
type ChosenFrame = Pick<Frame, 'id' | 'viewId' | 'state' | 'bracketId'>;

/** Inserts the proofs in the order of view, time and name; the frames of a bracket make one. Returns how many are new. */
export async function layFrames(trx: Knex.Transaction, sheet: Sheet, frameIds: string[]): Promise<number> {
  const frames = await findFrames(trx, sheet, [...new Set(frameIds)]);
  const last = await trx('proofs').where({ sheetId: sheet.id }).max({ position: 'position', number: 'number' }).first();
  const rows = (await onceABracket(trx, sheet, frames)).map((frame, index) => ({
    studioId: sheet.studioId,
    sheetId: sheet.id,
    ...frame,
    position: (last?.position ?? 0) + index + 1,
    number: (last?.number ?? 0) + index + 1,
  }));
  const made = await trx('proofs').insert(rows).onConflict().ignore().returning('id');
  return made.length;
}

/** The frames, held so that nobody groups them otherwise meanwhile. @throws Problem 422 where one is not there or not read yet */
async function findFrames(trx: Knex.Transaction, sheet: Sheet, wanted: string[]): Promise<ChosenFrame[]> {
  await Frame.within(sheet, trx).whereIn('id', wanted).orderBy('id').forShare().select('id');
  const frames: ChosenFrame[] = await Frame.within(sheet, trx)
    .alias('frames')
    .leftJoin('views', 'views.id', 'frames.viewId')
    .whereIn('frames.id', wanted)
    .where({ 'frames.commissionId': sheet.commissionId })
    .whereNull('frames.deletedAt')
    .orderByRaw('views.position nulls last, frames.taken_local nulls last, frames.name, frames.id')
    .select('frames.id', 'frames.viewId', 'frames.state', 'frames.bracketId');
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
  return frames;
}

/** Single frames as they are, and each bracket once, by its lead, where its first frame stood. */
async function onceABracket(trx: Knex.Transaction, sheet: Sheet, frames: readonly ChosenFrame[]): Promise<LaidFrame[]> {
  const brackets = await Bracket.within(sheet, trx).findByIds([...new Set(frames.flatMap(({ bracketId }) => bracketId ?? []))]);
  const leads = await Frame.within(sheet, trx).findByIds(brackets.map(({ leadFrameId }) => leadFrameId));
  const leadOf = new Map(brackets.map(({ id, leadFrameId }) => [id, leads.find((lead) => lead.id === leadFrameId)]));
  const seen = new Set<string>();
  return frames.flatMap(({ id, viewId, bracketId }): LaidFrame[] => {
    if (bracketId === null) return [{ frameId: id, viewId, bracketId }];
    if (seen.has(bracketId)) return [];
    seen.add(bracketId);
    const lead = leadOf.get(bracketId);
    return [{ frameId: lead?.id ?? id, viewId: lead?.viewId ?? viewId, bracketId }];
  });
}
