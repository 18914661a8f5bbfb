import { useState } from 'react';
import type { Team, TeamInvitation, TeamMember } from '../../../../api/contract/team.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { EmptyState } from '../../ui/empty-state.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { InviteDialog } from './invite-dialog.tsx';
import { useTeamDeed } from './queries.ts';
import { InvitationsTable, MembersTable } from './team-tables.tsx';

type Asks = { what: 'remove'; member: TeamMember } | { what: 'withdraw'; invitation: TeamInvitation };

/** The team and what its owner can do with it. */
export function TeamView({ team }: { team: Team }) {
  const deed = useTeamDeed();
  const [inviting, setInviting] = useState(false);
  const [asks, setAsks] = useState<Asks | null>(null);
  const sendAgain = ({ id, name }: TeamInvitation) =>
    deed.mutate(
      { what: 'send-again', invitationId: id },
      {
        onSuccess: () => showNotice(`A new link is on its way to ${name}. The older one no longer works.`),
        onError: (error) => showNotice(error.message, { tone: 'problem' }),
      },
    );
  return (
    <div className="max-w-4xl">
      <MembersTable members={team.members} onRemove={(member) => setAsks({ what: 'remove', member })} />
      <div className="mt-8 mb-3 flex flex-wrap items-center justify-between gap-3">
        <h2 className="text-22">Invitations</h2>
        <Button tone="first" onClick={() => setInviting(true)}>
          Invite an assistant
        </Button>
      </div>
      {team.invitations.length === 0 ? (
        <EmptyState title="Nobody is invited">Whoever you invite stands here until they have joined.</EmptyState>
      ) : (
        <InvitationsTable
          invitations={team.invitations}
          busyId={deed.isPending && deed.variables.what === 'send-again' ? deed.variables.invitationId : undefined}
          onSendAgain={sendAgain}
          onWithdraw={(invitation) => setAsks({ what: 'withdraw', invitation })}
        />
      )}
      <InviteDialog
        open={inviting}
        onClose={() => setInviting(false)}
        onInvite={async (input) => {
          await deed.mutateAsync({ what: 'invite', input });
          showNotice(`The invitation is on its way to ${input.name}.`);
        }}
      />
      <AskFirst asks={asks} deed={deed} onClose={() => setAsks(null)} />
    </div>
  );
}

function AskFirst({ asks, deed, onClose }: { asks: Asks | null; deed: ReturnType<typeof useTeamDeed>; onClose: () => void }) {
  const close = () => {
    deed.reset();
    onClose();
  };
  const name = asks ? (asks.what === 'remove' ? asks.member.name : asks.invitation.name) : '';
  const go = () => {
    if (!asks) return;
    const wish =
      asks.what === 'remove'
        ? ({ what: 'remove', accountId: asks.member.accountId } as const)
        : ({ what: 'withdraw', invitationId: asks.invitation.id } as const);
    deed.mutate(wish, { onSuccess: close });
  };
  return (
    <ConfirmDialog
      open={asks !== null}
      title={asks?.what === 'remove' ? `Remove ${name}?` : `Withdraw the invitation of ${name}?`}
      confirm={asks?.what === 'remove' ? `Remove ${name}` : 'Withdraw the invitation'}
      busy={deed.isPending}
      error={deed.error?.message}
      onConfirm={go}
      onClose={close}
    >
      {asks?.what === 'remove'
        ? 'They are signed out everywhere at once and can see nothing of the studio any more. What they did stays. You can invite them again.'
        : 'The link in the mail stops working at once. You can invite them again.'}
    </ConfirmDialog>
  );
}
