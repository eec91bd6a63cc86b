import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Part, Role, Session } from '@masswright/contracts';
import { deriveLinkToken } from '@masswright/jobs';
import { documentedOperations } from '../../support/api-document';
import { linkSecret, startTestApi, type TestApi } from '../../support/api';
import { password, type ApiUser } from '../../support/api-user';
import { block } from '../../support/meshes';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';

/**
 * The walk: every route × every role × own and foreign organisation. The expected table is written by hand; a route that is not in it fails.
 * A status is what the route answers; `foreign` is what an administrator of another organisation gets for the same address,
 * and `unchanged` in the run means that not one row was changed by a refusal.
 */
interface Expectation {
  administrator: number;
  engineer: number;
  reviewer: number;
  reader: number;
  /** An administrator of another organisation, at this organisation's address; left out where the address names nothing of it. */
  foreign?: number;
  /** Nobody signed in. */
  visitor: number;
  body?: (world: World) => unknown;
  query?: string;
  /** Fills the address's parameters with things of the organisation, made anew for each try where the route uses them up. */
  parameters?: (world: World) => Promise<Record<string, string>> | Record<string, string>;
}

interface World {
  api: TestApi;
  administrator: ApiUser;
  projectId: string;
  partId: string;
  memberId: string;
  part: Part;
}

const everyone = { administrator: 200, engineer: 200, reviewer: 200, reader: 200, visitor: 401 };
const editors = (status: number) => ({ administrator: status, engineer: status, reviewer: 403, reader: 403, visitor: 401 });
const administrators = (status: number) => ({ administrator: status, engineer: 403, reviewer: 403, reader: 403, visitor: 401 });
const anybody = (status: number) => ({ administrator: status, engineer: status, reviewer: status, reader: status, visitor: status });

const project = (world: World) => ({ projectId: world.projectId });
const part = (world: World) => ({ partId: world.partId });
const freshMember = async (world: World) => ({ userId: (await addPerson(world, 'reader')).session?.user.id ?? '' });
const freshInvitation = async (world: World) => {
  const { id } = await world.administrator.expect<{ id: string }>('POST', '/invitations', { email: `${randomUUID()}@halyard.example`, role: 'reader' });
  return { invitationId: id };
};
const alloy = { name: 'Alloy', group: 'aluminium', densityKgM3: 2700, densitySpreadKgM3: 27, spreadBasis: 'judgement', source: '' };
const freshMaterial = async (world: World) => ({ materialId: (await world.administrator.expect<{ id: string }>('POST', '/materials', { ...alloy, name: randomUUID() })).id });
const freshChange = async (world: World) => {
  const request = { parts: { ids: [world.partId] }, change: { densityKgM3: 1 + Math.random() } };
  return { changeId: (await world.administrator.expect<{ id: string }>('POST', `/projects/${world.projectId}/setting-changes`, request)).id };
};
const openUpload = async (world: World) => ({ uploadId: (await world.administrator.expect<{ id: string }>('POST', `/projects/${world.projectId}/uploads`, { fileName: 'a.stl', sizeBytes: 100 })).id });
const sentUpload = async (world: World) => ({ uploadId: (await world.administrator.send(world.projectId, 'block.stl', block([0, 0, 0], [1, 1, 1]))).id });
const noToken = 'A'.repeat(22);

const expected: Record<string, Expectation> = {
  'get /api/health/live': anybody(200),
  'get /api/health/ready': anybody(200),
  'get /api/metrics': anybody(404),
  'post /api/v1/sign-up': { ...anybody(422), body: () => ({}) },
  'post /api/v1/sign-in': { ...anybody(401), body: () => ({ email: 'nobody@halyard.example', password: 'wrong' }) },
  'post /api/v1/sign-out': anybody(204),
  'get /api/v1/session': everyone,
  'put /api/v1/session/organisation': { administrator: 404, engineer: 404, reviewer: 404, reader: 404, visitor: 401, body: () => ({ organisationId: randomUUID() }) },
  'post /api/v1/password-resets': { ...anybody(202), body: () => ({ email: `${randomUUID()}@halyard.example` }) },
  'post /api/v1/password-resets/completion': { ...anybody(410), body: () => ({ token: noToken, password }) },
  'post /api/v1/invitations/lookup': { ...anybody(410), body: () => ({ token: noToken }) },
  'post /api/v1/invitations/acceptance': { ...anybody(410), body: () => ({ as: 'new-person', token: noToken, name: 'Nobody', password }) },
  'get /api/v1/invitations': administrators(200),
  'post /api/v1/invitations': { ...administrators(201), body: () => ({ email: `${randomUUID()}@halyard.example`, role: 'reader' }) },
  'delete /api/v1/invitations/:invitationId': { ...administrators(204), foreign: 404, parameters: freshInvitation },
  'get /api/v1/members': everyone,
  'patch /api/v1/members/:userId': { ...administrators(200), foreign: 404, body: () => ({ role: 'reviewer' }), parameters: freshMember },
  'delete /api/v1/members/:userId': { ...administrators(204), foreign: 404, parameters: freshMember },
  'get /api/v1/projects': everyone,
  'post /api/v1/projects': { ...editors(201), body: () => ({ name: randomUUID() }) },
  'get /api/v1/projects/:projectId': { ...everyone, foreign: 404, parameters: project },
  'patch /api/v1/projects/:projectId': { ...editors(200), foreign: 404, body: () => ({ name: randomUUID() }), parameters: project },
  'get /api/v1/projects/:projectId/parts': { ...everyone, foreign: 404, parameters: project },
  'get /api/v1/projects/:projectId/parts/export': { ...everyone, foreign: 404, parameters: project, query: 'format=csv' },
  'post /api/v1/projects/:projectId/setting-changes': {
    ...editors(201),
    foreign: 404,
    body: ({ partId }) => ({ parts: { ids: [partId] }, change: { densityKgM3: 1 + Math.random() } }),
    parameters: project,
  },
  'post /api/v1/setting-changes/:changeId/undo': { ...editors(201), foreign: 404, parameters: freshChange },
  // Nothing is meant, so that the walk goes on with its part; who is allowed is told that nothing was moved.
  'post /api/v1/projects/:projectId/part-deletions': { ...editors(201), foreign: 404, body: () => ({ parts: { filter: { text: 'nothing' } } }), parameters: project },
  'post /api/v1/projects/:projectId/part-restorations': { ...editors(201), foreign: 404, body: () => ({ parts: { filter: { text: 'nothing' } } }), parameters: project },
  'get /api/v1/materials': everyone,
  'post /api/v1/materials': { ...editors(201), body: () => ({ ...alloy, name: randomUUID() }) },
  'get /api/v1/materials/export': everyone,
  'post /api/v1/materials/import': { ...editors(200), body: () => ({ csv: `name,density_kg_m3,spread_kg_m3\n${randomUUID()},1,0`, rehearse: false }) },
  'patch /api/v1/materials/:materialId': { ...editors(200), foreign: 404, body: () => ({ version: 1, densityKgM3: 2 }), parameters: freshMaterial },
  'get /api/v1/materials/:materialId/parts': { ...everyone, foreign: 404, parameters: freshMaterial },
  'post /api/v1/projects/:projectId/uploads': { ...editors(201), foreign: 404, body: () => ({ fileName: 'a.stl', sizeBytes: 100 }), parameters: project },
  'get /api/v1/projects/:projectId/uploads': { ...editors(200), foreign: 404, parameters: project },
  'post /api/v1/projects/:projectId/name-matches': { ...editors(200), foreign: 404, body: () => ({ fileNames: ['block.stl'] }), parameters: project },
  'get /api/v1/storage-use': everyone,
  // It waits to be measured already: that is answered, and nothing is done.
  'post /api/v1/parts/:partId/run': { ...editors(200), foreign: 404, parameters: part },
  'get /api/v1/parts/:partId': { ...everyone, foreign: 404, parameters: part },
  'patch /api/v1/parts/:partId': { ...editors(200), foreign: 404, body: () => ({ name: randomUUID() }), parameters: part },
  'patch /api/v1/parts/:partId/setting': {
    // The version is an old one: allowed people learn that, others learn nothing.
    ...editors(409),
    foreign: 404,
    body: () => ({ version: 999, densityKgM3: 1000 }),
    parameters: part,
  },
  // Nothing measures in this test: there is no statement yet.
  'get /api/v1/parts/:partId/statement': { administrator: 409, engineer: 409, reviewer: 409, reader: 409, foreign: 404, visitor: 401, parameters: part },
  'get /api/v1/uploads/:uploadId': { ...everyone, foreign: 404, parameters: openUpload },
  'post /api/v1/uploads/:uploadId/part-grants': { ...editors(200), foreign: 404, body: () => ({ parts: [{ partNumber: 1, sha256: 'a'.repeat(64) }] }), parameters: openUpload },
  'post /api/v1/uploads/:uploadId/completion': {
    ...editors(201),
    foreign: 404,
    body: () => ({ setting: { lengthUnit: 'mm', densityKgM3: 1000 } }),
    parameters: sentUpload,
  },
  'delete /api/v1/uploads/:uploadId': { ...editors(204), foreign: 404, parameters: openUpload },
  'get /api/v1/events': everyone,
};

interface Layer {
  route?: { path: string; methods: Record<string, boolean> };
}

function listRoutes(api: TestApi): string[] {
  const server = api.application.getHttpAdapter().getInstance() as { router: { stack: Layer[] } };
  return server.router.stack.flatMap(({ route }) =>
    route === undefined
      ? []
      : Object.entries(route.methods)
          .filter(([method, isThere]) => isThere && method !== 'head')
          .map(([method]) => `${method} ${route.path}`),
  );
}

async function addPerson(world: Pick<World, 'api' | 'administrator'>, role: Role): Promise<ApiUser> {
  const { id } = await world.administrator.expect<{ id: string }>('POST', '/invitations', { email: `${randomUUID()}@halyard.example`, role });
  const person = world.api.visit();
  person.session = await person.expect<Session>('POST', '/invitations/acceptance', {
    as: 'new-person',
    token: deriveLinkToken(linkSecret, 'invitation', id),
    name: `A ${role}`,
    password,
  });
  return person;
}

let database: TestDatabase;
let world: World;
let people: Record<'administrator' | 'engineer' | 'reviewer' | 'reader' | 'foreign' | 'visitor', ApiUser>;

/** A fingerprint of every row of every table but the counters of attempts and the sessions' times. */
async function fingerprint(): Promise<string> {
  const tables = await database.look<{ name: string }>(`select tablename as name from pg_tables where schemaname = 'public' and tablename not in ('attempts', 'sessions') order by 1`);
  const sums = await Promise.all(
    tables.map(async ({ name }) => {
      const [row] = await database.look<{ sum: string | null }>(`select md5(coalesce(string_agg(t::text, '|' order by t::text), '')) as sum from ${name} t`);
      return `${name}:${row?.sum}`;
    }),
  );
  return sums.join('\n');
}

async function statusOf(user: ApiUser, route: string, expectation: Expectation, given?: Record<string, string>): Promise<number> {
  const [method = '', template = ''] = route.split(' ');
  const parameters = given ?? (await expectation.parameters?.(world)) ?? {};
  const path = template.replace(/:(\w+)/g, (_, name: string) => parameters[name] ?? '') + (expectation.query === undefined ? '' : `?${expectation.query}`);
  const body = expectation.body?.(world);
  const headers = {
    Origin: world.api.url,
    ...(user.cookie === undefined ? {} : { Cookie: user.cookie }),
    ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
  };
  if (route === 'get /api/v1/events') {
    const stop = new AbortController();
    const response = await fetch(`${world.api.url}${path}`, { headers, signal: stop.signal });
    stop.abort();
    return response.status;
  }
  if (!path.startsWith('/api/v1')) return (await fetch(`${world.api.url}${path}`, { headers })).status;
  return (await user.ask(method.toUpperCase(), path.slice('/api/v1'.length), body)).status;
}

beforeAll(async () => {
  database = await createTestDatabase();
  const api = await startTestApi(database);
  const administrator = api.visit();
  await administrator.signUp();
  const { id: projectId } = await administrator.createProject();
  const added = await administrator.addMesh(projectId, 'block.stl', block([0, 0, 0], [1, 1, 1]));
  const base = { api, administrator };
  const foreign = api.visit();
  await foreign.signUp('Other Person');
  people = {
    administrator,
    engineer: await addPerson(base, 'engineer'),
    reviewer: await addPerson(base, 'reviewer'),
    reader: await addPerson(base, 'reader'),
    foreign,
    visitor: api.visit(),
  };
  world = { ...base, projectId, partId: added.id, part: added, memberId: people.reader.session?.user.id ?? '' };
});
afterAll(async () => {
  await world.api.close();
  await database.drop();
});

describe('the walk', () => {
  it('the table lists every route of the running router, and no other', () => {
    expect(listRoutes(world.api).sort()).toEqual(Object.keys(expected).sort());
  });

  it('the OpenAPI document lists every route below /api/v1', () => {
    const documented = documentedOperations.map((operation) => operation.replace(/\{(\w+)\}/g, ':$1')).sort();
    expect(documented).toEqual(Object.keys(expected).filter((route) => route.includes(' /api/v1/')).sort());
  });

  // Signing out would end the sessions that the walk goes on with.
  const walked = Object.entries(expected).filter(([route]) => route !== 'post /api/v1/sign-out');

  it.each(walked)('%s', async (route, expectation) => {
    for (const who of ['visitor', 'reader', 'reviewer', 'engineer', 'administrator', 'foreign'] as const) {
      const status = who === 'foreign' ? expectation.foreign : expectation[who];
      if (status === undefined) continue;
      const parameters = (await expectation.parameters?.(world)) ?? {};
      const before = await fingerprint();
      expect(await statusOf(people[who], route, expectation, parameters), who).toBe(status);
      if (status >= 400) expect(await fingerprint(), `${who} was refused, but rows changed`).toBe(before);
    }
  });

  it('lists of another organisation hold nothing of this one', async () => {
    const ours = [world.projectId, world.administrator.session?.organisation.id, world.memberId, world.administrator.session?.user.email];
    for (const path of ['/projects', '/members', '/invitations', '/session', '/materials']) {
      const text = JSON.stringify(await people.foreign.get(path));
      for (const thing of ours) expect(text.includes(thing ?? 'nothing to look for'), path).toBe(false);
    }
  });

  it('an id that is none, and one that nobody has, are not found', async () => {
    for (const id of ['none', randomUUID(), '..%2f..%2fsession']) {
      for (const path of [`/projects/${id}`, `/projects/${id}/parts`, `/parts/${id}`, `/uploads/${id}`, `/materials/${id}/parts`]) {
        expect((await people.administrator.ask('GET', path)).status, path).toBe(404);
      }
    }
  });
});
