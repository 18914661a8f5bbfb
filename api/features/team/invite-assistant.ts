import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import type { InviteAssistant } from '../../contract/team.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { AccountToken } from '../../models/AccountToken.ts';
import { Membership } from '../../models/Membership.ts';
import { Studio } from '../../models/Studio.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { issueToken } from '../sign-in/account-tokens.ts';
import { joinStudioMail } from './join-studio.mail.ts';

/** Who is there already, and invited, at most: a studio is not a mailing list. */
const MOST = 100;

/**
 * Invites an assistant by mail. An invitation of the same address takes the place of an older one. Whether the address has an account
 * elsewhere is not told; the link says so to its holder.
 * @throws Problem 422 where the person works here already
 */
export async function inviteAssistant(ctx: Context, actor: StaffActor, { email, name }: InviteAssistant): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const studio = await lockStudio(trx, actor);
    const here = await Membership.query(trx)
      .join('accounts', 'accounts.id', 'memberships.accountId')
      .where({ 'memberships.studioId': studio.id, 'accounts.email': email })
      .resultSize();
    if (here > 0) throw invalid([{ path: 'email', message: 'This person works here already.' }]);
    await openInvitations(trx, studio.id).where({ email }).delete();
    if ((await openInvitations(trx, studio.id).resultSize()) >= MOST)
      throw problem(409, `At most ${MOST} invitations can be open at once.`);
    await invite(ctx, trx, actor, studio, { email, name });
    await addToRecord(trx, { studioId: studio.id, actor, did: 'team.invited', says: `Invited ${name} as an assistant`, about: { email } });
  });
}

/** Sends an invitation again under a new link; the older one stops working. @throws Problem 404 */
export async function sendInvitationAgain(ctx: Context, actor: StaffActor, invitationId: string): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const studio = await lockStudio(trx, actor);
    const [older] = await openInvitations(trx, studio.id).where({ id: invitationId }).delete().returning('*');
    if (!older) throw problem(404);
    const { email, name } = older;
    await invite(ctx, trx, actor, studio, { email, name: name ?? email });
    await addToRecord(trx, { studioId: studio.id, actor, did: 'team.invited', says: `Invited ${name ?? email} again`, about: { email } });
  });
}

/** Takes an invitation back; its link leads nowhere from then on. @throws Problem 404 */
export async function withdrawInvitation(ctx: Context, actor: StaffActor, invitationId: string): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const [gone] = await openInvitations(trx, actor.studioId).where({ id: invitationId }).delete().returning('*');
    if (!gone) throw problem(404);
    const who = gone.name ?? gone.email;
    await addToRecord(trx, { studioId: actor.studioId, actor, did: 'team.uninvited', says: `Withdrew the invitation of ${who}` });
  });
}

function openInvitations(trx: Transaction, studioId: string) {
  return AccountToken.query(trx).where({ purpose: 'join-studio', studioId }).whereNull('usedAt');
}

/** One invitation at a time: two of the same address at once would both stay. */
async function lockStudio(trx: Transaction, actor: StaffActor): Promise<Studio> {
  return Studio.query(trx).findById(actor.studioId).forUpdate().throwIfNotFound();
}

async function invite(ctx: Context, trx: Transaction, actor: StaffActor, studio: Studio, to: InviteAssistant): Promise<void> {
  const issued = await issueToken(trx, { purpose: 'join-studio', ...to, studioId: studio.id, createdBy: actor.accountId });
  await queueMail(trx, {
    studioId: studio.id,
    kind: 'join-studio',
    to: { address: to.email, name: to.name },
    fromName: studio.name,
    replyTo: studio.replyTo,
    ...joinStudioMail({
      by: actor.name,
      name: to.name,
      studio,
      address: `${ctx.config.address}/join/${issued.token}`,
      until: issued.expiresAt,
    }),
  });
}
