import { raw } from 'objection';
import type { ChangeView, View as ViewAnswer } from '../../contract/commissions.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { View } from '../../models/View.ts';
import { changeViews, viewOf } from './change-views.ts';

/** Changes the words of the version of a view the person saw. @throws Problem 404, 409, 412 */
export async function changeView(
  ctx: Context,
  actor: StaffActor,
  input: ChangeView & { commissionId: string; viewId: string; version: number },
): Promise<ViewAnswer> {
  const { commissionId, viewId, version, ...words } = input;
  const views = await changeViews(ctx, actor, commissionId, async (trx) => {
    const view = await View.within(actor, trx).findOne({ id: viewId, commissionId });
    if (!view) throw problem(404);
    if (view.version !== version) throw problem(412);
    await view.$query(trx).patch({ ...words, version: raw('version + 1') });
    return `Changed the view “${words.title ?? view.title}”`;
  });
  return viewOf(views, viewId);
}
