import type { ProblemCode } from '@masswright/contracts';

export interface AppErrorDetails {
  fields?: { path: string; message: string }[];
  retryAfterSeconds?: number;
}

/** A refusal that a person is told of: a code of the closed list, and a sentence that says what is so and what to do. */
export class AppError extends Error {
  override readonly name = 'AppError';

  constructor(
    readonly code: ProblemCode,
    message: string,
    readonly details: AppErrorDetails = {},
    options?: ErrorOptions,
  ) {
    super(message, options);
  }
}

/** What isn't there and what belongs to another organisation get the same answer, so that nobody learns which. */
export const notFound = (noun: string) =>
  new AppError('not-found', `There is no such ${noun} in this organisation, or it is gone.`);
