import { randomUUID } from 'node:crypto';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { MovedParts, Part, PartList, PartSelection, Project, Upload } from '@masswright/contracts';
import { programEnvironment, startTestApi, type TestApi } from '../../support/api';
import type { Answer, ApiUser } from '../../support/api-user';
import { listen } from '../../support/events';
import { fillProject } from '../../support/filled-project';
import { block } from '../../support/meshes';
import { expectSummariesToFollow } from '../../support/summaries';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';
import { startTestWorker } from '../../support/worker';

let database: TestDatabase;
let api: TestApi;
let engineer: ApiUser;
let projectId: string;
let ids: string[];

const remove = (parts: PartSelection, user = engineer): Promise<Answer<MovedParts>> => user.ask<MovedParts>('POST', `/projects/${projectId}/part-deletions`, { parts });
const restore = (parts: PartSelection, user = engineer): Promise<Answer<MovedParts>> => user.ask<MovedParts>('POST', `/projects/${projectId}/part-restorations`, { parts });
const list = (query = ''): Promise<PartList> => engineer.get<PartList>(`/projects/${projectId}/parts?${query}`);
const at = (index: number): string => ids[index] ?? 'none';

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  engineer = api.visit();
  await engineer.signUp();
});
beforeEach(async () => {
  const session = engineer.session;
  if (session === undefined) throw new Error('Nobody is signed in.');
  projectId = (await engineer.createProject()).id;
  ids = await fillProject(database.look, database.applicationUrl, { organisationId: session.organisation.id, projectId, userId: session.user.id, count: 8 });
});
afterEach(async () => {
  await expectSummariesToFollow(database);
});
afterAll(async () => {
  await api.close();
  await database.drop();
});

describe('a deleted part', () => {
  it('is in no list but that of the deleted, and not among its project’s parts', async () => {
    expect(await remove({ ids: [at(5), at(1)] })).toMatchObject({ status: 201, body: { ids: [at(1), at(5)] } });
    expect((await list()).items.map(({ number }) => number)).toEqual([1, 3, 4, 5, 7, 8]);
    expect(await list()).toMatchObject({ total: 6, deleted: 2 });
    const gone = await list('deleted=true&text=cover');
    expect(gone).toMatchObject({ total: 0, deleted: 2 });
    expect((await list('deleted=true')).items).toMatchObject([{ number: 2, deletedAt: expect.any(String) as string }, { number: 6 }]);
    expect((await engineer.get<Project>(`/projects/${projectId}`)).parts).toBe(6);
  });

  it('can be looked at, but nothing of it can be changed until it is restored', async () => {
    await remove({ ids: [at(0)] });
    expect(await engineer.get<Part>(`/parts/${at(0)}`)).toMatchObject({ deletedAt: expect.any(String) as string, can: { edit: false } });
    const tries: [string, string, object][] = [
      ['PATCH', `/parts/${at(0)}`, { name: 'Other' }],
      ['PATCH', `/parts/${at(0)}/setting`, { version: 1, densityKgM3: 1 }],
      ['POST', `/parts/${at(0)}/run`, {}],
      ['POST', `/projects/${projectId}/setting-changes`, { parts: { ids: [at(0)] }, change: { densityKgM3: 1 } }],
    ];
    for (const [method, path, body] of tries) {
      expect(await engineer.ask(method, path, body), path).toMatchObject({ status: 409, body: { code: 'conflict', detail: expect.stringContaining('estore it first') as string } });
    }
    const upload = await engineer.send(projectId, 'next.stl', block([0, 0, 0], [1, 1, 1]));
    const completion = await engineer.ask('POST', `/uploads/${upload.id}/completion`, { setting: { lengthUnit: 'mm', densityKgM3: 1 }, revisionOf: { partId: at(0), reason: '' } });
    expect(completion).toMatchObject({ status: 409, body: { detail: expect.stringContaining('estore it first') as string } });
    // What was sent is still parts of an upload, not an object that nothing can be added to.
    expect((await engineer.get<Upload>(`/uploads/${upload.id}`)).storedParts).toHaveLength(1);
    await restore({ ids: [at(0)] });
    expect(await engineer.expect<Part>('PATCH', `/parts/${at(0)}`, { name: 'Other' })).toMatchObject({ name: 'Other', deletedAt: null, can: { edit: true } });
  });

  it('comes back with its number, setting and revisions', async () => {
    const before = await engineer.get<Part>(`/parts/${at(2)}`);
    await remove({ ids: [at(2)] });
    await restore({ ids: [at(2)] });
    expect(await engineer.get<Part>(`/parts/${at(2)}`)).toEqual(before);
    expect(await list()).toMatchObject({ total: 8, deleted: 0 });
  });

  it('by a filter is what the filter leaves, and restoring by one means the deleted', async () => {
    const { body } = await remove({ filter: { text: 'housing' }, except: [] });
    expect(body.ids.length).toBeGreaterThan(0);
    expect((await remove({ filter: {}, except: [at(2)] })).body.ids).toHaveLength(7 - body.ids.length);
    expect((await list()).items.map(({ id }) => id)).toEqual([at(2)]);
    expect((await restore({ filter: { text: 'housing' }, except: [] })).body.ids).toEqual(body.ids);
    expect((await restore({ filter: {}, except: [] })).body.ids).toHaveLength(7 - body.ids.length);
    expect(await list()).toMatchObject({ total: 8, deleted: 0 });
  });

  it('by a filter is refused where other than the expected number of parts match by now', async () => {
    const before = await list();
    expect(await remove({ filter: {}, except: [at(0)], expected: 6 })).toMatchObject({ status: 409, body: { code: 'conflict', detail: '7 parts match now; you chose 6. Look again.' } });
    expect(await list()).toEqual(before);
    expect((await remove({ filter: {}, except: [at(0)], expected: 7 })).body.ids).toHaveLength(7);
    expect(await remove({ filter: {}, except: [], expected: 8 })).toMatchObject({ status: 409, body: { detail: '1 part matches now; you chose 8. Look again.' } });
    expect((await restore({ filter: {}, except: [], expected: 8 })).status).toBe(409);
    expect((await restore({ filter: {}, except: [], expected: 7 })).body.ids).toHaveLength(7);
  });

  it('deleted again, and restored when it is there, is left as it is', async () => {
    await remove({ ids: [at(0)] });
    const { deletedAt } = await engineer.get<Part>(`/parts/${at(0)}`);
    expect((await remove({ ids: [at(0), at(1)] })).body.ids).toEqual([at(1)]);
    expect((await engineer.get<Part>(`/parts/${at(0)}`)).deletedAt).toBe(deletedAt);
    expect((await restore({ ids: [at(2)] })).body.ids).toEqual([]);
  });

  it('is heard of by the readers of the list, and stands in the audit', async () => {
    const ears = await listen(engineer);
    await ears.wait(({ type }) => type === 'hello');
    await remove({ ids });
    await ears.wait((event) => event.type === 'parts' && event.projectId === projectId);
    ears.close();
    const audit = await database.look<{ after: { parts: unknown[] } }>(`select after from audit_events where action = 'part.delete' and subject_id = $1`, [projectId]);
    expect(audit).toHaveLength(1);
    expect(audit[0]?.after.parts).toHaveLength(8);
  });

  it('of another organisation or project is not found', async () => {
    const stranger = api.visit();
    await stranger.signUp('Other Person');
    expect((await remove({ ids: [at(0)] }, stranger)).status).toBe(404);
    expect((await remove({ ids: [at(0), randomUUID()] })).status).toBe(404);
    expect((await list()).total).toBe(8);
  });
});

describe('thirty days later', () => {
  const objects = (): Promise<{ payload: { objectKey: string } }[]> => database.look(`select payload from outbox where job = 'object.delete'`);
  const sweep = async (): Promise<void> => {
    const worker = await startTestWorker(programEnvironment(database, Number(new URL(api.url).port)));
    const end = Date.now() + 15_000;
    // Housekeeping begins with the worker; what it is to forget here is gone once the oldest is.
    while (Date.now() < end && (await database.look(`select 1 from parts where deleted_at < now() - interval '30 days'`)).length > 0) await new Promise((resolve) => setTimeout(resolve, 50));
    await worker.stop();
  };

  it('the worker forgets what is deleted so long, and nothing else', async () => {
    const change = await engineer.expect<{ id: string }>('POST', `/projects/${projectId}/setting-changes`, { parts: { ids }, change: { lengthUnit: 'm' } });
    await remove({ ids: [at(0), at(1), at(2)] });
    await database.look(`update parts set deleted_at = now() - interval '30 days 1 minute' where id = any($1::uuid[])`, [[at(0), at(1)]]);
    await database.look(`update part_summaries set deleted_at = parts.deleted_at from parts where parts.id = part_id`);
    // Nothing of it may be found afterwards but its audit; a file of the first is sent again elsewhere.
    const [key] = await database.look<{ object_key: string }>(`select object_key from uploads join revisions on upload_id = uploads.id where part_id = $1`, [at(0)]);
    await sweep();
    expect((await engineer.ask('GET', `/parts/${at(0)}`)).status).toBe(404);
    expect(await engineer.get<Part>(`/parts/${at(2)}`)).toMatchObject({ number: 3 });
    expect(await list()).toMatchObject({ total: 5, deleted: 1 });
    for (const table of ['revisions', 'part_summaries']) expect(await database.look(`select 1 from ${table} where part_id = any($1::uuid[])`, [[at(0), at(1)]]), table).toEqual([]);
    expect(await database.look('select 1 from settings_change_items where change_id = $1', [change.id])).toHaveLength(6);
    expect(await database.look(`select state from uploads where object_key = $1`, [key?.object_key])).toEqual([{ state: 'discarded' }]);
    expect((await objects()).map(({ payload }) => payload.objectKey)).toContain(key?.object_key);
    expect(await database.look(`select actor_id from audit_events where action = 'part.forget' and subject_id = any($1::uuid[])`, [[at(0), at(1)]])).toEqual([{ actor_id: null }, { actor_id: null }]);
    // Taking back what was changed goes on with what is left.
    await restore({ ids: [at(2)] });
    expect(await engineer.expect('POST', `/setting-changes/${change.id}/undo`)).toMatchObject({ changed: 6, left: [] });
  });

  it('a part that was restored in time stays, and one that has a day left', async () => {
    await remove({ ids: [at(0), at(1), at(2)] });
    await database.look(`update parts set deleted_at = now() - interval '29 days' where id = $1`, [at(0)]);
    await database.look(`update parts set deleted_at = now() - interval '31 days' where id = any($1::uuid[])`, [[at(1), at(2)]]);
    await database.look(`update part_summaries set deleted_at = parts.deleted_at from parts where parts.id = part_id`);
    await restore({ ids: [at(1)] });
    await sweep();
    expect((await list('deleted=true')).items.map(({ id }) => id)).toEqual([at(0)]);
    expect((await list()).items.map(({ number }) => number)).toEqual([2, 4, 5, 6, 7, 8]);
  });
});
