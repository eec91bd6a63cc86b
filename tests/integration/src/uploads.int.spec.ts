import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { FailedRecord, Page, Part, PartGrants, PartList, Problem, Project, ServerEvent, Upload } from '@masswright/contracts';
import { createObjectStorage, type ObjectStorage } from '@masswright/storage';
import { programEnvironment, startTestApi, type TestApi } from '../../support/api';
import { cutIntoParts, hashOf, type ApiUser } from '../../support/api-user';
import { environment } from '../../support/environment';
import { listen } from '../../support/events';
import { asciiBlock, block, sphere } from '../../support/meshes';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';
import { startTestWorker, type TestWorker } from '../../support/worker';

let database: TestDatabase;
let api: TestApi;
let worker: TestWorker;
let storage: ObjectStorage;
let engineer: ApiUser;
let projectId: string;

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  worker = await startTestWorker(programEnvironment(database, Number(new URL(api.url).port)));
  storage = createObjectStorage(environment.storage);
  engineer = api.visit();
  await engineer.signUp();
  projectId = (await engineer.createProject()).id;
});
afterAll(async () => {
  storage.close();
  await worker.stop();
  await api.close();
  await database.drop();
});

const keyOf = async (partId: string) =>
  (await database.look<{ key: string }>(`select object_key as key from uploads join revisions on upload_id = uploads.id where part_id = $1`, [partId]))[0]?.key ?? '';

const text = (content: string) => new TextEncoder().encode(content);
function withCount(bytes: Uint8Array<ArrayBuffer>, count: number): Uint8Array<ArrayBuffer> {
  const changed = bytes.slice();
  new DataView(changed.buffer).setUint32(80, count, true);
  return changed;
}
function withNumber(bytes: Uint8Array<ArrayBuffer>, at: number, value: number): Uint8Array<ArrayBuffer> {
  const changed = bytes.slice();
  new DataView(changed.buffer).setFloat32(at, value, true);
  return changed;
}
const good = block([0, 0, 0], [10, 20, 30]);

/** The one grant of a file that is one part. */
async function grantOnly(upload: Upload, bytes: Uint8Array): Promise<PartGrants['grants'][number]> {
  const { grants } = await engineer.expect<PartGrants>('POST', `/uploads/${upload.id}/part-grants`, { parts: [{ partNumber: 1, sha256: hashOf(bytes) }] });
  const [grant] = grants;
  if (grant === undefined) throw new Error('The part was not granted.');
  return grant;
}
const png = Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, ...Array.from({ length: 2000 }, (_, index) => (index * 37) % 256)]);
// A header that says 85,899,344 facets, which with 84 bytes of header make 4 GB.
const declared4GB = withCount(good, 85_899_344);

describe('files that must be refused', () => {
  it.each<[string, Uint8Array, string, RegExp]>([
    ['an empty file', new Uint8Array(), 'file-empty', /empty/i],
    ['a text', text('Dear Sir or Madam,\nplease find attached the drawings.\n'), 'format-unknown', /STL/],
    ['a truncated binary', good.slice(0, good.length - 70), 'file-truncated', /cut off|fewer|room|ends/i],
    ['a count that says too many', withCount(good, 13), 'count-contradicts-size', /13/],
    ['a count that says too few', withCount(good, 7), 'count-contradicts-size', /7/],
    ['a picture renamed', png, 'format-unknown', /PNG|picture/],
    ['a coordinate that is no number', withNumber(good, 84 + 12, Number.NaN), 'number-not-finite', /facet|number/i],
    ['an infinite coordinate', withNumber(good, 84 + 50 + 16, Number.POSITIVE_INFINITY), 'number-not-finite', /facet|number/i],
    ['a header that declares 4 GB', declared4GB, 'count-contradicts-size', /85/],
    ['a truncated ASCII file', asciiBlock([0, 0, 0], [1, 1, 1]).slice(0, 700), 'file-truncated', /.+/],
  ])('%s: a clear sentence, no measurement, and the row stays with its reason and its bytes', async (name, bytes, code, sentence) => {
    const before = await database.look('select id from measurements');
    const added = await engineer.addMesh(projectId, `${name}.stl`, bytes);
    const key = await keyOf(added.id);
    const part = await engineer.waitForRun(added.id);
    expect(part.revision.run.state).toBe('failed');
    expect(part.revision.run.error).toMatchObject({ code });
    expect(part.revision.run.error?.message).toMatch(sentence);
    expect(part.revision.run.error?.message).toMatch(/\.$/);
    expect(part.revision.measurement).toBeNull();
    expect(await database.look('select id from measurements')).toEqual(before);
    expect(await storage.headObject(key)).toEqual({ sizeBytes: bytes.length });
    const row = (await engineer.get<PartList>(`/projects/${projectId}/parts?limit=200`)).items.find(({ id }) => id === part.id);
    expect(row).toMatchObject({ state: 'failed', massKg: null, revision: { run: { error: { code } } } });
    expect(await engineer.get<FailedRecord>(`/parts/${part.id}/statement`)).toMatchObject({ file: `${name}.stl`, error: { code } });
  });

  it('a file over the limit is refused before a byte is sent, and the answer says by how much', async () => {
    const { status, body } = await engineer.ask<Problem>('POST', `/projects/${projectId}/uploads`, { fileName: 'huge.stl', sizeBytes: 4_294_967_296 });
    expect(status).toBe(413);
    expect(body.detail).toBe('This file has 4.29 GB; one file may have 2.15 GB. It is 2.15 GB too large.');
    expect(await database.look(`select 1 from uploads where file_name = 'huge.stl'`)).toEqual([]);
  });

  it('an open mesh is measured, but has no figures', async () => {
    const open = withCount(good.slice(0, good.length - 50), 11);
    const part = await engineer.waitForRun((await engineer.addMesh(projectId, 'open.stl', open)).id);
    expect(part.revision.measurement?.soundness).toMatchObject({ closed: false, defensible: false, boundaryEdges: 3 });
    expect(part.revision.measurement?.volume).toBeNull();
    expect(await engineer.get(`/parts/${part.id}/statement`)).toMatchObject({ massKg: null, centreOfMassM: null, inertiaAtCentreOfMassKgM2: null });
    expect(await storage.headObject(await keyOf(part.id))).toEqual({ sizeBytes: open.length });
  });
});

describe('an upload', () => {
  it('of several parts arrives byte for byte, whatever the order of the parts', async () => {
    const bytes = sphere(50, 400_000);
    const upload = await engineer.expect<Upload>('POST', `/projects/${projectId}/uploads`, { fileName: 'sphere.stl', sizeBytes: bytes.length });
    expect(upload.partCount).toBeGreaterThan(1);
    const bodies = cutIntoParts(bytes, upload);
    const { grants } = await engineer.expect<PartGrants>('POST', `/uploads/${upload.id}/part-grants`, {
      parts: bodies.map((body, index) => ({ partNumber: index + 1, sha256: hashOf(body) })).reverse(),
    });
    for (const { partNumber, url, headers } of grants) {
      const incomplete = await engineer.ask<Problem>('POST', `/uploads/${upload.id}/completion`, { setting: { lengthUnit: 'mm', densityKgM3: 1000 } });
      expect(incomplete.body.code).toBe('upload-incomplete');
      await fetch(url, { method: 'PUT', headers, body: bodies[partNumber - 1] ?? null });
    }
    expect((await engineer.get<Upload>(`/uploads/${upload.id}`)).storedParts).toEqual(bodies.map((body, index) => ({ partNumber: index + 1, sizeBytes: body.length, sha256: hashOf(body) })));
    const part = await engineer.waitForRun((await engineer.complete(upload.id)).id, 60_000);
    expect(part.revision.run.error).toBeNull();
    expect(part.revision.sha256).toBe(createHash('sha256').update(bytes).digest('hex'));
  }, 90_000);

  it('a part of another length, other bytes, another number or another key than granted is refused by the storage', async () => {
    const upload = await engineer.expect<Upload>('POST', `/projects/${projectId}/uploads`, { fileName: 'a.stl', sizeBytes: good.length });
    const { url, headers } = await grantOnly(upload, good);
    const put = (address: string, body: Uint8Array<ArrayBuffer>) => fetch(address, { method: 'PUT', headers, body });
    expect((await put(url, new Uint8Array(good.length + 1))).status).toBe(403);
    expect((await put(url, withCount(good, 11))).status).toBe(400);
    expect((await put(url.replace('partNumber=1', 'partNumber=2'), good)).status).toBe(403);
    expect((await put(url.replace('meshes/', 'meshes/other-'), good)).status).toBe(403);
    expect((await fetch(url)).status).toBe(403);
    expect((await engineer.ask('POST', `/uploads/${upload.id}/part-grants`, { parts: [{ partNumber: 2, sha256: hashOf(good) }] })).status).toBe(422);
    expect((await engineer.get<Upload>(`/uploads/${upload.id}`)).storedParts).toEqual([]);
  });

  it('completed many times at once and again later makes one part, one run and one measurement', async () => {
    const bytes = block([0, 0, 0], [7, 7, 7.5]);
    const upload = await engineer.send(projectId, 'many.stl', bytes);
    const answers = await Promise.all(Array.from({ length: 8 }, () => engineer.ask<Part>('POST', `/uploads/${upload.id}/completion`, { setting: { lengthUnit: 'mm', densityKgM3: 1000 } })));
    const ids = new Set(answers.filter(({ status }) => status === 201).map(({ body }) => body.id));
    expect(ids.size).toBe(1);
    expect(answers.every(({ status }) => status === 201 || status === 409)).toBe(true);
    const [id = ''] = ids;
    await engineer.waitForRun(id);
    expect((await engineer.complete(upload.id)).id).toBe(id);
    const hash = createHash('sha256').update(bytes).digest('hex');
    expect(await database.look(`select 1 from measurements where sha256 = decode($1, 'hex')`, [hash])).toHaveLength(1);
    expect(await database.look(`select 1 from measuring_runs join revisions on revisions.id = revision_id where upload_id = $1`, [upload.id])).toHaveLength(1);
  });

  it('replayed after its completion changes nothing that is stored', async () => {
    const upload = await engineer.expect<Upload>('POST', `/projects/${projectId}/uploads`, { fileName: 'replay.stl', sizeBytes: good.length });
    const { url, headers } = await grantOnly(upload, good);
    await fetch(url, { method: 'PUT', headers, body: good });
    const part = await engineer.complete(upload.id);
    await engineer.waitForRun(part.id);
    expect((await fetch(url, { method: 'PUT', headers, body: good })).status).toBe(404);
    const { stream } = await storage.getObjectStream(await keyOf(part.id));
    const chunks: Buffer[] = [];
    for await (const chunk of stream) chunks.push(chunk as Buffer);
    expect(Buffer.concat(chunks).equals(good)).toBe(true);
    expect((await engineer.ask('POST', `/uploads/${upload.id}/part-grants`, { parts: [{ partNumber: 1, sha256: hashOf(good) }] })).status).toBe(409);
  });

  it('cancelled is gone from the storage; completing it is refused', async () => {
    const upload = await engineer.send(projectId, 'cancelled.stl', good);
    await engineer.expect('DELETE', `/uploads/${upload.id}`);
    await engineer.expect('DELETE', `/uploads/${upload.id}`);
    expect((await engineer.ask('POST', `/uploads/${upload.id}/completion`, { setting: { lengthUnit: 'mm', densityKgM3: 1 } })).status).toBe(409);
    const [row] = await database.look<{ key: string }>('select object_key as key from uploads where id = $1', [upload.id]);
    for (let turn = 0; turn < 100; turn++) {
      if (!(await storage.listMultipartUploads()).some(({ key }) => key === row?.key)) break;
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
    expect((await storage.listMultipartUploads()).some(({ key }) => key === row?.key)).toBe(false);
    expect(await storage.headObject(row?.key ?? '')).toBeUndefined();
  });

  it('cancelled and completed at once ends one way, and the rows and the storage agree', async () => {
    for (let round = 0; round < 6; round++) {
      const upload = await engineer.send(projectId, `race-${round}.stl`, good);
      const [cancelled, completed] = await Promise.all([
        engineer.ask('DELETE', `/uploads/${upload.id}`),
        engineer.ask<Part>('POST', `/uploads/${upload.id}/completion`, { setting: { lengthUnit: 'mm', densityKgM3: 1000 } }),
      ]);
      const { state } = await engineer.get<Upload>(`/uploads/${upload.id}`);
      if (state === 'stored') {
        expect([cancelled.status, completed.status]).toEqual([409, 201]);
        expect((await engineer.waitForRun(completed.body.id)).revision.run.state).toBe('done');
      } else {
        expect(cancelled.status).toBe(204);
        expect(completed.status).toBe(409);
        const [row] = await database.look<{ key: string }>('select object_key as key from uploads where id = $1', [upload.id]);
        await expect.poll(async () => (await database.look('select 1 from outbox where done_at is null')).length, { timeout: 10_000 }).toBe(0);
        expect(await storage.headObject(row?.key ?? '')).toBeUndefined();
      }
    }
  });
});

describe('what nobody came back to', () => {
  it('is swept by a worker as it starts: the upload is cancelled, and the storage keeps nothing of it', async () => {
    const upload = await engineer.send(projectId, 'left behind.stl', good);
    const kept = await engineer.send(projectId, 'begun just now.stl', good);
    await database.look(`update uploads set created_at = now() - interval '25 hours' where id = $1`, [upload.id]);
    const sweeper = await startTestWorker(programEnvironment(database, Number(new URL(api.url).port)));
    await expect.poll(async () => (await engineer.get<Upload>(`/uploads/${upload.id}`)).state, { timeout: 10_000 }).toBe('cancelled');
    const keysInStorage = async () => (await storage.listMultipartUploads()).map(({ key }) => key);
    const [row] = await database.look<{ key: string }>('select object_key as key from uploads where id = $1', [upload.id]);
    await expect.poll(async () => (await keysInStorage()).includes(row?.key ?? ''), { timeout: 10_000 }).toBe(false);
    expect((await engineer.get<Upload>(`/uploads/${kept.id}`)).state).toBe('open');
    await sweeper.stop();
  });
});

describe('the list of parts', () => {
  it('numbers parts without a gap, however many are added at once', async () => {
    const { id } = await engineer.createProject();
    const uploads = await Promise.all(Array.from({ length: 10 }, (_, index) => engineer.send(id, `part ${index}.stl`, good)));
    await Promise.all(uploads.map((upload) => engineer.complete(upload.id)));
    const { items } = await engineer.get<PartList>(`/projects/${id}/parts`);
    expect(items.map(({ number }) => number)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10]);
    expect((await engineer.get<Project>(`/projects/${id}`)).parts).toBe(10);
    expect((await engineer.get<Page<Project>>('/projects')).items.find((one) => one.id === id)?.parts).toBe(10);
  });

  it('the same file in two organisations is measured in each, and neither can tell', async () => {
    const other = api.visit();
    await other.signUp();
    const { id } = await other.createProject();
    const bytes = block([0, 0, 0], [3, 4, 5.5]);
    const [mine, theirs] = [await engineer.addMesh(projectId, 'same.stl', bytes), await other.addMesh(id, 'same.stl', bytes)];
    await engineer.waitForRun(mine.id);
    const part = await other.waitForRun(theirs.id);
    const hash = createHash('sha256').update(bytes).digest('hex');
    expect(await database.look(`select organisation_id from measurements where sha256 = decode($1, 'hex')`, [hash])).toHaveLength(2);
    expect(JSON.stringify(part)).not.toContain(mine.id);
    // Within one organisation it is kept once.
    const again = await engineer.waitForRun((await engineer.addMesh(projectId, 'same again.stl', bytes)).id);
    expect(again.revision.run.state).toBe('done');
    expect(await database.look(`select 1 from measurements where sha256 = decode($1, 'hex')`, [hash])).toHaveLength(2);
  });
});

describe('progress', () => {
  it('reaches the organisation’s streams, survives a reload, and reaches nobody else', async () => {
    const stranger = api.visit();
    await stranger.signUp();
    const [ours, theirs] = [await listen(engineer), await listen(stranger)];
    const part = await engineer.addMesh(projectId, 'watched.stl', sphere(20, 200_000));
    const isOurs = (event: ServerEvent) => 'partId' in event && event.partId === part.id;
    await ours.wait((event) => isOurs(event) && event.type === 'part');
    await ours.wait((event) => isOurs(event) && event.type === 'run' && event.state === 'running');
    await ours.wait((event) => isOurs(event) && event.type === 'run' && event.state === 'done', 20_000);
    const progress = ours.events.flatMap((event) => (event.type === 'run' && event.partId === part.id ? [event.progress] : []));
    expect(progress).toEqual([...progress].sort((a, b) => a - b));
    // A page that is opened anew reads the same state from the api.
    expect((await engineer.get<Part>(`/parts/${part.id}`)).revision.run).toMatchObject({ state: 'done', progress: 1 });
    expect(theirs.events.filter((event) => event.type !== 'hello')).toEqual([]);
    ours.close();
    theirs.close();
  });
});

describe('settings', () => {
  it('change by version: the second of two who change at once learns of the first', async () => {
    const part = await engineer.waitForRun((await engineer.addMesh(projectId, 'set.stl', good)).id);
    const change = (densityKgM3: number) => engineer.ask<Part & Problem>('PATCH', `/parts/${part.id}/setting`, { version: 1, densityKgM3 });
    const answers = await Promise.all([change(1000), change(2000)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(answers.find(({ status }) => status === 409)?.body.code).toBe('stale-version');
    const read = await engineer.get<Part>(`/parts/${part.id}`);
    expect(read.revision.setting.version).toBe(2);
    const rows = await database.look<{ before: { densityKgM3: number } }>(`select before from audit_events where action = 'setting.change' and subject_id = $1`, [part.revision.id]);
    expect(rows).toHaveLength(1);
    expect(rows[0]?.before.densityKgM3).toBe(2700);
  });

  it('keep every digit of a density, a point and a direction', async () => {
    const part = await engineer.addMesh(projectId, 'digits.stl', good);
    const densityKgM3 = 2699.123456789012;
    const axis = { kind: 'typed', pointM: [1e-7, -0.1, 0.30000000000000004], direction: [1e-300, 0, -1] };
    const drive = { speedRadPerS: 157.07963267948966, timeS: 0.1 + 0.2 };
    await engineer.expect('PATCH', `/parts/${part.id}/setting`, { version: 1, densityKgM3, axis, drive });
    expect((await engineer.get<Part>(`/parts/${part.id}`)).revision.setting).toMatchObject({ densityKgM3, axis, drive, lengthUnit: 'mm' });
  });

  it('can’t be nonsense', async () => {
    const part = await engineer.addMesh(projectId, 'nonsense.stl', good);
    for (const change of [{ densityKgM3: -1 }, { densityKgM3: 1e9 }, { lengthUnit: 'parsec' }, { axis: { kind: 'typed', pointM: [0, 0, 0], direction: [0, 0, 0] } }, { drive: { speedRadPerS: 1, timeS: 0 } }, { drive: { speedRadPerS: 1, timeS: 1e-320 } }, { axis: { kind: 'typed', pointM: [1e200, 0, 0], direction: [0, 0, 1] } }, { densityKgM3: 1e-300 }]) {
      expect((await engineer.ask('PATCH', `/parts/${part.id}/setting`, { version: 1, ...change })).status).toBe(422);
    }
  });
});
