import type { Session } from '@masswright/contracts';
import type { Membership, User } from '@masswright/drizzle';
import { mayCreateProject } from '../projects/project.policy';
import { mayManagePeople } from '../people/people.policy';
import { AppError } from '../platform/app-error';

export function presentSession(user: Pick<User, 'id' | 'name' | 'email'>, organisationId: string, memberships: readonly Membership[]): Session {
  const current = memberships.find((membership) => membership.organisationId === organisationId);
  if (current === undefined) throw new AppError('not-signed-in', 'You are no longer in this organisation. Sign in again.');
  return {
    user: { id: user.id, name: user.name, email: user.email },
    organisation: { id: current.organisationId, name: current.organisationName },
    role: current.role,
    organisations: memberships.map((membership) => ({ id: membership.organisationId, name: membership.organisationName, role: membership.role })),
    can: { managePeople: mayManagePeople(current), createProject: mayCreateProject(current) },
  };
}
