import { Button, HTMLSelect } from '@blueprintjs/core';
import { role as roleSchema, type Member } from '@masswright/contracts';
import { useState } from 'react';
import { ConfirmDialog } from '../../../components/confirm-dialog';
import { ProblemNotice } from '../../../components/problem-notice';
import { formatDay } from '../../../lib/format-time';
import { roleTexts } from '../../../lib/role-texts';
import { useChangeRole, useRemoveMember } from '../api/people';

interface MemberTableProps {
  members: readonly Member[];
  /** The reader of the page, who is told apart from the others. */
  ownUserId: string;
  organisationName: string;
}

export function MemberTable({ members, ownUserId, organisationName }: MemberTableProps) {
  const changeRole = useChangeRole();
  const remove = useRemoveMember();
  const [leaving, setLeaving] = useState<Member>();
  const anyRemovable = members.some((member) => member.can.remove);
  return (
    <>
      {changeRole.error && <ProblemNotice error={changeRole.error} />}
      <div className="table-frame" role="region" aria-label="Members" tabIndex={0}>
        <table className="table people-table">
          <thead>
            <tr>
              <th scope="col">Name</th>
              <th scope="col">E-mail</th>
              <th scope="col">Role</th>
              <th scope="col">Since</th>
              {anyRemovable && (
                <th scope="col">
                  <span className="hidden-visually">Removal</span>
                </th>
              )}
            </tr>
          </thead>
          <tbody>
            {members.map((member) => (
              <tr key={member.userId}>
                <th scope="row">
                  {member.name} {member.userId === ownUserId && <span className="soft">(you)</span>}
                </th>
                <td>{member.email}</td>
                <td>
                  {member.can.changeRole ? (
                    <HTMLSelect
                      aria-label={`Role of ${member.name}`}
                      value={member.role}
                      disabled={changeRole.isPending}
                      options={roleSchema.options.map((value) => ({ value, label: roleTexts[value].name }))}
                      onChange={(event) => changeRole.mutate({ userId: member.userId, role: roleSchema.parse(event.currentTarget.value) })}
                    />
                  ) : (
                    roleTexts[member.role].name
                  )}
                </td>
                <td className="soft">{formatDay(member.since)}</td>
                {anyRemovable && (
                  <td className="people-last">
                    {member.can.remove && (
                      <Button size="small" onClick={() => setLeaving(member)} aria-label={`Remove ${member.name}`}>
                        Remove
                      </Button>
                    )}
                  </td>
                )}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <ConfirmDialog
        title={leaving ? `Remove ${leaving.name}?` : ''}
        isOpen={leaving !== undefined}
        isBusy={remove.isPending}
        error={remove.error}
        confirmLabel="Remove"
        cancelLabel="Keep"
        onCancel={() => setLeaving(undefined)}
        onConfirm={() => leaving && remove.mutate(leaving.userId, { onSuccess: () => setLeaving(undefined) })}
      >
        <p>
          They are signed out of {organisationName} at once and see nothing of it any more. What they have made stays. To have them back, invite them again.
        </p>
      </ConfirmDialog>
    </>
  );
}
