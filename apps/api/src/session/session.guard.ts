import { Inject, Injectable, SetMetadata, type CanActivate, type ExecutionContext } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import type { Request } from 'express';
import { hashToken } from '@masswright/jobs';
import { AppError } from '../platform/app-error';
import { requestIdOf, setContext, type RequestContext } from '../platform/request-context';
import { readSessionToken } from './session-cookie';
import { Sessions } from './sessions';

const isPublic = Symbol('public route');
/** Marks a route that needs no session. Every other route does. */
export const Public = () => SetMetadata(isPublic, true);

/** Finds out who asks, before anything else runs; who isn't signed in gets no further than the public routes. */
@Injectable()
export class SessionGuard implements CanActivate {
  constructor(
    @Inject(Reflector) private readonly reflector: Reflector,
    @Inject(Sessions) private readonly sessions: Sessions,
  ) {}

  async canActivate(execution: ExecutionContext): Promise<boolean> {
    const request = execution.switchToHttp().getRequest<Request>();
    const token = readSessionToken(request);
    const visitor: RequestContext = {
      requestId: requestIdOf(request),
      address: request.ip ?? 'unknown',
      sessionTokenHash: token === undefined ? undefined : hashToken(token),
    };
    if (this.reflector.getAllAndOverride<boolean | undefined>(isPublic, [execution.getHandler(), execution.getClass()]) === true) {
      setContext(request, visitor);
      return true;
    }
    const session = visitor.sessionTokenHash === undefined ? undefined : await this.sessions.find(visitor.sessionTokenHash);
    if (session === undefined) throw new AppError('not-signed-in', 'You are not signed in, or your session has ended. Sign in again.');
    setContext(request, { ...visitor, sessionId: session.id, userId: session.userId, organisationId: session.organisationId });
    return true;
  }
}
