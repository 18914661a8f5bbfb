import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { InviteAssistant, Team } from '../../../../api/contract/team.ts';
import { api } from '../../lib/api.ts';

export const teamKey = ['team'] as const;

export const teamQuery = queryOptions({ queryKey: teamKey, queryFn: ({ signal }) => api.get<Team>('/api/team', { signal }) });

/** What the owner does to the team. Every answer is the team as it then is. */
export type TeamDeed =
  | { what: 'invite'; input: InviteAssistant }
  | { what: 'send-again' | 'withdraw'; invitationId: string }
  | { what: 'remove'; accountId: string };

function request(deed: TeamDeed): Promise<Team> {
  switch (deed.what) {
    case 'invite':
      return api.post('/api/team/invitations', deed.input);
    case 'send-again':
      return api.post(`/api/team/invitations/${deed.invitationId}/send-again`);
    case 'withdraw':
      return api.delete(`/api/team/invitations/${deed.invitationId}`);
    case 'remove':
      return api.delete(`/api/team/members/${deed.accountId}`);
  }
}

export function useTeamDeed() {
  const queries = useQueryClient();
  return useMutation({
    mutationFn: request,
    onSuccess: (team) => {
      queries.setQueryData(teamKey, team);
      void queries.invalidateQueries({ queryKey: ['mails'] });
    },
  });
}
