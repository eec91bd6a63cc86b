import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Part, Problem, StatementRecord } from '@masswright/contracts';
import { writeBinaryStl } from '@masswright/geometry';
import { programEnvironment, startTestApi, type TestApi } from '../../support/api';
import type { ApiUser } from '../../support/api-user';
import { blockFacets } from '../../support/meshes';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';
import { startTestWorker, type TestWorker } from '../../support/worker';

let database: TestDatabase;
let api: TestApi;
let worker: TestWorker;
let engineer: ApiUser;
let part: Part;

const set = <Body = Part>(change: object) => engineer.ask<Body>('PATCH', `/parts/${part.id}/setting`, change);
const read = (): Promise<Part> => engineer.get<Part>(`/parts/${part.id}`);
const version = async (): Promise<number> => (await read()).revision.setting.version;

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  worker = await startTestWorker(programEnvironment(database, Number(new URL(api.url).port)));
  engineer = api.visit();
  await engineer.signUp();
  const { id } = await engineer.createProject();
  const two = writeBinaryStl([...blockFacets([0, 0, 0], [10, 10, 10]), ...blockFacets([20, 0, 0], [40, 10, 10])]);
  part = await engineer.addMesh(id, 'two.stl', Buffer.from(two));
  await engineer.waitForRun(part.id);
});
afterAll(async () => {
  await worker.stop();
  await api.close();
  await database.drop();
});

describe('densities of the shells of a part', () => {
  it('count in the record, in the list and in the setting that is read again', async () => {
    const shellDensities = [{ shell: 1, densityKgM3: 8000 }];
    const { status, body } = await set({ version: await version(), lengthUnit: 'mm', densityKgM3: 1000, shellDensities });
    expect(status).toBe(200);
    expect(body.revision.setting).toMatchObject({ shellDensities });
    // 1 cm³ at 1 g/cm³ and 2 cm³ at 8 g/cm³.
    expect((await engineer.get<StatementRecord>(`/parts/${part.id}/statement`)).massKg).toBeCloseTo(0.017, 12);
    await set({ version: await version(), shellDensities: [{ shell: 0, densityKgM3: null }] });
    expect((await engineer.get<StatementRecord>(`/parts/${part.id}/statement`)).massKg).toBeCloseTo(0.002, 12);
  });

  it('are refused, with the field, for shells that are not there and for one that is named twice', async () => {
    const wrong = [
      [{ shell: 2, densityKgM3: 8000 }],
      [
        { shell: 0, densityKgM3: 8000 },
        { shell: 0, densityKgM3: null },
      ],
    ];
    for (const shellDensities of wrong) {
      const { status, body } = await set<Problem>({ version: await version(), shellDensities });
      expect([status, body.code, body.fields?.[0]?.path]).toEqual([422, 'invalid-input', 'shellDensities']);
    }
    expect((await read()).revision.setting.shellDensities).toEqual([{ shell: 0, densityKgM3: null }]);
  });

  it('stay as they are where something else is changed, and are taken away by an empty list', async () => {
    await set({ version: await version(), asMade: { kind: 'offset', spreadM: 1e-4 } });
    expect((await read()).revision.setting).toMatchObject({ asMade: { kind: 'offset', spreadM: 1e-4 }, shellDensities: [{ shell: 0, densityKgM3: null }] });
    await set({ version: await version(), shellDensities: [] });
    expect((await engineer.get<StatementRecord>(`/parts/${part.id}/statement`)).massKg).toBeCloseTo(0.003, 12);
  });
});
