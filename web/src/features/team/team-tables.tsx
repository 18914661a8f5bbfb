import type { Team, TeamInvitation, TeamMember } from '../../../../api/contract/team.ts';
import { formatAge, formatDay, formatTime } from '../../lib/dates.ts';
import { Button } from '../../ui/button.tsx';
import { DataTable } from '../../ui/data-table.tsx';

const ROLES = { owner: 'Owner', assistant: 'Assistant' } as const;

/** The people of the studio, the owner first. */
export function MembersTable({ members, onRemove }: { members: TeamMember[]; onRemove: (member: TeamMember) => void }) {
  return (
    <DataTable
      caption="People of the studio"
      rows={members}
      rowKey={(row) => row.accountId}
      columns={[
        {
          key: 'name',
          words: 'Name',
          cell: (row) => (
            <>
              <b>{row.name}</b>
              {row.isMe ? ' (you)' : ''}
              <span className="block text-13 wrap-anywhere text-mute">{row.email}</span>
            </>
          ),
        },
        { key: 'role', words: 'Role', width: '112px', cell: (row) => ROLES[row.role] },
        { key: 'since', words: 'Since', width: '128px', cell: (row) => formatDay(row.since) },
        {
          key: 'do',
          words: 'Action',
          width: '224px',
          align: 'right',
          cell: (row) =>
            row.can.remove ? (
              <Button size="small" tone="danger" aria-label={`Remove ${row.name}`} onClick={() => onRemove(row)}>
                Remove
              </Button>
            ) : null,
        },
      ]}
    />
  );
}

interface InvitationsProps {
  invitations: Team['invitations'];
  /** The invitation something is being done to. */
  busyId: string | undefined;
  onSendAgain: (invitation: TeamInvitation) => void;
  onWithdraw: (invitation: TeamInvitation) => void;
}

/** Who was invited and has not come yet. */
export function InvitationsTable({ invitations, busyId, onSendAgain, onWithdraw }: InvitationsProps) {
  return (
    <DataTable
      caption="Open invitations"
      rows={invitations}
      rowKey={(row) => row.id}
      columns={[
        {
          key: 'name',
          words: 'Name',
          cell: (row) => (
            <>
              <b>{row.name}</b>
              <span className="block text-13 wrap-anywhere text-mute">{row.email}</span>
            </>
          ),
        },
        { key: 'invited', words: 'Invited', width: '112px', cell: (row) => formatAge(row.invitedAt) },
        {
          key: 'state',
          words: 'Link',
          width: '128px',
          cell: (row) =>
            row.state === 'open' ? `until ${formatTime(row.expiresAt)}` : <b className="text-copper">Expired, send it again</b>,
        },
        {
          key: 'do',
          words: 'Action',
          width: '224px',
          align: 'right',
          cell: (row) => (
            <span className="inline-flex flex-wrap justify-end gap-2">
              <Button size="small" busy={busyId === row.id} aria-label={`Send again to ${row.name}`} onClick={() => onSendAgain(row)}>
                Send again
              </Button>
              <Button size="small" tone="danger" aria-label={`Withdraw the invitation of ${row.name}`} onClick={() => onWithdraw(row)}>
                Withdraw
              </Button>
            </span>
          ),
        },
      ]}
    />
  );
}
