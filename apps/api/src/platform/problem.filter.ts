import { Catch, HttpException, type ArgumentsHost, type ExceptionFilter } from '@nestjs/common';
import type { Request, Response } from 'express';
import type { Logger } from '@masswright/logs';
import { AppError } from './app-error';
import { toProblem } from './problems';
import { requestIdOf } from './request-context';

/** What the framework itself refuses: unknown routes, unreadable or oversized bodies. */
function fromFramework(error: unknown): unknown {
  const status = error instanceof HttpException ? error.getStatus() : statusOfBodyParser(error);
  if (status === undefined) return error;
  if (status === 404) return new AppError('not-found', 'There is nothing at this address.');
  if (status === 413) return new AppError('too-large', 'The request is larger than the api takes. Files go to the storage in parts.');
  if (status < 500) return new AppError('bad-request', 'The request cannot be read: its body is not JSON as the api document describes it.');
  return error;
}

function statusOfBodyParser(error: unknown): number | undefined {
  if (!(error instanceof Error) || !('status' in error) || !('type' in error)) return undefined;
  return typeof error.status === 'number' ? error.status : undefined;
}

@Catch()
export class ProblemFilter implements ExceptionFilter {
  constructor(private readonly logger: Logger) {}

  catch(thrown: unknown, host: ArgumentsHost): void {
    const request = host.switchToHttp().getRequest<Request>();
    const response = host.switchToHttp().getResponse<Response>();
    const problem = toProblem(fromFramework(thrown), requestIdOf(request));
    if (problem.status >= 500) {
      this.logger.error({ err: thrown, requestId: problem.requestId, code: problem.code }, 'request failed');
    }
    if (response.headersSent) {
      response.end();
      return;
    }
    if (problem.retryAfterSeconds !== undefined) response.setHeader('Retry-After', problem.retryAfterSeconds);
    response.status(problem.status).type('application/problem+json').send(JSON.stringify(problem));
  }
}
