import type { JobName, JobPayload } from '@masswright/jobs';

export interface JobContext {
  requestId: string;
  outboxId: number;
  /** Fires when the process stops and the job must hand back what it holds. */
  signal: AbortSignal;
}

/** One handler for every job, no more and no fewer: the compiler sees to it. */
export type JobHandlers = { [Name in JobName]: (payload: JobPayload<Name>, context: JobContext) => Promise<void> };

/** Thrown by a handler when the world outside isn't up to it just now: the job is tried again, later each time. */
export class TryAgainError extends Error {
  override readonly name = 'TryAgainError';
}

/**
 * Thrown by a handler that has to wait for the end of another's work: the job is handed out again after a fixed pause. (The queue library knows errors
 * by their names and leaves jobs of its own WaitingError, DelayedError and the like where they are: ours must not be called so.)
 */
export class PostponedError extends Error {
  override readonly name = 'PostponedError';

  constructor(
    message: string,
    readonly pauseMs: number,
  ) {
    super(message);
  }
}

/** Thrown by a handler whose work another has taken up since: the other's end counts, so nothing is noted. */
export class SupersededError extends Error {
  override readonly name = 'SupersededError';
}

/** Thrown by a handler that gave its work back because the process stops: it is handed out again at once. */
export class HandedBackError extends Error {
  override readonly name = 'HandedBackError';
}
