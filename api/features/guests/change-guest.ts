import type { Context } from '../../context.ts';
import type { ChangeGuest, Guest } from '../../contract/guests.ts';
import type { GuestActor } from '../../middleware/actor.ts';
import { Account } from '../../models/Account.ts';

/** The guest at this browser. */
export async function readGuest(ctx: Context, actor: GuestActor): Promise<Guest> {
  const account = await Account.query(ctx.knex).findById(actor.accountId).throwIfNotFound();
  return { accountId: account.id, name: account.name, email: account.email, shortcuts: account.shortcuts };
}

/** Changes how the guest is called from now on; what a studio wrote on its invitations stays. */
export async function changeGuest(ctx: Context, actor: GuestActor, change: ChangeGuest): Promise<Guest> {
  if (Object.keys(change).length > 0) await Account.query(ctx.knex).findById(actor.accountId).patch(change);
  return readGuest(ctx, actor);
}
