import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Proof } from '../../models/Proof.ts';
import type { Sheet } from '../../models/Sheet.ts';
import { View } from '../../models/View.ts';
import { changeProofs } from './change-proofs.ts';

/** Puts the proofs in the order given, which must name every proof of the sheet exactly once. */
export async function orderProofs(ctx: Context, actor: StaffActor, sheetId: string, proofIds: string[]): Promise<Sheet> {
  return changeProofs(ctx, actor, sheetId, async (trx) => {
    const there = await Proof.within(actor, trx).where({ sheetId }).select('id');
    const given = new Set(proofIds);
    const same = given.size === proofIds.length && there.length === given.size && there.every((proof) => given.has(proof.id));
    if (!same) throw problem(412, 'The proofs of this sheet changed meanwhile. Look at the newer order first.');
    await trx.raw(
      `update proofs set position = wanted.place
         from unnest(?::uuid[]) with ordinality as wanted (id, place)
        where proofs.id = wanted.id and proofs.sheet_id = ?`,
      [proofIds, sheetId],
    );
  });
}

/** Hangs proofs under a view of the commission, or under none. */
export async function hangProofs(
  ctx: Context,
  actor: StaffActor,
  sheetId: string,
  proofIds: string[],
  viewId: string | null,
): Promise<Sheet> {
  return changeProofs(ctx, actor, sheetId, async (trx, sheet) => {
    if (viewId !== null) {
      const view = await View.within(actor, trx).findOne({ id: viewId, commissionId: sheet.commissionId });
      if (!view) throw invalid([{ path: 'viewId', message: 'This view is no longer in the brief.' }]);
    }
    await Proof.within(actor, trx).where({ sheetId }).whereIn('id', proofIds).patch({ viewId });
  });
}
