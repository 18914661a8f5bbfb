import type { Context } from '../../context.ts';
import type { ChangeMe, Me } from '../../contract/sign-in.ts';
import { problem } from '../../middleware/problem.ts';
import { Account } from '../../models/Account.ts';
import { Membership } from '../../models/Membership.ts';
import { Studio } from '../../models/Studio.ts';
import { permissionsOf } from './policy.ts';

/** Who an account is in its studio. @throws Problem 401 where it has none, or none any more */
export async function readMe(ctx: Context, accountId: string): Promise<Me> {
  const account = await Account.query(ctx.knex).findById(accountId);
  const membership = await Membership.query(ctx.knex).findOne({ accountId });
  const studio = membership && (await Studio.query(ctx.knex).findById(membership.studioId));
  if (!account || !membership || !studio) throw problem(401, undefined, { code: 'no-staff' });
  return {
    account: { id: account.id, name: account.name, email: account.email, shortcuts: account.shortcuts },
    studio: { id: studio.id, name: studio.name, replyTo: studio.replyTo, timeZone: studio.timeZone, currency: studio.currency },
    role: membership.role,
    can: permissionsOf(membership),
    mailsPage: ctx.config.mailsPage ?? null,
  };
}

/** Changes the own name or shortcuts; what is not named stays. */
export async function changeMe(ctx: Context, accountId: string, change: ChangeMe): Promise<Me> {
  if (Object.keys(change).length > 0) await Account.query(ctx.knex).findById(accountId).patch(change);
  return readMe(ctx, accountId);
}
