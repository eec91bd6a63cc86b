import type { Invitation } from '@masswright/contracts';
import type { InvitationRow } from '@masswright/drizzle';

export function presentInvitation(row: InvitationRow): Invitation {
  return {
    id: row.id,
    email: row.email,
    role: row.role,
    invitedBy: row.invitedByName,
    createdAt: row.createdAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
    state: row.expiresAt.getTime() > Date.now() ? 'open' : 'expired',
  };
}
