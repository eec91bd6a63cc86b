import { Inject, Injectable } from '@nestjs/common';
import type { Role } from '@masswright/contracts';
import { Database, findMember, recordAudit, type Transaction } from '@masswright/drizzle';
import { AppError } from './app-error';
import type { SignedInContext } from './request-context';

/** Who acts, as the database says in the very transaction of the act. */
export interface Actor {
  userId: string;
  organisationId: string;
  role: Role;
  name: string;
}

/** Runs what somebody signed in asks for: one transaction in their organisation, in which their role is read first. */
@Injectable()
export class Work {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** `email` opens the account of that address too, for work that concerns somebody who may not be in the organisation. */
  run<Result>(context: SignedInContext, work: (tx: Transaction, actor: Actor) => Promise<Result>, email?: string): Promise<Result> {
    const { organisationId, userId } = context;
    return this.database.transaction({ organisationId, userId, email }, async (tx) => {
      const member = await findMember(tx, organisationId, userId);
      if (member === undefined) throw new AppError('not-signed-in', 'You are no longer in this organisation.');
      return work(tx, { organisationId, userId, role: member.role, name: member.name });
    });
  }
}

/** Notes what an actor did, in the transaction in which they do it. */
export function audit(
  tx: Transaction,
  context: SignedInContext,
  entry: { action: string; subject: { type: string; id: string }; before?: unknown; after?: unknown },
): Promise<void> {
  return recordAudit(tx, { ...entry, organisationId: context.organisationId, actorId: context.userId, requestId: context.requestId });
}
