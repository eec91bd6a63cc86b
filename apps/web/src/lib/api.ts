import { problem as problemSchema, type Problem } from '@masswright/contracts';
import { ConnectionError, ProblemError } from './problem';

export type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

export interface RequestOptions {
  body?: unknown;
  query?: Record<string, string | number | undefined>;
  signal?: AbortSignal;
  /** Lets the request outlive the page, for what is saved while a person leaves. */
  keepalive?: boolean;
}

const base = '/api/v1';

function writeUrl(path: string, query: RequestOptions['query']): string {
  const parameters = new URLSearchParams();
  for (const [name, value] of Object.entries(query ?? {})) if (value !== undefined) parameters.set(name, String(value));
  const search = parameters.toString();
  return search ? `${base}${path}?${search}` : `${base}${path}`;
}

/** What a refusal says; an answer that isn't one of ours (a proxy's page, say) is put into the same words. */
async function readProblem(response: Response): Promise<Problem> {
  const parsed = problemSchema.safeParse(await response.json().catch(() => undefined));
  if (parsed.success) return parsed.data;
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

/** One request to the api: gives its answer, or throws a ProblemError or a ConnectionError. */
export async function send<Answer>(method: Method, path: string, options: RequestOptions = {}): Promise<Answer> {
  const { body, query, signal, keepalive } = options;
  let response: Response;
  try {
    response = await fetch(writeUrl(path, query), {
      method,
      credentials: 'same-origin',
      headers: body === undefined ? { accept: 'application/json' } : { accept: 'application/json', 'content-type': 'application/json' },
      body: body === undefined ? undefined : JSON.stringify(body),
      signal,
      keepalive,
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new ConnectionError(error);
  }
  if (!response.ok) throw new ProblemError(await readProblem(response));
  if (response.status === 204) return undefined as Answer;
  return (await response.json()) as Answer;
}
