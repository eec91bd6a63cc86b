import { createClient } from '@masswright/client';
import type { Problem } from '@masswright/contracts';
import { ConnectionError, ProblemError } from './problem';

/**
 * Requests to the api, typed by its OpenAPI document; each is awaited through `unwrap`.
 * `fetch` is looked up at each call, so that tests can put another in its place.
 */
export const api = createClient({ fetch: (request) => fetch(request) });

interface Answer<Data> {
  data?: Data;
  error?: unknown;
  response: Response;
}

/** Checked by hand: this file is read before the first page is seen, and a schema library would double what that takes. */
function isProblem(body: unknown): body is Problem {
  if (typeof body !== 'object' || body === null) return false;
  const { code, detail, status, fields } = body as Record<string, unknown>;
  return typeof code === 'string' && typeof detail === 'string' && typeof status === 'number' && Array.isArray(fields);
}

/** What a refusal says; an answer that isn't one of ours (a proxy's page, say) is put into the same words. */
function readProblem(body: unknown, response: Response): Problem {
  if (isProblem(body)) return body;
  return {
    type: 'about:blank',
    title: 'Unexpected answer',
    status: response.status,
    code: response.status >= 500 ? 'unavailable' : 'bad-request',
    detail: `The server gave an answer that this page does not understand (status ${response.status}). Try again in a moment.`,
    requestId: response.headers.get('x-request-id') ?? '',
    fields: [],
  };
}

const isAbort = (error: unknown): boolean => error instanceof DOMException && error.name === 'AbortError';

async function settle<Data>(answer: Promise<Answer<Data>>): Promise<Answer<Data>> {
  let settled: Answer<Data>;
  try {
    settled = await answer;
  } catch (error) {
    throw isAbort(error) ? error : new ConnectionError(error);
  }
  if (!settled.response.ok) throw new ProblemError(readProblem(settled.error, settled.response));
  return settled;
}

/** What the api answered, or a ProblemError, or a ConnectionError. */
export async function unwrap<Data>(answer: Promise<Answer<Data>>): Promise<Data> {
  const { data, response } = await settle(answer);
  if (data === undefined) throw new ProblemError(readProblem(undefined, response));
  return data;
}

/** What the client makes of a type: it forgets how long tuples are. */
type Loosened<Value> = Value extends readonly (infer Item)[] ? Loosened<Item>[] : Value extends object ? { [Key in keyof Value]: Loosened<Value[Key]> } : Value;

/** The same for answers with vectors in them: the document agrees with the contract in all but the length of tuples, which the client's types lose. */
export async function unwrapAs<Data>(answer: Promise<Answer<Loosened<Data>>>): Promise<Data> {
  return (await unwrap(answer)) as Data;
}

/** For requests that are answered without a body. */
export async function expectDone(answer: Promise<Answer<unknown>>): Promise<void> {
  await settle(answer);
}
