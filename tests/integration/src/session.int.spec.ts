import { createHash, randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Problem, Session } from '@masswright/contracts';
import { startTestApi, type TestApi } from '../../support/api';
import { password, type ApiUser } from '../../support/api-user';
import { listen } from '../../support/events';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';

let database: TestDatabase;
let api: TestApi;

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
});
afterAll(async () => {
  await api.close();
  await database.drop();
});

const tokenOf = (user: ApiUser) => user.cookie?.split('=')[1] ?? '';
const hashOf = (token: string) => createHash('sha256').update(token).digest('hex');

describe('a session', () => {
  it('is a __Host- cookie that scripts and other sites don’t get, and is stored as a hash of 128 bits', async () => {
    const response = await fetch(`${api.url}/api/v1/sign-up`, {
      method: 'POST',
      headers: { Origin: api.url, 'Content-Type': 'application/json' },
      body: JSON.stringify({ organisationName: 'A', name: 'A', email: `${randomUUID()}@halyard.example`, password }),
    });
    const [cookie] = response.headers.getSetCookie();
    expect(cookie).toMatch(/^__Host-masswright=[\w-]{22}; Max-Age=\d+; Path=\/; HttpOnly; Secure; SameSite=Strict$/);
    const token = /=([\w-]{22})/.exec(cookie ?? '')?.[1] ?? '';
    expect(Buffer.from(token, 'base64url')).toHaveLength(16);
    const rows = await database.look<{ hash: string }>(`select encode(token_hash, 'hex') as hash from sessions`);
    expect(rows.map(({ hash }) => hash)).toContain(hashOf(token));
    const everything = await database.look<{ text: string }>(`select s::text as text from sessions s union all select o::text from outbox o union all select a::text from audit_events a`);
    expect(everything.some(({ text }) => text.includes(token))).toBe(false);
  });

  it('gets a new token at each sign-in, and the one before ends', async () => {
    const user = api.visit();
    const { user: person } = await user.signUp();
    const former = tokenOf(user);
    await user.signIn(person.email);
    expect(tokenOf(user)).not.toBe(former);
    const old = api.visit();
    old.cookie = `__Host-masswright=${former}`;
    expect((await old.ask('GET', '/session')).status).toBe(401);
    expect((await user.ask('GET', '/session')).status).toBe(200);
  });

  it('ends by signing out, at once and on the server', async () => {
    const user = api.visit();
    await user.signUp();
    const kept = user.cookie;
    await user.expect('POST', '/sign-out');
    expect(user.cookie).toBeUndefined();
    user.cookie = kept;
    expect((await user.ask('GET', '/session')).status).toBe(401);
    expect((await user.ask('POST', '/sign-out')).status).toBe(204);
  });

  it.each(['idle_ends_at', 'absolute_ends_at'])('ends when %s is past', async (column) => {
    const user = api.visit();
    await user.signUp();
    await database.look(`update sessions set ${column} = now() - interval '1 second' where token_hash = decode($1, 'hex')`, [hashOf(tokenOf(user))]);
    expect((await user.ask('GET', '/session')).status).toBe(401);
  });

  it('moves its idle end on while it is used, and never its absolute end', async () => {
    const user = api.visit();
    await user.signUp();
    const read = async () =>
      (await database.look<{ idle: Date; absolute: Date }>(`select idle_ends_at as idle, absolute_ends_at as absolute from sessions where token_hash = decode($1, 'hex')`, [hashOf(tokenOf(user))]))[0];
    await database.look(`update sessions set last_seen_at = now() - interval '1 hour', idle_ends_at = now() + interval '1 minute' where token_hash = decode($1, 'hex')`, [hashOf(tokenOf(user))]);
    const before = await read();
    await user.get('/session');
    const after = await read();
    expect(after?.idle.getTime()).toBeGreaterThan((before?.idle.getTime() ?? 0) + 60_000);
    expect(after?.absolute).toEqual(before?.absolute);
  });

  it('that ends takes its event stream with it', async () => {
    const user = api.visit();
    await user.signUp();
    const other = api.visit();
    await other.signIn(user.session?.user.email ?? '');
    const [mine, others] = [await listen(user), await listen(other)];
    await mine.wait((event) => event.type === 'hello');
    await user.expect('POST', '/sign-out');
    await mine.wait((event) => event.type === 'signed-out');
    await mine.ended;
    expect(others.events.some((event) => event.type === 'signed-out')).toBe(false);
    others.close();
  });
});

describe('signing in', () => {
  it('an unknown address and a wrong password get the same answer', async () => {
    const { user: person } = await api.visit().signUp();
    const answerTo = async (email: string) => {
      const { status, body } = await api.visit().ask<Problem>('POST', '/sign-in', { email, password: 'not the password' });
      return { httpStatus: status, ...body, requestId: '' };
    };
    expect(await answerTo(`${randomUUID()}@halyard.example`)).toEqual(await answerTo(person.email));
  });

  it('is limited by account, across two api processes and a restart, whatever the address', async () => {
    const user = api.visit();
    const { user: person } = await user.signUp();
    const second = await startTestApi(database);
    const statuses: number[] = [];
    for (let attempt = 0; attempt < 11; attempt++) {
      const visitor = (attempt % 2 === 0 ? api : second).visit();
      statuses.push((await visitor.ask('POST', '/sign-in', { email: person.email, password: 'wrong' })).status);
    }
    expect(statuses).toEqual([...Array.from({ length: 10 }, () => 401), 429]);
    await second.close();
    const restarted = await startTestApi(database);
    const { status, body, headers } = await restarted.visit().ask<Problem>('POST', '/sign-in', { email: person.email, password });
    expect(status).toBe(429);
    expect(body.retryAfterSeconds).toBeGreaterThan(0);
    expect(headers.get('retry-after')).toBe(String(body.retryAfterSeconds));
    await restarted.close();
    await database.look(`update attempts set window_ends_at = now() - interval '1 second'`);
    expect((await api.visit().ask('POST', '/sign-in', { email: person.email, password })).status).toBe(200);
  });

  it('a hundred wrong tries at once are not let through for being at once', async () => {
    const user = api.visit();
    const { user: person } = await user.signUp();
    const answers = await Promise.all(Array.from({ length: 40 }, () => api.visit().ask('POST', '/sign-in', { email: person.email, password: 'wrong' })));
    expect(answers.filter(({ status }) => status === 401)).toHaveLength(10);
    expect(answers.filter(({ status }) => status === 429)).toHaveLength(30);
    await database.look('delete from attempts');
  });

  it('is limited by address, and the counters name nobody', async () => {
    await database.look('delete from attempts');
    await api.visit().ask('POST', '/sign-in', { email: 'somebody@halyard.example', password: 'wrong' });
    await database.look(`update attempts set count = 100 where kind = 'sign-in.address'`);
    expect((await api.visit().ask('POST', '/sign-in', { email: `${randomUUID()}@halyard.example`, password: 'wrong' })).status).toBe(429);
    const rows = await database.look<{ text: string }>('select a::text as text from attempts a');
    expect(rows.some(({ text }) => text.includes('halyard') || text.includes('127.0.0.1'))).toBe(false);
    await database.look('delete from attempts');
  });

  it('two who sign up with one address at once: one gets it, the other a clear answer', async () => {
    const email = `${randomUUID()}@halyard.example`;
    const answers = await Promise.all([1, 2, 3].map((n) => api.visit().ask('POST', '/sign-up', { organisationName: `Org ${n}`, name: 'N', email, password })));
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409]);
    expect(await database.look(`select 1 from organisations where name like 'Org _'`)).toHaveLength(1);
  });
});

describe('writes from elsewhere', () => {
  it.each([
    ['another site', { Origin: 'https://evil.example' }],
    ['another port of this host', { Origin: 'http://127.0.0.1:1' }],
    ['a page without an origin', { Origin: 'null' }],
    ['what the browser calls cross-site', { 'Sec-Fetch-Site': 'cross-site' }],
    ['what the browser calls same-site', { 'Sec-Fetch-Site': 'same-site' }],
    ['a same-origin mark with a foreign origin', { 'Sec-Fetch-Site': 'same-origin', Origin: 'https://evil.example' }],
  ])('from %s are refused', async (_, headers) => {
    const user = api.visit();
    await user.signUp();
    const { status, body } = await user.ask<Problem>('POST', '/projects', { name: 'Planted' }, headers);
    expect(status).toBe(403);
    expect(body.code).toBe('cross-site');
    expect((await user.get<{ items: unknown[] }>('/projects')).items).toEqual([]);
  });

  it('without an origin at all they are refused too', async () => {
    const response = await fetch(`${api.url}/api/v1/sign-out`, { method: 'POST' });
    expect(response.status).toBe(403);
  });
});

describe('requests that aren’t as they should be', () => {
  it.each([
    ['not JSON', '{"email":'],
    ['a list', '[]'],
    ['a body of 300 kB', JSON.stringify({ email: 'a'.repeat(300_000) })],
    ['a prototype', '{"__proto__":{"admin":true},"email":"a@b.example","password":"x"}'],
  ])('%s gets problem details', async (_, body) => {
    const { status, body: problem } = await api.visit().ask<Problem>('POST', '/sign-in', body);
    expect([400, 401, 413, 422]).toContain(status);
    expect(problem.requestId).toMatch(/^[0-9a-f-]{36}$/);
  });

  it('a wrong field is named, with what it should be', async () => {
    const { status, body } = await api.visit().ask<Problem>('POST', '/sign-up', { organisationName: ' ', name: 'N', email: 'no address', password: 'short' });
    expect(status).toBe(422);
    expect(body.fields.map(({ path }) => path).sort()).toEqual(['email', 'organisationName', 'password']);
  });
});

describe('switching organisation', () => {
  it('moves the session, and only into one’s own', async () => {
    const [first, second] = [api.visit(), api.visit()];
    const { organisation: home } = await first.signUp();
    const { organisation: foreign } = await second.signUp();
    expect((await first.ask('PUT', '/session/organisation', { organisationId: foreign.id })).status).toBe(404);
    await database.look(`insert into memberships (organisation_id, user_id, role) values ($1, $2, 'reader')`, [foreign.id, first.session?.user.id]);
    const moved = await first.expect<Session>('PUT', '/session/organisation', { organisationId: foreign.id });
    expect(moved).toMatchObject({ organisation: { id: foreign.id }, role: 'reader', can: { managePeople: false, createProject: false } });
    expect(moved.organisations.map(({ id }) => id).sort()).toEqual([home.id, foreign.id].sort());
    expect((await first.ask('POST', '/projects', { name: 'Mine' })).status).toBe(403);
  });

  it('ends the event stream of the organisation that is left, and nothing of it is heard any more', async () => {
    const [first, second] = [api.visit(), api.visit()];
    await first.signUp();
    const { organisation: other } = await second.signUp();
    const project = await second.createProject();
    await database.look(`insert into memberships (organisation_id, user_id, role) values ($1, $2, 'reader')`, [other.id, first.session?.user.id]);
    await first.expect('PUT', '/session/organisation', { organisationId: other.id });
    const stream = await listen(first);
    await first.expect('PUT', '/session/organisation', { organisationId: first.session?.organisation.id });
    await stream.ended;
    await second.expect('PATCH', `/projects/${project.id}`, { name: 'Renamed meanwhile' });
    expect(stream.events.map(({ type }) => type)).toEqual(['hello']);
  });
});
