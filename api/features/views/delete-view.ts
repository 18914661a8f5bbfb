import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { View } from '../../models/View.ts';
import { changeViews } from './change-views.ts';

/** Deletes a view. The database takes frames and proofs off it, so they belong to no view: "Also made". @throws Problem 404, 409 */
export async function deleteView(ctx: Context, actor: StaffActor, commissionId: string, viewId: string): Promise<void> {
  await changeViews(ctx, actor, commissionId, async (trx) => {
    const view = await View.within(actor, trx).findOne({ id: viewId, commissionId });
    if (!view) throw problem(404);
    await View.within(actor, trx).deleteById(viewId);
    return `Deleted the view “${view.title}”`;
  });
}
