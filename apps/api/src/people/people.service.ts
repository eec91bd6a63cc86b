import { Inject, Injectable } from '@nestjs/common';
import { z } from 'zod';
import type { Member, Page, PageQuery, Role } from '@masswright/contracts';
import { countAdministrators, deleteMembership, findMember, listMembers, lockAdministrators, publishEvent, setRole, withdrawInvitations, type Transaction } from '@masswright/drizzle';
import { notFound } from '../platform/app-error';
import { decodeCursor, toPage } from '../platform/cursor';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work } from '../platform/work';
import { requireNotLastAdministrator, requireManagePeople } from './people.policy';
import { presentMember } from './people.presenter';

@Injectable()
export class PeopleService {
  constructor(@Inject(Work) private readonly work: Work) {}

  list(context: SignedInContext, query: PageQuery): Promise<Page<Member>> {
    const after = decodeCursor(z.tuple([z.string()]), query.after);
    return this.work.run(context, async (tx, actor) => {
      const rows = await listMembers(tx, { afterEmail: after?.[0], limit: query.limit + 1 });
      const administrators = await countAdministrators(tx, context.organisationId);
      return toPage(rows, query.limit, (row) => presentMember(row, actor, administrators), (row) => [row.email]);
    });
  }

  changeRole(context: SignedInContext, userId: string, role: Role): Promise<Member> {
    return this.work.run(context, async (tx, actor) => {
      requireManagePeople(actor);
      const { organisationId } = context;
      const administrators = await this.lock(tx, context);
      const member = await findMember(tx, organisationId, userId);
      if (member === undefined) throw notFound('person');
      if (role !== 'administrator') requireNotLastAdministrator(member, administrators);
      if (member.role !== role) {
        await setRole(tx, organisationId, userId, role);
        if (role !== 'administrator') await withdrawInvitations(tx, { invitedBy: userId });
        await audit(tx, context, { action: 'member.change-role', subject: { type: 'user', id: userId }, before: { role: member.role }, after: { role } });
        await publishEvent(tx, { organisationId, event: { type: 'people' } });
      }
      // Who lowers their own role sees at once what they may still do.
      return presentMember({ ...member, role }, userId === actor.userId ? { ...actor, role } : actor, await countAdministrators(tx, organisationId));
    });
  }

  remove(context: SignedInContext, userId: string): Promise<void> {
    return this.work.run(context, async (tx, actor) => {
      requireManagePeople(actor);
      const { organisationId } = context;
      const administrators = await this.lock(tx, context);
      const member = await findMember(tx, organisationId, userId);
      if (member === undefined) throw notFound('person');
      requireNotLastAdministrator(member, administrators);
      // What they had offered to others, or to themselves under another address, goes with them.
      await withdrawInvitations(tx, { invitedBy: userId });
      await deleteMembership(tx, organisationId, userId);
      await audit(tx, context, { action: 'member.remove', subject: { type: 'user', id: userId }, before: { role: member.role } });
      await publishEvent(tx, { organisationId, event: { type: 'people' } });
    });
  }

  /** Waits for others who change administrators, then looks again whether the person still is one: they may have been removed meanwhile. */
  private async lock(tx: Transaction, { organisationId, userId }: SignedInContext): Promise<number> {
    const administrators = await lockAdministrators(tx, organisationId);
    const self = await findMember(tx, organisationId, userId);
    if (self === undefined) throw notFound('person');
    requireManagePeople(self);
    return administrators;
  }
}
