import type { View as ViewAnswer } from '../../contract/commissions.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { View } from '../../models/View.ts';
import { changeViews } from './change-views.ts';

/**
 * Puts the views into an order that names every one of them once. Where a view came or went since the person looked, nothing
 * is changed. @throws Problem 404, 409, 412
 */
export async function orderViews(ctx: Context, actor: StaffActor, commissionId: string, viewIds: string[]): Promise<ViewAnswer[]> {
  return changeViews(ctx, actor, commissionId, async (trx) => {
    const before = await View.within(actor, trx).where({ commissionId }).orderBy(['position', 'id']).select('id');
    const wanted = new Set(viewIds);
    const same = wanted.size === viewIds.length && before.length === viewIds.length && before.every(({ id }) => wanted.has(id));
    if (!same) throw problem(412, 'A view was added or deleted meanwhile. Here is the present list; please order it again.');
    if (before.every(({ id }, at) => id === viewIds[at])) return undefined;
    await trx.raw(
      'update views v set position = o.at from unnest(?::uuid[]) with ordinality o(id, at) where v.id = o.id and v.studio_id = ?',
      [viewIds, actor.studioId],
    );
    return 'Changed the order of the views';
  });
}
