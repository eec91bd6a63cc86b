import { randomUUID } from 'node:crypto';
import { createParamDecorator, type ExecutionContext } from '@nestjs/common';
import type { Request } from 'express';
import { AppError } from './app-error';

/** What every service is told of the request, first of all. */
export interface RequestContext {
  requestId: string;
  /** The network address that attempts are counted by. */
  address: string;
  /** Hash of the session token that the browser sent, whether or not it stands. */
  sessionTokenHash: Buffer | undefined;
}

/** The request of somebody signed in. What they may do is read in the transaction that does it. */
export interface SignedInContext extends RequestContext {
  sessionId: string;
  userId: string;
  organisationId: string;
}

const contexts = new WeakMap<object, RequestContext | SignedInContext>();
const ids = new WeakMap<object, string>();

/** The id that runs through the request's log lines, its outbox rows and their jobs. */
export function requestIdOf(request: object): string {
  const known = ids.get(request);
  if (known !== undefined) return known;
  const id = randomUUID();
  ids.set(request, id);
  return id;
}

export function setContext(request: object, context: RequestContext | SignedInContext): void {
  contexts.set(request, context);
}

function contextOf(execution: ExecutionContext): RequestContext | SignedInContext {
  const context = contexts.get(execution.switchToHttp().getRequest<Request>());
  if (context === undefined) throw new Error('The session guard did not run.');
  return context;
}

/** The request's context, signed in or not: for public routes. */
export const Visitor = createParamDecorator((_: unknown, execution: ExecutionContext): RequestContext => contextOf(execution));

/** The context of somebody signed in. */
export const SignedIn = createParamDecorator((_: unknown, execution: ExecutionContext): SignedInContext => {
  const context = contextOf(execution);
  if (!('sessionId' in context)) throw new AppError('not-signed-in', 'Sign in first.');
  return context;
});
