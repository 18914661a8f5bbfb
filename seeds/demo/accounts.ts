import type { Context } from '../../api/context.ts';
import { confirmEmail } from '../../api/features/sign-in/confirm-email.ts';
import { signUp } from '../../api/features/sign-in/sign-up.ts';
import { inviteAssistant } from '../../api/features/team/invite-assistant.ts';
import { joinStudio } from '../../api/features/team/join-studio.ts';
import type { GuestActor, StaffActor } from '../../api/middleware/actor.ts';
import { Account } from '../../api/models/Account.ts';
import { Membership } from '../../api/models/Membership.ts';
import { mailedToken } from './mailed-token.ts';
import { type Person, studio } from './people.ts';

/** Signs the studio up and confirms the owner's address, as a person does by the link in the mail. */
export async function openStudio(ctx: Context, password: string): Promise<StaffActor> {
  const { name, email } = studio.owner;
  const token = await mailedToken(ctx, email, (within) =>
    signUp(within, { studioName: studio.name, name, email, password, timeZone: 'Europe/London' }),
  );
  return staffActor(await confirmEmail(ctx, { token, password }));
}

/** Invites the assistant, who joins. */
export async function bringAssistant(ctx: Context, owner: StaffActor, password: string): Promise<StaffActor> {
  const { name, email } = studio.assistant;
  const token = await mailedToken(ctx, email, (within) => inviteAssistant(within, owner, { name, email }));
  return staffActor(await joinStudio(ctx, { token, name, password }));
}

async function staffActor(accountId: string): Promise<StaffActor> {
  const account = await Account.query().findById(accountId).throwIfNotFound();
  const { studioId, role } = await Membership.query().findOne({ accountId }).throwIfNotFound();
  return { kind: 'staff', accountId, name: account.name, email: account.email, sessionId: 'demo', studioId, role };
}

/** A guest as the guest's own session would show them. */
export async function guestActor({ email }: Person): Promise<GuestActor> {
  const account = await Account.query().findOne({ email }).throwIfNotFound();
  return { kind: 'guest', accountId: account.id, name: account.name, email, sessionId: 'demo' };
}
