import type { Team } from '../../contract/team.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { AccountToken } from '../../models/AccountToken.ts';
import { mayRemove } from './policy.ts';

interface MemberRow {
  accountId: string;
  name: string;
  email: string;
  role: 'owner' | 'assistant';
  since: Date;
}

/** The people of the studio, the owner first, and the invitations nobody has followed yet. */
export async function readTeam(ctx: Context, actor: StaffActor): Promise<Team> {
  const members = await ctx
    .knex('memberships')
    .join('accounts', 'accounts.id', 'memberships.accountId')
    .where('memberships.studioId', actor.studioId)
    .orderBy([{ column: 'memberships.role', order: 'desc' }, { column: 'memberships.createdAt' }])
    .select<MemberRow[]>('memberships.accountId', 'accounts.name', 'accounts.email', 'memberships.role', 'memberships.createdAt as since');
  const invitations = await AccountToken.query(ctx.knex)
    .where({ purpose: 'join-studio', studioId: actor.studioId })
    .whereNull('usedAt')
    .orderBy('createdAt', 'desc');
  const now = new Date();
  return {
    members: members.map((member) => ({
      ...member,
      since: member.since.toISOString(),
      isMe: member.accountId === actor.accountId,
      can: { remove: mayRemove(actor, member) },
    })),
    invitations: invitations.map((row) => ({
      id: row.id,
      name: row.name ?? '',
      email: row.email,
      invitedAt: row.createdAt.toISOString(),
      expiresAt: row.expiresAt.toISOString(),
      state: row.expiresAt > now ? 'open' : 'expired',
    })),
  };
}
