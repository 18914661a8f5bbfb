import type { AddView, View as ViewAnswer } from '../../contract/commissions.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { View } from '../../models/View.ts';
import { changeViews, viewOf } from './change-views.ts';

const MOST = 200;

/** Adds a view after the last one. @throws Problem 404, 409 */
export async function addView(ctx: Context, actor: StaffActor, commissionId: string, input: AddView): Promise<ViewAnswer> {
  let id = '';
  const views = await changeViews(ctx, actor, commissionId, async (trx) => {
    const last = await View.within(actor, trx).where({ commissionId }).orderBy('position', 'desc');
    if (last.length >= MOST) throw problem(409, `A commission holds at most ${MOST} views.`, { code: 'too-many-views' });
    const view = await View.query(trx).insert({
      ...input,
      studioId: actor.studioId,
      commissionId,
      position: (last[0]?.position ?? 0) + 1,
    });
    id = view.id;
    return `Added the view “${input.title}”`;
  });
  return viewOf(views, id);
}
