import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import type { Response } from 'express';
import type { Session, SignInRequest, SignUpRequest } from '@masswright/contracts';
import { Database, findUser, findUserByEmail, insertMembership, insertOrganisation, insertUser, listMemberships, moveSession, recordAudit, type User } from '@masswright/drizzle';
import { AppError } from '../platform/app-error';
import { attemptLimits, AttemptLimits } from '../platform/attempt-limits';
import type { RequestContext, SignedInContext } from '../platform/request-context';
import { Passwords } from './passwords';
import { clearSessionCookie } from './session-cookie';
import { presentSession } from './session.presenter';
import { Sessions } from './sessions';

const wrongPair = () => new AppError('not-signed-in', 'The e-mail address or the password is wrong.');

@Injectable()
export class SessionService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(Passwords) private readonly passwords: Passwords,
    @Inject(Sessions) private readonly sessions: Sessions,
    @Inject(AttemptLimits) private readonly attempts: AttemptLimits,
  ) {}

  /** Makes a person and their organisation, of which they are the administrator, and signs them in. */
  async signUp(context: RequestContext, request: SignUpRequest, response: Response): Promise<Session> {
    await this.attempts.count(attemptLimits.signUpFromAddress, context.address);
    const user: User = { id: randomUUID(), email: request.email, name: request.name, passwordHash: await this.passwords.hash(request.password) };
    const organisation = { id: randomUUID(), name: request.organisationName };
    const scope = { organisationId: organisation.id, userId: user.id, email: user.email };
    const { token, memberships } = await this.database.transaction(scope, async (tx) => {
      if ((await findUserByEmail(tx, user.email)) !== undefined) {
        throw new AppError('conflict', 'This e-mail address has an account already. Sign in, or set a new password.', {
          fields: [{ path: 'email', message: 'This address has an account already.' }],
        });
      }
      await insertUser(tx, user);
      await insertOrganisation(tx, organisation);
      await insertMembership(tx, { organisationId: organisation.id, userId: user.id, role: 'administrator' });
      await recordAudit(tx, {
        organisationId: organisation.id,
        actorId: user.id,
        action: 'organisation.create',
        subject: { type: 'organisation', id: organisation.id },
        after: { name: organisation.name },
        requestId: context.requestId,
      });
      return { token: await this.sessions.begin(tx, { userId: user.id, organisationId: organisation.id }), memberships: await listMemberships(tx, user.id) };
    });
    await this.endFormer(context);
    this.sessions.handOver(response, token);
    return presentSession(user, organisation.id, memberships);
  }

  /** An unknown address and a wrong password take the same time and get the same answer. */
  async signIn(context: RequestContext, request: SignInRequest, response: Response): Promise<Session> {
    await this.attempts.count(attemptLimits.signInFromAddress, context.address);
    await this.attempts.count(attemptLimits.signInOfAccount, request.email);
    const user = await this.database.transaction({ email: request.email }, (tx) => findUserByEmail(tx, request.email));
    if (!(await this.passwords.verify(user?.passwordHash, request.password)) || user === undefined) throw wrongPair();
    await this.attempts.clear(attemptLimits.signInOfAccount, request.email);
    await this.attempts.forgive(attemptLimits.signInFromAddress, context.address);
    return this.beginFor(context, user, undefined, response);
  }

  /** Signs a person in whose identity is proved, into the organisation asked for or their first. */
  async beginFor(context: RequestContext, user: User, organisationId: string | undefined, response: Response): Promise<Session> {
    const memberships = await this.database.transaction({ userId: user.id }, (tx) => listMemberships(tx, user.id));
    const chosen = memberships.find((membership) => organisationId === undefined || membership.organisationId === organisationId);
    if (chosen === undefined) {
      throw new AppError('forbidden', 'Your account is in no organisation any more. Ask an administrator of yours for an invitation.');
    }
    const scope = { userId: user.id, organisationId: chosen.organisationId };
    const token = await this.database.transaction(scope, async (tx) => {
      const begun = await this.sessions.begin(tx, scope);
      await recordAudit(tx, { ...scope, actorId: user.id, action: 'session.begin', subject: { type: 'user', id: user.id }, requestId: context.requestId });
      return begun;
    });
    await this.endFormer(context);
    this.sessions.handOver(response, token);
    return presentSession(user, chosen.organisationId, memberships);
  }

  /** Signing out twice is no error. */
  async signOut(context: RequestContext, response: Response): Promise<void> {
    await this.endFormer(context);
    clearSessionCookie(response);
  }

  async describe(context: SignedInContext): Promise<Session> {
    const { userId, organisationId } = context;
    return this.database.transaction({ userId }, async (tx) => {
      const user = await findUser(tx, userId);
      if (user === undefined) throw new AppError('not-signed-in', 'This account is gone.');
      return presentSession(user, organisationId, await listMemberships(tx, userId));
    });
  }

  async switchOrganisation(context: SignedInContext, organisationId: string): Promise<Session> {
    const { userId, sessionId } = context;
    return this.database.transaction({ userId, organisationId }, async (tx) => {
      const user = await findUser(tx, userId);
      const memberships = await listMemberships(tx, userId);
      if (user === undefined || !memberships.some((membership) => membership.organisationId === organisationId)) {
        throw new AppError('not-found', 'You are not in that organisation.');
      }
      await moveSession(tx, sessionId, organisationId);
      await recordAudit(tx, { organisationId, actorId: userId, action: 'session.switch', subject: { type: 'user', id: userId }, requestId: context.requestId });
      return presentSession(user, organisationId, memberships);
    });
  }

  /** The token is rotated at every sign-in: the one that the browser had ends. */
  private async endFormer(context: RequestContext): Promise<void> {
    if (context.sessionTokenHash !== undefined) await this.sessions.end(context.sessionTokenHash, context.requestId);
  }
}
