import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { measuringVersion, type Part } from '@masswright/contracts';
import { writeBinaryStl } from '@masswright/geometry';
import { listen } from '../../support/events';
import type { ApiUser } from '../../support/api-user';
import { programEnvironment, startTestApi, type TestApi } from '../../support/api';
import { block, blockFacets, sphere } from '../../support/meshes';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';
import { startTestWorker, type TestWorker } from '../../support/worker';

let database: TestDatabase;
let api: TestApi;
let worker: TestWorker;
let engineer: ApiUser;
let projectId: string;

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  worker = await startTestWorker(programEnvironment(database, Number(new URL(api.url).port)));
  engineer = api.visit();
  await engineer.signUp();
  projectId = (await engineer.createProject()).id;
});
afterAll(async () => {
  await worker.stop();
  await api.close();
  await database.drop();
});

const restart = `update measurements set measuring_version = 'm1' where id = (select measurement_id from measuring_runs where revision_id = $1)`;

describe('a large mesh', () => {
  it('has its figures while the rest of it is examined, and keeps their bits', async () => {
    const heard = await listen(engineer);
    const added = await engineer.addMesh(projectId, 'large.stl', sphere(40, 150_000));
    await heard.wait((event) => event.type === 'run' && event.partId === added.id && event.stage === 'examining', 30_000);
    const early = await engineer.get<Part>(`/parts/${added.id}`);
    const whole = await engineer.waitForRun(added.id, 60_000);
    heard.close();

    expect(early.revision.run).toMatchObject({ state: 'running', stage: 'examining' });
    expect(early.revision.measurement).toMatchObject({ examined: 'integrals', shells: null, soundness: { closed: true, oriented: true, defensible: true, shells: null, selfIntersections: null } });
    expect(whole.revision.run.state).toBe('done');
    expect(whole.revision.measurement).toMatchObject({ examined: 'whole', soundness: { closed: true, shells: 1, selfIntersections: 0 } });
    expect(early.revision.measurement?.volume).toEqual(whole.revision.measurement?.volume);
    expect(early.revision.measurement?.surface).toEqual(whole.revision.measurement?.surface);
    // One measurement, which was completed; not two.
    const rows = await database.look<{ count: number }>(`select count(*)::int as count from measurements m join uploads u on u.sha256 = m.sha256 where u.file_name = 'large.stl'`);
    expect(rows[0]?.count).toBe(1);
  });

  it('gets other figures when its shells have been looked at: one of two bodies is inside out', async () => {
    const bytes = sphere(40, 100_000);
    const corners: number[] = blockFacets([100, 0, 0], [120, 10, 10]);
    // Its facets the other way round.
    for (let at = 0; at < corners.length; at += 9) corners.splice(at + 3, 6, ...corners.slice(at + 6, at + 9), ...corners.slice(at + 3, at + 6));
    const both = Buffer.concat([bytes, writeBinaryStl(corners).slice(84)]);
    both.writeUInt32LE((both.length - 84) / 50, 80);
    const part = await engineer.waitForRun((await engineer.addMesh(projectId, 'two bodies.stl', both)).id, 60_000);
    const { volume, shells, soundness } = part.revision.measurement ?? {};
    expect(soundness).toMatchObject({ shells: 2, turned: true, defensible: true });
    expect(shells?.map(({ kind, turned }) => [kind, turned])).toEqual([['solid', false], ['detached', true]]);
    const [sphereVolume = NaN, blockVolume = NaN] = shells?.map((shell) => shell.volume?.content) ?? [];
    expect(blockVolume).toBeCloseTo(2000, 9);
    expect((volume?.content ?? NaN) / (sphereVolume + blockVolume)).toBeCloseTo(1, 12);
  });
});

describe('a measurement', () => {
  it('that was examined never changes, not even by the application itself', async () => {
    const part = await engineer.waitForRun((await engineer.addMesh(projectId, 'block.stl', block([0, 0, 0], [7, 8, 9]))).id);
    const client = new pg.Client({ connectionString: database.applicationUrl });
    await client.connect();
    try {
      await client.query('begin');
      await client.query(`select set_config('masswright.organisation_id', $1, true)`, [engineer.session?.organisation.id]);
      const { rowCount: seen } = await client.query(`select id from measurements where examined = 'whole'`);
      const { rowCount: changed } = await client.query('update measurements set volume = 1');
      expect(seen).toBeGreaterThan(0);
      expect(changed).toBe(0);
      await client.query('rollback');
    } finally {
      await client.end();
    }
    expect((await engineer.get<Part>(`/parts/${part.id}`)).revision.measurement?.volume?.content).toBe(504);
  });

  it('of an earlier version is offered anew, and the part tells what that found', async () => {
    const added = await engineer.addMesh(projectId, 'old.stl', block([0, 0, 0], [3, 4, 5.5]));
    const part = await engineer.waitForRun(added.id);
    expect((await engineer.ask('POST', `/parts/${part.id}/run`)).status).toBe(409);
    await database.look(restart, [part.revision.id]);
    expect((await engineer.get<Part>(`/parts/${part.id}`)).revision.measurement?.measuringVersion).toBe('m1');

    await engineer.expect('POST', `/parts/${part.id}/run`);
    const again = await engineer.waitForRun(part.id);
    expect(again.revision.measurement?.measuringVersion).toBe(measuringVersion);
    expect(again.revision.measuredBefore).toMatchObject({ measuringVersion: 'm1', volume: { content: 66 } });
  });
});
