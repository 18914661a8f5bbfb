import type { Transaction } from 'objection';
import type { FramesChangedExcept } from '../../contract/frames.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { Bracket } from '../../models/Bracket.ts';
import { Frame } from '../../models/Frame.ts';
import { queueGrouping } from '../brackets/queue-grouping.ts';
import { settleBracket } from '../brackets/settle-bracket.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { lockOpenCommission } from '../commissions/find-commission.ts';
import { announceFrames } from './change-frames.ts';
import { type FrameTies, whyKept } from './policy.ts';

type TiedFrame = FrameTies & { id: string; name: string; bracketId: string | null };

/** The frames with what they are tied to, locked: nobody lays them on a sheet until this is decided. */
async function loadTies(trx: Transaction, actor: StaffActor, commissionId: string, frameIds: string[]): Promise<TiedFrame[]> {
  return Frame.within(actor, trx)
    .where({ commissionId })
    .whereIn('id', frameIds)
    .whereNull('deletedAt')
    .orderBy('id')
    .forUpdate()
    .select(
      'id',
      'name',
      'bracketId',
      Frame.raw(
        `(select max(sheets.number) from proofs join sheets on sheets.id = proofs.sheet_id
           where proofs.frame_id = frames.id or proofs.bracket_id = frames.bracket_id) as sheet_number`,
      ),
      Frame.raw(
        `exists (select from proofs join sheets on sheets.id = proofs.sheet_id
           where (proofs.frame_id = frames.id or proofs.bracket_id = frames.bracket_id) and sheets.issued_at is not null) as sheet_issued`,
      ),
      Frame.raw(`exists (select from picks where picks.frame_id = frames.id or picks.frame_ids @> array[frames.id]) as picked`),
      Frame.raw(`exists (select from finals where finals.frame_id = frames.id and finals.deleted_at is null) as has_final`),
    )
    .castTo<TiedFrame[]>();
}

/** What is left of the brackets that frames were deleted from. None of them lies on a sheet. */
async function leaveBrackets(trx: Transaction, actor: StaffActor, bracketIds: string[]): Promise<void> {
  const brackets = await Bracket.within(actor, trx).findByIds([...new Set(bracketIds)]);
  for (const bracket of brackets) await settleBracket(trx, bracket);
}

/**
 * Deletes frames so that they can be restored for 30 days. What a client has been shown, has picked or has had finished
 * stays, with the reason.
 */
export async function deleteFrames(actor: StaffActor, commissionId: string, frameIds: string[]): Promise<FramesChangedExcept> {
  return Frame.transaction(async (trx) => {
    const commission = await lockOpenCommission(actor, commissionId, trx);
    const frames = await loadTies(trx, actor, commissionId, frameIds);
    const judged = frames.map((frame) => ({ frame, why: whyKept(frame) }));
    const refused = judged.flatMap(({ frame, why }) => (why === null ? [] : [{ frameId: frame.id, name: frame.name, why }]));
    const gone = judged.filter(({ why }) => why === null).map(({ frame }) => frame.id);
    if (gone.length > 0) {
      await Frame.within(actor, trx).patch({ deletedAt: new Date(), bracketId: null, alike: null }).whereIn('id', gone);
      await leaveBrackets(
        trx,
        actor,
        frames.filter(({ id }) => gone.includes(id)).flatMap(({ bracketId }) => bracketId ?? []),
      );
      await queueGrouping(trx, commissionId);
      await addToRecord(trx, {
        studioId: actor.studioId,
        commissionId,
        actor,
        did: 'frame.deleted',
        says: `Deleted ${gone.length === 1 ? `the frame “${judged.find(({ why }) => why === null)?.frame.name}”` : `${gone.length} frames`}`,
        about: { frameIds: gone },
      });
      await announceFrames(trx, commission);
    }
    return { frameIds: gone, refused };
  });
}
