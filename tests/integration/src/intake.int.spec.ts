import { gzipSync } from 'node:zlib';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { cleanFileName, cleanFolder, type NameMatches, type OpenUploads, type Part, type PartGrants, type PartList, type Problem, type StorageUse, type Upload } from '@masswright/contracts';
import { createObjectStorage, type ObjectStorage } from '@masswright/storage';
import { programEnvironment, startTestApi, type TestApi } from '../../support/api';
import { cutIntoParts, hashOf, type ApiUser } from '../../support/api-user';
import { environment } from '../../support/environment';
import { asciiBlock, block, sphere } from '../../support/meshes';
import { expectSummariesToFollow } from '../../support/summaries';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';
import { startTestWorker, type TestWorker } from '../../support/worker';

const roomBytes = 60_000_000;
let database: TestDatabase;
let api: TestApi;
let worker: TestWorker;
let storage: ObjectStorage;
let engineer: ApiUser;
let projectId: string;

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database, { ORGANISATION_MAX_BYTES: String(roomBytes) });
  worker = await startTestWorker(programEnvironment(database, Number(new URL(api.url).port)));
  storage = createObjectStorage(environment.storage);
  engineer = api.visit();
  await engineer.signUp();
  projectId = (await engineer.createProject()).id;
});
afterEach(async () => {
  // While the worker writes, what was read first is older than what was read next.
  await expect.poll(async () => (await database.look('select 1 from outbox where done_at is null')).length, { timeout: 30_000 }).toBe(0);
  await expectSummariesToFollow(database);
});
afterAll(async () => {
  storage.close();
  await worker.stop();
  await api.close();
  await database.drop();
});

const announce = (fileName: string, sizeBytes: number, folder?: string) => engineer.expect<Upload>('POST', `/projects/${projectId}/uploads`, { fileName, sizeBytes, folder });
const box = (side: number) => block([0, 0, 0], [side, 20, 30]);

describe('an upload that broke off', () => {
  it('is found again by its person, and says what has arrived with its hashes', async () => {
    const bytes = sphere(50, 400_000);
    const upload = await announce('broken off.stl', bytes.length, 'drop/left');
    const [first] = cutIntoParts(bytes, upload);
    if (first === undefined) throw new Error('The file has no part.');
    const { grants } = await engineer.expect<PartGrants>('POST', `/uploads/${upload.id}/part-grants`, { parts: [{ partNumber: 1, sha256: hashOf(first) }] });
    await fetch(grants[0]?.url ?? '', { method: 'PUT', headers: grants[0]?.headers, body: first });
    const { items } = await engineer.get<OpenUploads>(`/projects/${projectId}/uploads`);
    expect(items).toMatchObject([{ id: upload.id, fileName: 'broken off.stl', folder: 'drop/left', sizeBytes: bytes.length }]);
    expect((await engineer.get<Upload>(`/uploads/${upload.id}`)).storedParts).toEqual([{ partNumber: 1, sizeBytes: first.length, sha256: hashOf(first) }]);
    await engineer.expect('DELETE', `/uploads/${upload.id}`);
    expect((await engineer.get<OpenUploads>(`/projects/${projectId}/uploads`)).items).toEqual([]);
  });

  it('is not completed as another file of its name and size', async () => {
    const [mine, other] = [box(10), box(11)];
    const upload = await engineer.send(projectId, 'twin.stl', other);
    const complete = (bytes: Uint8Array) => engineer.ask<Problem>('POST', `/uploads/${upload.id}/completion`, { setting: { lengthUnit: 'mm', densityKgM3: 2700 }, partHashes: [hashOf(bytes)] });
    const refused = await complete(mine);
    expect([refused.status, refused.body.code]).toEqual([409, 'upload-incomplete']);
    expect((await complete(other)).status).toBe(201);
  });
});

describe('the room of an organisation', () => {
  it('is enforced, and a refusal says which limit and by how much; two at once can’t both take the last room', async () => {
    const { usedBytes, limitBytes } = await engineer.get<StorageUse>('/storage-use');
    expect(limitBytes).toBe(roomBytes);
    const left = roomBytes - usedBytes;
    const listBegun = async () => (await storage.listMultipartUploads({ prefix: 'meshes/' })).map(({ key }) => key);
    const begunBefore = await listBegun();
    const refused = await engineer.ask<Problem>('POST', `/projects/${projectId}/uploads`, { fileName: 'over.stl', sizeBytes: left + 2_000_000 });
    expect([refused.status, refused.body.code]).toEqual([413, 'quota-exceeded']);
    expect(refused.body.detail).toContain(': 2 MB too much.');
    const answers = await Promise.all(Array.from({ length: 6 }, (_, index) => engineer.ask<Upload>('POST', `/projects/${projectId}/uploads`, { fileName: `last ${index}.stl`, sizeBytes: left - 1000 })));
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 413, 413, 413, 413, 413]);
    const taken = answers.find(({ status }) => status === 201)?.body.id ?? '';
    await engineer.expect('DELETE', `/uploads/${taken}`);
    expect((await engineer.get<StorageUse>('/storage-use')).usedBytes).toBe(usedBytes);
    // What was refused left nothing behind in the storage.
    const begun = (await listBegun()).filter((key) => !begunBefore.includes(key));
    await expect.poll(async () => (await listBegun()).filter((key) => begun.includes(key)), { timeout: 10_000 }).toEqual([]);
  });
});

describe('bytes that are known', () => {
  const measured = (bytes: Uint8Array) => database.look(`select 1 from measurements where sha256 = decode($1, 'hex')`, [hashOf(bytes)]);
  it('are measured once, and the person is told where they are already', async () => {
    const bytes = box(12.5);
    const first = await engineer.waitForRun((await engineer.addMesh(projectId, 'first.stl', bytes)).id);
    const again = await engineer.waitForRun((await engineer.addMesh(projectId, 'again.stl', bytes, { lengthUnit: 'inch', densityKgM3: 1000 })).id);
    expect(again.revision.measurement).toEqual(first.revision.measurement);
    expect(again.sameBytes).toEqual([{ projectId, projectName: again.projectName, partId: first.id, number: first.number, name: 'first', letter: 'A' }]);
    expect((await engineer.get<Part>(`/parts/${first.id}`)).sameBytes).toMatchObject([{ partId: again.id }]);
    expect(await measured(bytes)).toHaveLength(1);
    const row = (await engineer.get<PartList>(`/projects/${projectId}/parts?text=again`)).items[0];
    expect(row).toMatchObject({ name: 'again', sameBytes: 1 });
  });

  it('are measured once also when twelve of them come at the same moment, to two workers', async () => {
    // A lock that outlasts the test: a run that waited must be handed out again by the outbox, not be found as stalled.
    const variables = { ...programEnvironment(database, Number(new URL(api.url).port)), QUEUE_LOCK_MS: '600000' };
    await worker.stop();
    worker = await startTestWorker(variables);
    const second = await startTestWorker(variables);
    try {
      const bytes = sphere(31, 60_000);
      const uploads = await Promise.all(Array.from({ length: 12 }, (_, index) => engineer.send(projectId, `twelve ${index}.stl`, bytes)));
      const parts = await Promise.all(uploads.map(({ id }) => engineer.complete(id)));
      const ended = await Promise.all(parts.map(({ id }) => engineer.waitForRun(id, 60_000)));
      expect(ended.map(({ revision }) => revision.run.state)).toEqual(parts.map(() => 'done'));
      expect(new Set(ended.map(({ revision }) => JSON.stringify(revision.measurement))).size).toBe(1);
      expect(await measured(bytes)).toHaveLength(1);
    } finally {
      await second.stop();
    }
  }, 90_000);

  it('of another organisation show nowhere: the answers are those to a file that nobody has', async () => {
    const bytes = box(13.5);
    await engineer.waitForRun((await engineer.addMesh(projectId, 'ours.stl', bytes)).id);
    const stranger = api.visit();
    await stranger.signUp();
    const theirs = (await stranger.createProject()).id;
    const same = await stranger.waitForRun((await stranger.addMesh(theirs, 'theirs.stl', bytes)).id);
    const fresh = await stranger.waitForRun((await stranger.addMesh(theirs, 'fresh.stl', block([0, 0, 0], [13.5, 20, 31]))).id);
    expect(same.sameBytes).toEqual([]);
    expect(Object.keys(same.revision)).toEqual(Object.keys(fresh.revision));
    // The path that the worker took is the same too: neither was compared with anything of the other organisation.
    expect(await measured(bytes)).toHaveLength(2);
  });
});

describe('names', () => {
  it.each<[string, string]>([
    ['../../etc/passwd.stl', 'passwd.stl'],
    ['C:\\parts\\drum.stl', 'drum.stl'],
    ['line\nbreak\u0007.stl', 'linebreak.stl'],
    ['gnp\u202elts.drum', 'gnplts.drum'],
    ['zero\u200bwidth.stl', 'zerowidth.stl'],
    ['ru\u0308ckwand.stl', 'rückwand.stl'],
    ['\u0000', 'unnamed'],
    [`${'n'.repeat(296)}.stl`, `${'n'.repeat(159)}…${'n'.repeat(36)}.stl`],
  ])('%j is kept as %j', async (given, kept) => {
    const upload = await announce(given, 684);
    expect(upload.fileName).toBe(kept);
    expect(cleanFileName(given)).toBe(kept);
    await engineer.expect('DELETE', `/uploads/${upload.id}`);
  });

  it('of folders lose what climbs out of them', () => {
    expect(cleanFolder('../../secret/./left\u202e')).toBe('secret/left');
    expect(cleanFolder('C:\\parts\\mark 2')).toBe('C:/parts/mark 2');
    expect([...cleanFolder('a/'.repeat(500))]).toHaveLength(400);
  });

  it('two files of one name are two parts, and a name that differs in case is a match that says so', async () => {
    const { id } = await engineer.createProject();
    const [left, right] = [await engineer.addMesh(id, 'Bracket.stl', box(1), undefined, { partName: 'Bracket (left)' }), await engineer.addMesh(id, 'Bracket.stl', box(2), undefined, { partName: 'Bracket (right)' })];
    expect([left.number, right.number]).toEqual([1, 2]);
    const { matches } = await engineer.expect<NameMatches>('POST', `/projects/${id}/name-matches`, { fileNames: ['bracket.STL', 'other.stl', 'x/Bracket.stl'] });
    expect(matches.map(({ fileName, number, sameCase }) => [fileName, number, sameCase])).toEqual([
      ['bracket.STL', 1, false],
      ['bracket.STL', 2, false],
      ['x/Bracket.stl', 1, true],
      ['x/Bracket.stl', 2, true],
    ]);
  });
});

describe('a next revision', () => {
  const weighing = { massKg: 0.0162, uncertaintyKg: 0.0001 };

  it('takes the setting of the one before, but never its weighed mass, and keeps its reason', async () => {
    const added = await engineer.waitForRun((await engineer.addMesh(projectId, 'lever.stl', block([0, 0, 0], [10, 20, 30]), { lengthUnit: 'mm', material: { id: 'al-6061-t6' } })).id);
    const axis = { kind: 'typed', pointM: [0.01, 0, 0], direction: [0, 1, 0] };
    const set = await engineer.expect<Part>('PATCH', `/parts/${added.id}/setting`, { version: 1, weighing, axis });
    expect(set.revision.setting).toMatchObject({ weighing, material: { id: 'al-6061-t6' }, unitStated: { by: 'Ines Marsh' } });
    const upload = await engineer.send(projectId, 'lever.stl', block([0, 0, 0], [10, 20, 31]));
    const next = await engineer.waitForRun((await engineer.complete(upload.id, { lengthUnit: 'inch', densityKgM3: 1 }, { revisionOf: { partId: added.id, reason: 'boss 1 mm longer' } })).id);
    expect(next.id).toBe(added.id);
    expect(next.number).toBe(added.number);
    expect(next.revision).toMatchObject({ letter: 'B', reason: 'boss 1 mm longer' });
    const { densityKgM3, densitySpreadKgM3, material } = set.revision.setting;
    expect(next.revision.setting).toMatchObject({ lengthUnit: 'mm', densityKgM3, densitySpreadKgM3, material, axis, weighing: null, unitStated: null });
    // Who still has the setting of the revision before in view can't change this one by it.
    expect(next.revision.setting.version).toBe(set.revision.setting.version + 1);
    const late = await engineer.ask<Problem>('PATCH', `/parts/${added.id}/setting`, { version: set.revision.setting.version, densityKgM3: 1 });
    expect(late).toMatchObject({ status: 409, body: { code: 'stale-version' } });
    expect(next.revisions.map(({ letter, reason }) => [letter, reason])).toEqual([
      ['B', 'boss 1 mm longer'],
      ['A', ''],
    ]);
    expect(next.unitDoubt).toBeNull();
    expect(next.state).toBe('ready');
  });

  it('whose volume stands to the one before as cubes of units do is asked for its unit again, until somebody answers', async () => {
    const added = await engineer.waitForRun((await engineer.addMesh(projectId, 'pin.stl', block([0, 0, 0], [10, 20, 30]))).id);
    // The same body, exported in inches, and a little changed.
    const upload = await engineer.send(projectId, 'pin.stl', block([0, 0, 0], [10 / 25.4, 20 / 25.4, 31 / 25.4]));
    const next = await engineer.waitForRun((await engineer.complete(upload.id, { lengthUnit: null }, { revisionOf: { partId: added.id, reason: '' } })).id);
    expect(next.state).toBe('unit-doubt');
    expect(next.unitDoubt?.lengthUnit).toBe('inch');
    const row = (await engineer.get<PartList>(`/projects/${projectId}/parts?states=unit-doubt`)).items;
    expect(row.map(({ id }) => id)).toEqual([added.id]);
    const kept = await engineer.expect<Part>('PATCH', `/parts/${added.id}/setting`, { version: next.revision.setting.version, lengthUnit: 'mm' });
    expect([kept.state, kept.unitDoubt]).toEqual(['ready', null]);
    const mended = await engineer.expect<Part>('PATCH', `/parts/${added.id}/setting`, { version: kept.revision.setting.version, lengthUnit: 'inch' });
    expect(mended.revision.setting).toMatchObject({ lengthUnit: 'inch', unitStated: { by: 'Ines Marsh' } });
  });

  it('of a part without a unit takes the one that is stated with it', async () => {
    const added = await engineer.addMesh(projectId, 'bare.stl', box(3), { lengthUnit: null });
    expect(added.revision.setting.unitStated).toBeNull();
    const upload = await engineer.send(projectId, 'bare.stl', box(4));
    const next = await engineer.complete(upload.id, { lengthUnit: 'cm', densityKgM3: 1200 }, { revisionOf: { partId: added.id, reason: '' } });
    expect(next.revision.setting).toMatchObject({ lengthUnit: 'cm', densityKgM3: 1200, unitStated: { by: 'Ines Marsh' } });
  });

  it('made twice at once is two revisions, one after the other', async () => {
    const added = await engineer.addMesh(projectId, 'raced.stl', box(5));
    const uploads = await Promise.all([6, 7, 8].map((side) => engineer.send(projectId, 'raced.stl', box(side))));
    const made = await Promise.all(uploads.map(({ id }) => engineer.complete(id, undefined, { revisionOf: { partId: added.id, reason: 'race' } })));
    expect(made.map(({ revision }) => revision.letter).sort()).toEqual(['B', 'C', 'D']);
    expect((await engineer.get<Part>(`/parts/${added.id}`)).revisions.map(({ letter }) => letter)).toEqual(['D', 'C', 'B', 'A']);
  });

  it('of a part of another project or organisation is refused', async () => {
    const other = (await engineer.createProject()).id;
    const elsewhere = await engineer.addMesh(other, 'elsewhere.stl', box(9));
    const upload = await engineer.send(projectId, 'elsewhere.stl', box(9));
    const answer = await engineer.ask('POST', `/uploads/${upload.id}/completion`, { setting: { lengthUnit: null }, revisionOf: { partId: elsewhere.id, reason: '' } });
    expect(answer.status).toBe(404);
    expect((await engineer.get<Upload>(`/uploads/${upload.id}`)).state).toBe('open');
  });
});

describe('a file that could not be measured', () => {
  it('can be read again, and be replaced by a next revision', async () => {
    const failed = await engineer.waitForRun((await engineer.addMesh(projectId, 'hopeless.stl', box(10).slice(0, 300))).id);
    expect(failed.state).toBe('failed');
    const again = await engineer.expect<Part>('POST', `/parts/${failed.id}/run`);
    expect(['queued', 'running', 'failed']).toContain(again.revision.run.state);
    const still = await engineer.waitForRun(failed.id);
    expect(still.revision.run.error?.code).toBe('file-truncated');
    expect(still.revision.sha256).toBe(hashOf(box(10).slice(0, 300)));
    expect(await database.look(`select 1 from audit_events where action = 'measurement.refuse' and subject_id = $1`, [still.revision.id])).toHaveLength(2);
    const upload = await engineer.send(projectId, 'hopeless.stl', box(10.25));
    const mended = await engineer.waitForRun((await engineer.complete(upload.id, undefined, { revisionOf: { partId: failed.id, reason: 'exported anew' } })).id);
    expect(mended).toMatchObject({ state: 'ready', revision: { letter: 'B', setting: { lengthUnit: 'mm' } } });
    expect((await engineer.ask('POST', `/parts/${failed.id}/run`)).status).toBe(409);
  });
});

describe('a file that is refused while it is read', () => {
  it('is hashed to its end, so that it is known again when it is dropped once more', async () => {
    // Refused at its first face, with most of the file still to come.
    const bytes = new TextEncoder().encode(`v 0 0 0\nv 1 0 0\nv 0 1 0\nf 1 2 99999999999\n${'# and so on\n'.repeat(200_000)}`);
    const failed = await engineer.waitForRun((await engineer.addMesh(projectId, 'refused.obj', bytes)).id);
    expect([failed.state, failed.revision.sha256]).toEqual(['failed', hashOf(bytes)]);
    expect(await database.look(`select 1 from uploads where sha256 = decode($1, 'hex') and organisation_id = (select organisation_id from projects where id = $2)`, [hashOf(bytes), projectId])).toHaveLength(1);
    const { matches } = await engineer.expect<NameMatches>('POST', `/projects/${projectId}/name-matches`, { fileNames: ['refused.obj'] });
    expect(matches.map(({ partId, sha256 }) => [partId, sha256])).toEqual([[failed.id, hashOf(bytes)]]);
  });
});

describe('formats', () => {
  const cube = 'v 0 0 0\nv 10 0 0\nv 10 10 0\nv 0 10 0\nv 0 0 10\nv 10 0 10\nv 10 10 10\nv 0 10 10\nf 4 3 2 1\nf 5 6 7 8\nf 1 2 6 5\nf 2 3 7 6\nf 3 4 8 7\nf 4 1 5 8\n';
  const bytesOf = (text: string) => new TextEncoder().encode(text);

  it('OBJ, and STL and OBJ packed with gzip, are told by their content whatever their names say', async () => {
    const files: [string, Uint8Array, string, string | null][] = [
      ['cube.stl', bytesOf(cube), 'obj', null],
      ['cube.obj.gz', gzipSync(bytesOf(cube)), 'obj', 'gzip'],
      ['ascii.bin', gzipSync(asciiBlock([0, 0, 0], [10, 10, 10])), 'stl-ascii', 'gzip'],
      ['binary.txt', gzipSync(block([0, 0, 0], [10, 10, 10])), 'stl-binary', 'gzip'],
    ];
    for (const [name, bytes, format, compression] of files) {
      const part = await engineer.waitForRun((await engineer.addMesh(projectId, name, new Uint8Array(bytes))).id);
      expect(part.revision, name).toMatchObject({ format, compression, run: { error: null } });
      expect(part.revision.measurement?.volume?.content, name).toBe(1000);
    }
  });

  it('a file that is none ends in its own error while the others go on', async () => {
    const parts = await Promise.all([engineer.addMesh(projectId, 'bomb.stl.gz', new Uint8Array(gzipSync(new Uint8Array(200_000_000)))), engineer.addMesh(projectId, 'fine.stl', box(14.5)), engineer.addMesh(projectId, 'vertices only.obj', bytesOf('v 0 0 0\nv 1 0 0\n'))]);
    const [bomb, fine, vertices] = await Promise.all(parts.map(({ id }) => engineer.waitForRun(id, 60_000)));
    expect(fine?.revision.run.state).toBe('done');
    expect(bomb?.revision.run.state).toBe('failed');
    expect(vertices?.revision.run.error?.code).toBe('facets-none');
  }, 90_000);
});

describe('a file that takes too long', () => {
  it('is broken off with words, and measured when it is asked for again', async () => {
    const variables = programEnvironment(database, Number(new URL(api.url).port));
    await worker.stop();
    worker = await startTestWorker({ ...variables, MEASURING_LIMIT_MS: '1' });
    const broken = await engineer.waitForRun((await engineer.addMesh(projectId, 'slow.stl', box(15.5))).id);
    expect(broken.revision.run.error?.code).toBe('took-too-long');
    await worker.stop();
    worker = await startTestWorker(variables);
    await engineer.expect('POST', `/parts/${broken.id}/run`);
    expect((await engineer.waitForRun(broken.id)).state).toBe('ready');
  }, 90_000);
});
