import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { StatementRecord } from '@masswright/contracts';
import type { ApiUser } from '../../support/api-user';
import { programEnvironment, startTestApi, type TestApi } from '../../support/api';
import { block } from '../../support/meshes';
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

describe('a mesh from the browser to the figures', () => {
  it('a block of aluminium has the mass, centre and moments of the handbook', async () => {
    const added = await engineer.addMesh(projectId, 'block.stl', block([10, 20, 30], [50, 50, 50]));
    const part = await engineer.waitForRun(added.id);
    expect(part.revision.run).toMatchObject({ state: 'done', error: null });
    const record = await engineer.get<StatementRecord>(`/parts/${part.id}/statement`);
    // m = ρabc and Ix = m(b² + c²)/12: standard handbook values, from memory.
    const mass = 2700 * 0.04 * 0.03 * 0.02;
    expect(record.massKg).toBeCloseTo(mass, 14);
    expect(record.centreOfMassM?.map((coordinate) => Math.round(coordinate * 1e12) / 1e12)).toEqual([0.03, 0.035, 0.04]);
    const inertia = record.inertiaAtCentreOfMassKgM2;
    expect(inertia?.xx).toBeCloseTo((mass * (0.03 ** 2 + 0.02 ** 2)) / 12, 16);
    expect(inertia?.yy).toBeCloseTo((mass * (0.04 ** 2 + 0.02 ** 2)) / 12, 16);
    expect(inertia?.zz).toBeCloseTo((mass * (0.04 ** 2 + 0.03 ** 2)) / 12, 16);
    expect(Math.abs(inertia?.xy ?? 1)).toBeLessThan(1e-18);
  });

  it('the log has neither the file’s name nor a token in it', () => {
    expect(worker.log()).not.toContain('block.stl');
    expect(worker.log()).not.toContain(engineer.cookie?.split('=')[1]);
  });
});
