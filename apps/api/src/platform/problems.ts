import type { Problem, ProblemCode } from '@masswright/contracts';
import { DatabaseUnavailableError } from '@masswright/drizzle';
import { ObjectStorageError } from '@masswright/storage';
import { AppError } from './app-error';

/** One table from code to status and title. */
const problemsByCode: Record<ProblemCode, { status: number; title: string }> = {
  'bad-request': { status: 400, title: 'The request cannot be read' },
  'invalid-input': { status: 422, title: 'Something in the request is not as it should be' },
  'not-signed-in': { status: 401, title: 'Not signed in' },
  forbidden: { status: 403, title: 'Not allowed' },
  'cross-site': { status: 403, title: 'Refused: the request comes from another site' },
  'not-found': { status: 404, title: 'Not found' },
  conflict: { status: 409, title: 'It conflicts with what is there' },
  'stale-version': { status: 409, title: 'Someone changed it meanwhile' },
  'link-expired': { status: 410, title: 'The link no longer works' },
  'too-large': { status: 413, title: 'Too large' },
  'quota-exceeded': { status: 413, title: 'No room left' },
  'too-many-attempts': { status: 429, title: 'Too many attempts' },
  'upload-incomplete': { status: 409, title: 'The upload is not complete' },
  unavailable: { status: 503, title: 'Not available just now' },
  internal: { status: 500, title: 'Something went wrong here' },
};

/** PostgreSQL's SQLSTATE, wherever in the chain of causes it stands. */
function hasSqlState(error: unknown, states: readonly string[]): boolean {
  if (!(error instanceof Error)) return false;
  return ('code' in error && typeof error.code === 'string' && states.includes(error.code)) || hasSqlState(error.cause, states);
}
/** Two requests at once can both find a name free; the index lets one through. */
const uniqueViolation = ['23505'];
/** Waited too long for a lock or a statement, or chosen as the victim of a deadlock. */
const busy = ['55P03', '57014', '40P01', '40001'];

function toAppError(error: unknown): AppError {
  if (error instanceof AppError) return error;
  if (error instanceof DatabaseUnavailableError) {
    return new AppError('unavailable', 'The database cannot be reached just now. Try again in a moment.', { retryAfterSeconds: 2 }, { cause: error });
  }
  if (hasSqlState(error, uniqueViolation)) {
    return new AppError('conflict', 'Somebody made the same just before you. Look again, then decide.', {}, { cause: error });
  }
  if (hasSqlState(error, busy)) {
    return new AppError('unavailable', 'The database is busy just now. Try again in a moment.', { retryAfterSeconds: 2 }, { cause: error });
  }
  if (error instanceof ObjectStorageError && error.retryable) {
    return new AppError('unavailable', 'The file storage cannot be reached just now. Try again in a moment.', { retryAfterSeconds: 2 }, { cause: error });
  }
  return new AppError('internal', 'This is our fault, not yours. Try again; if it stays so, give the request number to whoever runs this installation.', {}, { cause: error });
}

/** Maps any error to RFC 9457 problem details; what isn't an AppError says nothing of its inside. */
export function toProblem(error: unknown, requestId: string): Problem {
  const { code, message, details } = toAppError(error);
  const { status, title } = problemsByCode[code];
  return {
    type: `urn:masswright:problem:${code}`,
    title,
    status,
    code,
    detail: message,
    requestId,
    fields: details.fields ?? [],
    ...(details.retryAfterSeconds === undefined ? {} : { retryAfterSeconds: details.retryAfterSeconds }),
  };
}
