import type { Knex } from 'knex';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Proof } from '../../models/Proof.ts';
import type { Sheet } from '../../models/Sheet.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { changeProofs } from './change-proofs.ts';

/** Takes proofs off a sheet. What a guest marked, or a sent list names, stays. */
export async function takeProofs(ctx: Context, actor: StaffActor, sheetId: string, proofIds: string[]): Promise<Sheet> {
  return changeProofs(ctx, actor, sheetId, async (trx, sheet) => {
    await refuseMarked(trx, sheet, proofIds);
    const taken = await Proof.within(actor, trx).where({ sheetId }).whereIn('id', proofIds).delete();
    if (taken === 0) return;
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: sheet.commissionId,
      actor,
      did: 'sheet.proofs-taken',
      says: `Took ${taken} ${taken === 1 ? 'proof' : 'proofs'} off proof sheet ${sheet.number}`,
      about: { sheetId, proofs: taken },
    });
  });
}

/** @throws Problem 409 that names the proofs that somebody has marked */
async function refuseMarked(trx: Knex.Transaction, sheet: Sheet, proofIds: string[]): Promise<void> {
  const kept = await Proof.within(sheet, trx)
    .where({ sheetId: sheet.id })
    .whereIn('id', proofIds)
    .where((any) =>
      any
        .whereExists(trx('marks').whereRaw('marks.proof_id = proofs.id'))
        .orWhereExists(trx('picks').whereRaw('picks.proof_id = proofs.id')),
    )
    .orderBy('number')
    .select('number');
  if (kept.length === 0) return;
  const numbers = kept.map((proof) => proof.number).join(', ');
  const [proofs, stay] = kept.length === 1 ? ['proof', 'it stays'] : ['proofs', 'they stay'];
  throw problem(409, `Somebody has marked ${proofs} ${numbers}, so ${stay} on the sheet.`, { code: 'marked' });
}
