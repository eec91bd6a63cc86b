import type { NextFunction, Request, Response } from 'express';
import type { Logger } from '@masswright/logs';
import { requestIdOf } from './request-context';

/** One line a request: the route's pattern instead of its address, which may name things. Gives each request its id. */
export function logRequests(logger: Logger) {
  return (request: Request, response: Response, next: NextFunction): void => {
    const requestId = requestIdOf(request);
    const begunAt = performance.now();
    response.setHeader('X-Request-Id', requestId);
    response.once('close', () => {
      const route: unknown = (request as { route?: { path?: unknown } }).route?.path;
      logger.info({
        requestId,
        method: request.method,
        route: typeof route === 'string' ? route : 'unmatched',
        status: response.statusCode,
        durationMs: Math.round(performance.now() - begunAt),
        ...(response.writableFinished ? {} : { aborted: true }),
      });
    });
    next();
  };
}
