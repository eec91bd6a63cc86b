import { S3ServiceException } from '@aws-sdk/client-s3';

/**
 * - `not-found`: there is no such object (or bucket)
 * - `no-such-upload`: the multipart upload was completed, aborted or never begun
 * - `invalid-parts`: a completion names a part that is not there, in a wrong order, or one that is too small
 * - `already-exists`: the object was to be written only where none is
 * - `integrity`: the bytes that arrived are not the bytes that were announced
 * - `denied`: the key, the signature or the permission is refused: a matter of configuration
 * - `aborted`: the caller's signal ended it
 * - `unavailable`: no answer, or an overloaded or broken storage: may succeed later
 * - `unexpected`: any other refusal
 */
export type ObjectStorageErrorCode =
  | 'not-found'
  | 'no-such-upload'
  | 'invalid-parts'
  | 'already-exists'
  | 'integrity'
  | 'denied'
  | 'aborted'
  | 'unavailable'
  | 'unexpected';

export class ObjectStorageError extends Error {
  override readonly name = 'ObjectStorageError';

  constructor(
    readonly code: ObjectStorageErrorCode,
    message: string,
    options?: ErrorOptions,
  ) {
    super(message, options);
  }

  /** Whether the same request may succeed later. */
  get retryable(): boolean {
    return this.code === 'unavailable';
  }
}

const codes: Readonly<Record<string, ObjectStorageErrorCode>> = {
  NoSuchKey: 'not-found',
  NotFound: 'not-found',
  // A wrong name in our own settings, not a lost object.
  NoSuchBucket: 'denied',
  NoSuchUpload: 'no-such-upload',
  InvalidPart: 'invalid-parts',
  InvalidPartOrder: 'invalid-parts',
  EntityTooSmall: 'invalid-parts',
  PreconditionFailed: 'already-exists',
  ConditionalRequestConflict: 'already-exists',
  BadDigest: 'integrity',
  InvalidDigest: 'integrity',
  IncompleteBody: 'integrity',
  XAmzContentSHA256Mismatch: 'integrity',
  AccessDenied: 'denied',
  InvalidAccessKeyId: 'denied',
  SignatureDoesNotMatch: 'denied',
  RequestTimeTooSkewed: 'denied',
  AuthorizationHeaderMalformed: 'denied',
  ExpiredToken: 'denied',
  SlowDown: 'unavailable',
  RequestTimeout: 'unavailable',
  ServiceUnavailable: 'unavailable',
};

function findCode(error: unknown): ObjectStorageErrorCode {
  if (!(error instanceof Error)) return 'unexpected';
  if (error.name === 'AbortError') return 'aborted';
  if (!(error instanceof S3ServiceException)) return 'unavailable';
  const known = codes[error.name];
  if (known !== undefined) return known;
  const status = error.$metadata.httpStatusCode ?? 0;
  // An answer to HEAD has no body, so its status is all there is.
  if (status === 404) return 'not-found';
  if (status === 401 || status === 403) return 'denied';
  if (status === 412) return 'already-exists';
  return status >= 500 || status === 429 ? 'unavailable' : 'unexpected';
}

/** The error in our terms. Its message names the operation, never the key: keys stay out of logs. */
export function toObjectStorageError(operation: string, error: unknown): ObjectStorageError {
  if (error instanceof ObjectStorageError) return error;
  const code = findCode(error);
  const cause = error instanceof Error ? error : new Error(String(error));
  return new ObjectStorageError(code, `Object storage: ${operation} failed (${code}): ${cause.name}`, { cause });
}

/** Runs an operation and turns whatever it throws into an ObjectStorageError. */
export async function attempt<T>(operation: string, run: () => Promise<T>): Promise<T> {
  try {
    return await run();
  } catch (error) {
    throw toObjectStorageError(operation, error);
  }
}
