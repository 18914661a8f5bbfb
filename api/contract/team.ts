import { z } from 'zod';
import type { Operation } from './operation.ts';
import { EmailAddress, NameLine } from './person.ts';

export const TeamMember = z.object({
  accountId: z.uuid(),
  name: z.string(),
  email: z.string(),
  role: z.enum(['owner', 'assistant']),
  since: z.iso.datetime(),
  isMe: z.boolean(),
  can: z.object({ remove: z.boolean() }),
});
export type TeamMember = z.infer<typeof TeamMember>;

export const TeamInvitation = z.object({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  invitedAt: z.iso.datetime(),
  expiresAt: z.iso.datetime(),
  /** open: the link works; expired: send it again. */
  state: z.enum(['open', 'expired']),
});
export type TeamInvitation = z.infer<typeof TeamInvitation>;

/** The people of the studio, the owner first, and who was invited and has not come yet. */
export const Team = z.object({ members: z.array(TeamMember), invitations: z.array(TeamInvitation) });
export type Team = z.infer<typeof Team>;

export const InviteAssistant = z.object({ name: NameLine, email: EmailAddress });
export type InviteAssistant = z.infer<typeof InviteAssistant>;

const invitation = '/api/team/invitations/{invitationId}';

export const teamOperations: Operation[] = [
  { method: 'get', path: '/api/team', summary: 'The people of the studio and open invitations', who: 'owner', answer: Team },
  {
    method: 'post',
    path: '/api/team/invitations',
    summary: 'Invite an assistant by mail',
    who: 'owner',
    body: InviteAssistant,
    answer: Team,
    status: 201,
  },
  { method: 'post', path: `${invitation}/send-again`, summary: 'Send the invitation again, with a new link', who: 'owner', answer: Team },
  { method: 'delete', path: invitation, summary: 'Withdraw an invitation', who: 'owner', answer: Team },
  {
    method: 'delete',
    path: '/api/team/members/{accountId}',
    summary: 'Remove an assistant; their sessions end at once',
    who: 'owner',
    answer: Team,
  },
  { method: 'post', path: '/api/team/leave', summary: 'Leave the studio, as an assistant', who: 'staff', status: 204 },
];
