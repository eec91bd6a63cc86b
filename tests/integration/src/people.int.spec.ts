import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Invitation, Member, OpenInvitation, Page, Problem, Session } from '@masswright/contracts';
import { addToOutbox, Database } from '@masswright/drizzle';
import { programEnvironment, startTestApi, type TestApi } from '../../support/api';
import { password, type ApiUser } from '../../support/api-user';
import { listen } from '../../support/events';
import { readInbox, tokenIn, waitForMail } from '../../support/mail';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';
import { startTestWorker, type TestWorker } from '../../support/worker';

let database: TestDatabase;
let api: TestApi;
let worker: TestWorker;
let administrator: ApiUser;

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  worker = await startTestWorker(programEnvironment(database, Number(new URL(api.url).port)));
  administrator = api.visit();
  await administrator.signUp('Ines Marsh', 'Halyard Kites');
});
afterAll(async () => {
  await worker.stop();
  await api.close();
  await database.drop();
});

const newAddress = () => `${randomUUID()}@halyard.example`;
const invite = (email: string, role = 'engineer') => administrator.expect<Invitation>('POST', '/invitations', { email, role });

async function join(role: string, name = 'New Person'): Promise<ApiUser> {
  const email = newAddress();
  await invite(email, role);
  const person = api.visit();
  const token = tokenIn(await waitForMail(email));
  person.session = await person.expect<Session>('POST', '/invitations/acceptance', { as: 'new-person', token, name, password });
  return person;
}

describe('an invitation', () => {
  it('comes by mail, makes an account with the role, and works once', async () => {
    const email = newAddress();
    await invite(email, 'reviewer');
    const mail = await waitForMail(email);
    expect(mail.subject).toContain('Ines Marsh');
    expect(mail.text).toContain('Halyard Kites');
    expect(mail.html).toContain('Accept the invitation');
    const token = tokenIn(mail);
    const person = api.visit();
    expect(await person.expect<OpenInvitation>('POST', '/invitations/lookup', { token })).toEqual({ organisationName: 'Halyard Kites', email, role: 'reviewer', hasAccount: false });
    const accept = { as: 'new-person', token, name: 'Rae', password };
    expect(await person.expect<Session>('POST', '/invitations/acceptance', accept)).toMatchObject({ role: 'reviewer', organisation: { name: 'Halyard Kites' } });
    expect((await api.visit().ask('POST', '/invitations/acceptance', accept)).status).toBe(410);
    expect((await api.visit().ask('POST', '/invitations/lookup', { token })).status).toBe(410);
  });

  it('lets somebody with an account in by their password, and not by a new one', async () => {
    const known = api.visit();
    const { user } = await known.signUp('Known Person');
    await invite(user.email, 'reader');
    const token = tokenIn(await waitForMail(user.email));
    const visitor = api.visit();
    expect((await visitor.expect<OpenInvitation>('POST', '/invitations/lookup', { token })).hasAccount).toBe(true);
    expect((await visitor.ask('POST', '/invitations/acceptance', { as: 'new-person', token, name: 'X', password: 'another long password' })).status).toBe(409);
    expect((await visitor.ask('POST', '/invitations/acceptance', { as: 'known-person', token, password: 'wrong' })).status).toBe(403);
    const session = await visitor.expect<Session>('POST', '/invitations/acceptance', { as: 'known-person', token, password });
    expect(session.organisations).toHaveLength(2);
    expect(session.organisation.name).toBe('Halyard Kites');
  });

  it('accepted twice at once makes one person', async () => {
    const email = newAddress();
    await invite(email);
    const token = tokenIn(await waitForMail(email));
    const answers = await Promise.all([1, 2, 3, 4].map((n) => api.visit().ask('POST', '/invitations/acceptance', { as: 'new-person', token, name: `N${n}`, password })));
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
    expect(answers.every(({ status }) => [200, 409, 410].includes(status))).toBe(true);
    expect(await database.look('select 1 from users where email = $1', [email])).toHaveLength(1);
  });

  it('withdrawn, replaced or expired no longer works', async () => {
    const email = newAddress();
    const first = await invite(email);
    const firstToken = tokenIn(await waitForMail(email));
    const second = await invite(email, 'reader');
    expect((await api.visit().ask('POST', '/invitations/lookup', { token: firstToken })).status).toBe(410);
    expect((await administrator.get<Page<Invitation>>('/invitations')).items.filter((one) => one.email === email)).toEqual([{ ...second }]);
    expect((await administrator.ask('DELETE', `/invitations/${first.id}`)).status).toBe(404);
    await administrator.expect('DELETE', `/invitations/${second.id}`);
    const third = await invite(email);
    await database.look(`update invitations set expires_at = now() - interval '1 second' where id = $1`, [third.id]);
    expect((await administrator.get<Page<Invitation>>('/invitations')).items.find((one) => one.id === third.id)?.state).toBe('expired');
  });

  it('for somebody who is in already is refused', async () => {
    const person = await join('reader');
    const { status, body } = await administrator.ask<Problem>('POST', '/invitations', { email: person.session?.user.email, role: 'engineer' });
    expect(status).toBe(409);
    expect(body.fields).toEqual([{ path: 'email', message: 'This person is in the organisation already.' }]);
  });
});

describe('mail', () => {
  it('asked for in a change that is rolled back is never sent', async () => {
    const email = newAddress();
    const direct = new Database({ url: database.applicationUrl, poolSize: 1, applicationName: 'rollback-test' });
    const { id: organisationId = '' } = administrator.session?.organisation ?? {};
    const { id: invitationId } = await invite(newAddress());
    await expect(
      direct.transaction({ organisationId }, async (tx) => {
        await addToOutbox(tx, { organisationId, job: 'mail.send', payload: { mail: 'invitation', organisationId, invitationId }, requestId: 'rolled back' });
        throw new Error('deliberate');
      }),
    ).rejects.toThrow('deliberate');
    await direct.close();
    expect(await database.look(`select 1 from outbox where request_id = 'rolled back'`)).toEqual([]);
    expect(await readInbox(email)).toEqual([]);
  });

  it('sent a second time has the same Message-ID and the same link', async () => {
    const email = newAddress();
    await invite(email);
    const first = await waitForMail(email);
    // A worker that died between the server's acceptance and its note of it leaves the row open.
    await database.look(`update outbox set done_at = null, due_at = now() where id = (select max(id) from outbox where job = 'mail.send')`);
    for (let turn = 0; turn < 100 && (await readInbox(email)).length < 2; turn++) await new Promise((resolve) => setTimeout(resolve, 100));
    const mails = await readInbox(email);
    expect(mails).toHaveLength(2);
    expect(mails[1]?.messageId).toBe(mails[0]?.messageId);
    expect(first.messageId).toMatch(/^<invitation-[0-9a-f-]{36}@127\.0\.0\.1>$/);
    expect(mails.map(tokenIn)).toEqual([tokenIn(first), tokenIn(first)]);
  });

  it('leaves no token in the database or in the worker’s log', async () => {
    const email = newAddress();
    await invite(email);
    const token = tokenIn(await waitForMail(email));
    for (const table of ['outbox', 'invitations', 'audit_events']) {
      const rows = await database.look<{ text: string }>(`select t::text as text from ${table} t`);
      expect(rows.some(({ text }) => text.includes(token)), table).toBe(false);
    }
    expect(worker.log()).not.toContain(token);
  });
});

describe('members', () => {
  it('are listed in pages by key', async () => {
    await join('reader');
    await join('reader');
    const all = (await administrator.get<Page<Member>>('/members')).items.map(({ email }) => email);
    const paged: string[] = [];
    for (let after: string | null = ''; after !== null; ) {
      const page: Page<Member> = await administrator.get<Page<Member>>(`/members?limit=1${after === '' ? '' : `&after=${after}`}`);
      paged.push(...page.items.map(({ email }) => email));
      after = page.next;
    }
    expect(paged).toEqual(all);
    expect(all).toEqual([...all].sort());
    expect((await administrator.ask('GET', '/members?after=nonsense')).status).toBe(422);
    expect((await administrator.ask('GET', '/members?limit=1000')).status).toBe(422);
  });

  it('changed to another role may at once do what that allows', async () => {
    const person = await join('reader');
    expect((await person.ask('POST', '/projects', { name: randomUUID() })).status).toBe(403);
    const changed = await administrator.expect<Member>('PATCH', `/members/${person.session?.user.id}`, { role: 'engineer' });
    expect(changed.role).toBe('engineer');
    expect((await person.ask('POST', '/projects', { name: randomUUID() })).status).toBe(201);
  });

  it('removed are out at once: sessions, stream and all', async () => {
    const person = await join('engineer');
    const stream = await listen(person);
    await stream.wait((event) => event.type === 'hello');
    await administrator.expect('DELETE', `/members/${person.session?.user.id}`);
    expect((await person.ask('GET', '/session')).status).toBe(401);
    await stream.wait((event) => event.type === 'signed-out');
    await stream.ended;
    expect((await api.visit().ask('POST', '/sign-in', { email: person.session?.user.email, password })).status).toBe(403);
  });

  it('removed from one organisation stay signed in to another', async () => {
    const person = api.visit();
    const { user, organisation } = await person.signUp('Two Homes');
    await invite(user.email, 'reader');
    const elsewhere = api.visit();
    await elsewhere.expect('POST', '/invitations/acceptance', { as: 'known-person', token: tokenIn(await waitForMail(user.email)), password });
    await administrator.expect('DELETE', `/members/${user.id}`);
    expect((await elsewhere.ask('GET', '/session')).status).toBe(401);
    expect((await person.get<Session>('/session')).organisation.id).toBe(organisation.id);
  });

  it('the last administrator can’t go, nor step down', async () => {
    const me = administrator.session?.user.id;
    for (const answer of [await administrator.ask<Problem>('DELETE', `/members/${me}`), await administrator.ask<Problem>('PATCH', `/members/${me}`, { role: 'reader' })]) {
      expect(answer.status).toBe(409);
      expect(answer.body.detail).toContain('last administrator');
    }
    // What would be refused is not offered.
    const { items } = await administrator.get<Page<Member>>('/members');
    expect(items.find(({ userId }) => userId === me)?.can).toEqual({ changeRole: false, remove: false });
  });

  it('two administrators who remove each other at once: one stays', async () => {
    for (let round = 0; round < 5; round++) {
      const founder = api.visit();
      await founder.signUp();
      const email = newAddress();
      await founder.expect('POST', '/invitations', { email, role: 'administrator' });
      const partner = api.visit();
      partner.session = await partner.expect<Session>('POST', '/invitations/acceptance', { as: 'new-person', token: tokenIn(await waitForMail(email)), name: 'Partner', password });
      const answers = await Promise.all([
        founder.ask('DELETE', `/members/${partner.session.user.id}`),
        partner.ask('DELETE', `/members/${founder.session?.user.id}`),
      ]);
      const left = await database.look(`select 1 from memberships where organisation_id = $1 and role = 'administrator'`, [founder.session?.organisation.id]);
      expect(left).toHaveLength(1);
      expect(answers.filter(({ status }) => status === 204)).toHaveLength(1);
    }
  });

  it('an administrator who was removed while they waited removes nobody any more', async () => {
    const [first, second, third] = [api.visit(), api.visit(), api.visit()];
    await first.signUp();
    for (const person of [second, third]) {
      const email = newAddress();
      await first.expect('POST', '/invitations', { email, role: 'administrator' });
      person.session = await person.expect<Session>('POST', '/invitations/acceptance', { as: 'new-person', token: tokenIn(await waitForMail(email)), name: 'P', password });
    }
    const id = (person: ApiUser) => person.session?.user.id ?? '';
    const answers = await Promise.all([second.ask('DELETE', `/members/${id(first)}`), first.ask('DELETE', `/members/${id(second)}`), first.ask('DELETE', `/members/${id(third)}`)]);
    const left = (await database.look<{ user_id: string }>('select user_id from memberships where organisation_id = $1', [first.session?.organisation.id])).map((row) => row.user_id);
    if (answers[0]?.status === 204) {
      // Whatever the first did before it was removed counts; after that nothing.
      expect(left).toContain(id(second));
      expect(left).not.toContain(id(first));
    } else expect(left).toContain(id(first));
    expect(left.length).toBe(3 - answers.filter(({ status }) => status === 204).length);
  });

  it('removed lose the invitations that they had sent', async () => {
    const person = await join('administrator');
    const second = newAddress();
    await person.expect('POST', '/invitations', { email: second, role: 'administrator' });
    const token = tokenIn(await waitForMail(second));
    await administrator.expect('DELETE', `/members/${person.session?.user.id}`);
    expect((await api.visit().ask('POST', '/invitations/lookup', { token })).status).toBe(410);
  });

  it('every change of people has its audit row', async () => {
    const person = await join('reader');
    const id = person.session?.user.id;
    await administrator.expect('PATCH', `/members/${id}`, { role: 'reviewer' });
    await administrator.expect('DELETE', `/members/${id}`);
    const rows = await database.look<{ action: string; before: unknown; after: unknown }>(
      `select action, before, after from audit_events where subject_id = $1 and actor_id = $2 order by created_at`,
      [id, administrator.session?.user.id],
    );
    expect(rows).toEqual([
      { action: 'member.change-role', before: { role: 'reader' }, after: { role: 'reviewer' } },
      { action: 'member.remove', before: { role: 'reviewer' }, after: null },
    ]);
  });
});

describe('a forgotten password', () => {
  it('is set anew by a mailed link, once; every session of the person ends', async () => {
    const person = api.visit();
    const { user } = await person.signUp('Forgetful');
    const answer = await api.visit().expect<{ message: string }>('POST', '/password-resets', { email: user.email });
    const token = tokenIn(await waitForMail(user.email));
    const request = { token, password: 'an entirely new password' };
    await api.visit().expect('POST', '/password-resets/completion', request);
    expect((await person.ask('GET', '/session')).status).toBe(401);
    expect((await api.visit().ask('POST', '/sign-in', { email: user.email, password })).status).toBe(401);
    expect((await api.visit().ask('POST', '/sign-in', { email: user.email, password: request.password })).status).toBe(200);
    expect((await api.visit().ask('POST', '/password-resets/completion', request)).status).toBe(410);
    const unknown = newAddress();
    expect(await api.visit().expect('POST', '/password-resets', { email: unknown })).toEqual(answer);
    expect(await readInbox(unknown)).toEqual([]);
  });

  it('using one link uses up every other one of the person', async () => {
    const person = api.visit();
    const { user } = await person.signUp();
    await api.visit().expect('POST', '/password-resets', { email: user.email });
    const first = tokenIn(await waitForMail(user.email));
    await api.visit().expect('POST', '/password-resets', { email: user.email });
    for (let turn = 0; turn < 100 && (await readInbox(user.email)).length < 2; turn++) await new Promise((resolve) => setTimeout(resolve, 50));
    const [newest] = await readInbox(user.email);
    await api.visit().expect('POST', '/password-resets/completion', { token: first, password: 'an entirely new password' });
    expect(newest).toBeDefined();
    if (newest !== undefined) expect((await api.visit().ask('POST', '/password-resets/completion', { token: tokenIn(newest), password })).status).toBe(410);
  });
});
