import { afterEach, describe, expect, it, vi } from 'vitest';
import { api, expectDone, unwrap } from './api';
import { ConnectionError, getSentence, isProblem, isWorthAnotherTry, ProblemError } from './problem';

const answer = (status: number, body?: unknown): Response =>
  new Response(body === undefined ? null : JSON.stringify(body), { status, headers: { 'content-type': 'application/json' } });

const problem = { type: 'about:blank', title: 'Gone', status: 404, code: 'not-found', detail: 'There is no such part.', requestId: 'r-1', fields: [] };

/** The error that a promise is rejected with. */
const failureOf = (promise: Promise<unknown>): Promise<unknown> => promise.then(() => undefined, (error: unknown) => error);

describe('requests to the api', () => {
  afterEach(() => void vi.unstubAllGlobals());
  const serve = (respond: () => Response | Promise<Response>): void => void vi.stubGlobal('fetch', vi.fn(() => Promise.resolve().then(respond)));
  // Relative addresses are taken from the page in a browser; the tests' Request needs a whole one.
  const read = () => unwrap(api.GET('/api/v1/session', { baseUrl: 'http://masswright.test' }));

  it('give the answer', async () => {
    serve(() => answer(200, { role: 'reader' }));
    await expect(read()).resolves.toEqual({ role: 'reader' });
  });
  it('throw a refusal with the sentence of the api', async () => {
    serve(() => answer(404, problem));
    const failure = await failureOf(read());
    expect(isProblem(failure, 'not-found')).toBe(true);
    expect(getSentence(failure)).toBe('There is no such part.');
    expect(isWorthAnotherTry(failure)).toBe(false);
  });
  it('tell a page of a proxy from a refusal of ours', async () => {
    serve(() => new Response('<html>Bad gateway</html>', { status: 502 }));
    const failure = await failureOf(read());
    expect(failure).toBeInstanceOf(ProblemError);
    expect(getSentence(failure)).toContain('status 502');
    expect(isWorthAnotherTry(failure)).toBe(true);
  });
  it('tell a lost connection from a refusal', async () => {
    serve(() => {
      throw new TypeError('fetch failed');
    });
    const failure = await failureOf(read());
    expect(failure).toBeInstanceOf(ConnectionError);
    expect(isWorthAnotherTry(failure)).toBe(true);
  });
  it('may be answered without a body where none is expected', async () => {
    serve(() => answer(204));
    await expect(expectDone(api.POST('/api/v1/sign-out', { baseUrl: 'http://masswright.test' }))).resolves.toBeUndefined();
  });
});
