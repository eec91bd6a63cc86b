import type { Problem } from '@masswright/contracts';

/** The api refused, and said why in a sentence for people. */
export class ProblemError extends Error {
  readonly problem: Problem;

  constructor(problem: Problem) {
    super(problem.detail);
    this.name = 'ProblemError';
    this.problem = problem;
  }
}

/** No answer came: the network is down, or the server is. */
export class ConnectionError extends Error {
  constructor(cause: unknown) {
    super('Masswright could not be reached. Check the connection; nothing that was saved is lost.', { cause });
    this.name = 'ConnectionError';
  }
}

export function isProblem(error: unknown, code: Problem['code']): error is ProblemError {
  return error instanceof ProblemError && error.problem.code === code;
}

/** A sentence that can be shown for any failure. */
export function getSentence(error: unknown): string {
  if (error instanceof ProblemError || error instanceof ConnectionError) return error.message;
  return 'Something went wrong in this page. Try again; if it stays, reload the page.';
}

/** Asking again helps where nothing was decided: no connection, or a server that is starting or overloaded. */
export function isWorthAnotherTry(error: unknown): boolean {
  return error instanceof ConnectionError || (error instanceof ProblemError && error.problem.status >= 500);
}
