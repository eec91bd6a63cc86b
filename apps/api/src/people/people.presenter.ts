import type { Member } from '@masswright/contracts';
import type { MemberRow } from '@masswright/drizzle';
import type { Actor } from '../platform/work';
import { isLastAdministrator, mayManagePeople } from './people.policy';

export function presentMember(row: MemberRow, actor: Pick<Actor, 'role'>, administrators: number): Member {
  const mayManage = mayManagePeople(actor) && !isLastAdministrator(row, administrators);
  return {
    userId: row.userId,
    name: row.name,
    email: row.email,
    role: row.role,
    since: row.createdAt.toISOString(),
    can: { changeRole: mayManage, remove: mayManage },
  };
}
