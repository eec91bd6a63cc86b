import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import type { Accepted } from '@masswright/contracts';
import {
  addToOutbox,
  Database,
  deleteSessionsOfUser,
  findPasswordResetByToken,
  recordAudit,
  setPasswordHash,
  usePasswordReset,
} from '@masswright/drizzle';
import { hashToken } from '@masswright/jobs';
import { AppError } from '../platform/app-error';
import { attemptLimits, AttemptLimits } from '../platform/attempt-limits';
import type { RequestContext } from '../platform/request-context';
import { Passwords } from '../session/passwords';

const expired = () => new AppError('link-expired', 'This link no longer works: it was used or is more than an hour old. Ask for a new one.');

@Injectable()
export class PasswordResetsService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(Passwords) private readonly passwords: Passwords,
    @Inject(AttemptLimits) private readonly attempts: AttemptLimits,
  ) {}

  /** Says the same whether or not the address has an account; only a mail tells. */
  async request(context: RequestContext, email: string): Promise<Accepted> {
    await this.attempts.count(attemptLimits.passwordResetFromAddress, context.address);
    await this.attempts.count(attemptLimits.passwordResetOfAccount, email);
    // Whether there is an account is looked up by the worker: here the same is done for everybody, in the same time.
    await this.database.transaction({}, (tx) =>
      addToOutbox(tx, { organisationId: null, job: 'mail.send', payload: { mail: 'password-reset', email, passwordResetId: randomUUID() }, requestId: context.requestId }),
    );
    return { message: 'If this address has an account, a mail with a link is on its way. The link works for an hour.' };
  }

  /** Sets the new password and ends every session of the person, wherever it is. */
  async complete(context: RequestContext, request: { token: string; password: string }): Promise<void> {
    await this.attempts.count(attemptLimits.linkFromAddress, context.address);
    const tokenHash = hashToken(request.token);
    const reset = await this.database.transaction({ tokenHash }, (tx) => findPasswordResetByToken(tx, tokenHash));
    if (reset === undefined) throw expired();
    const passwordHash = await this.passwords.hash(request.password);
    await this.database.transaction({ userId: reset.userId }, async (tx) => {
      if (!(await usePasswordReset(tx, reset))) throw expired();
      await setPasswordHash(tx, reset.userId, passwordHash);
      await deleteSessionsOfUser(tx, reset.userId);
      await recordAudit(tx, { organisationId: null, actorId: reset.userId, action: 'password-reset.complete', subject: { type: 'user', id: reset.userId }, requestId: context.requestId });
    });
    await this.attempts.forgive(attemptLimits.linkFromAddress, context.address);
  }
}
