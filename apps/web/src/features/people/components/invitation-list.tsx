import { Button } from '@blueprintjs/core';
import type { Invitation } from '@masswright/contracts';
import { ProblemNotice } from '../../../components/problem-notice';
import { StatusTag } from '../../../components/status-tag';
import { formatDay } from '../../../lib/format-time';
import { roleTexts } from '../../../lib/role-texts';
import { useWithdrawInvitation } from '../api/people';

export function InvitationList({ invitations }: { invitations: readonly Invitation[] }) {
  const withdraw = useWithdrawInvitation();
  if (invitations.length === 0) return <p className="soft">No invitation is open.</p>;
  return (
    <>
      {withdraw.error && <ProblemNotice error={withdraw.error} />}
      <ul className="invitation-list">
        {invitations.map((invitation) => (
          <li key={invitation.id}>
            <div>
              <b>{invitation.email}</b>
              <p className="soft">
                {roleTexts[invitation.role].name}, invited by {invitation.invitedBy} on {formatDay(invitation.createdAt)}
              </p>
            </div>
            {invitation.state === 'expired' ? (
              <StatusTag tone="doubt">Expired, invite again</StatusTag>
            ) : (
              <span className="soft">good until {formatDay(invitation.expiresAt)}</span>
            )}
            <Button
              size="small"
              aria-label={`Withdraw the invitation of ${invitation.email}`}
              loading={withdraw.isPending && withdraw.variables === invitation.id}
              onClick={() => withdraw.mutate(invitation.id)}
            >
              Withdraw
            </Button>
          </li>
        ))}
      </ul>
    </>
  );
}
