import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { PartList, PartRow, PartSort } from '@masswright/contracts';
import { startTestApi, type TestApi } from '../../support/api';
import type { ApiUser } from '../../support/api-user';
import { fillProject } from '../../support/filled-project';
import { block } from '../../support/meshes';
import { expectSummariesToFollow } from '../../support/summaries';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';

let database: TestDatabase;
let api: TestApi;
let engineer: ApiUser;
let organisationId: string;
let userId: string;
let mixedId: string;
const count = 247;

const list = (projectId: string, query: Record<string, string | number> = {}): Promise<PartList> =>
  engineer.get<PartList>(`/projects/${projectId}/parts?${new URLSearchParams(Object.entries(query).map(([name, value]): [string, string] => [name, String(value)])).toString()}`);
const numbers = ({ items }: PartList): number[] => items.map(({ number }) => number);
/** Every row, by stretches. */
async function listAll(projectId: string, query: Record<string, string | number> = {}, limit = 200): Promise<PartRow[]> {
  const rows: PartRow[] = [];
  for (;;) {
    const stretch = await list(projectId, { ...query, offset: rows.length, limit });
    rows.push(...stretch.items);
    if (rows.length >= stretch.total) return rows;
  }
}

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  engineer = api.visit();
  const session = await engineer.signUp();
  organisationId = session.organisation.id;
  userId = session.user.id;
  mixedId = (await engineer.createProject('Mixed')).id;
  await fillProject(database.look, database.applicationUrl, { organisationId, projectId: mixedId, userId, count, mixed: true });
});
afterAll(async () => {
  await api.close();
  await database.drop();
});

describe('a project’s list of parts', () => {
  it('comes by stretches that fit together: no row twice, none left out', async () => {
    const whole = await listAll(mixedId, {}, 60);
    expect(whole.map(({ number }) => number)).toEqual(Array.from({ length: count }, (_, index) => index + 1));
    expect(await list(mixedId, { offset: count, limit: 10 })).toMatchObject({ items: [], total: count });
  });

  it('has the figures of the parts: the third block has the mass and moments of the handbook', async () => {
    const [row] = (await list(mixedId, { offset: 2, limit: 1 })).items;
    // m = ρabc, moments m(b² + c²)/12: standard handbook values, from memory.
    const [a, b, c] = [0.013, 0.023, 0.008];
    const mass = 2700 * a * b * c;
    expect(row?.massKg).toBeCloseTo(mass, 12);
    expect(row?.sizeM).toEqual([a, b, c]);
    expect(row?.balance).toEqual([0.5, 0.5, 0.5]);
    const moments = [(mass * (a * a + c * c)) / 12, (mass * (b * b + c * c)) / 12, (mass * (a * a + b * b)) / 12].sort((one, other) => one - other);
    moments.forEach((moment, index) => expect(row?.principalMomentsKgM2?.[index]).toBeCloseTo(moment, 15));
  });

  const keys: [PartSort, (row: PartRow) => number | null][] = [
    ['mass', (row) => row.massKg],
    ['volume', (row) => row.volumeM3],
    ['size', (row) => (row.sizeM === null ? null : Math.max(...row.sizeM))],
    ['moment1', (row) => row.principalMomentsKgM2?.[0] ?? null],
    ['moment2', (row) => row.principalMomentsKgM2?.[1] ?? null],
    ['moment3', (row) => row.principalMomentsKgM2?.[2] ?? null],
    ['changed', (row) => Date.parse(row.revision.setting.changedAt)],
  ];
  it.each(keys)('sorts by %s either way, and rows without it come last by number', async (sort, key) => {
    const expected = (sign: 1 | -1, rows: PartRow[]) =>
      [...rows].sort((one, other) => {
        const [a, b] = [key(one), key(other)];
        if (a === null || b === null) return Number(a === null) - Number(b === null) || one.number - other.number;
        return sign * (a - b) || one.number - other.number;
      });
    const byNumber = await listAll(mixedId);
    const numbersOf = (rows: PartRow[]) => rows.map(({ number }) => number);
    expect(numbersOf(await listAll(mixedId, { sort }))).toEqual(numbersOf(expected(1, byNumber)));
    expect(numbersOf(await listAll(mixedId, { sort, direction: 'descending' }))).toEqual(numbersOf(expected(-1, byNumber)));
  });

  it('sorts names as people count, by state in the order of what is wanted, and by material with the unnamed last', async () => {
    const names = (await listAll(mixedId, { sort: 'name' })).map(({ name }) => name);
    expect(names.slice(0, 4)).toEqual(['bracket 8', 'bracket 16', 'bracket 24', 'bracket 32']);
    const files = (await listAll(mixedId, { sort: 'file', direction: 'descending' })).map(({ revision }) => revision.fileName);
    expect(files.slice(0, 2)).toEqual(['yoke_247.stl', 'yoke_239.stl']);
    const states = (await listAll(mixedId, { sort: 'state' })).map(({ state }) => state);
    expect([...new Set(states)]).toEqual(['measuring', 'failed', 'not-defensible', 'unit-missing', 'density-missing', 'ready']);
    const materials = (await listAll(mixedId, { sort: 'material', direction: 'descending' })).map(({ revision }) => revision.setting.material === null);
    expect(materials).toEqual([...materials].sort((a, b) => Number(a) - Number(b)));
    expect(materials.at(-1)).toBe(true);
  });

  it('is filtered by every word of a text, wherever it stands, letter case left aside', async () => {
    expect(numbers(await list(mixedId, { text: 'HOUSING 24' }))).toEqual((await listAll(mixedId)).filter(({ name, number }) => name.startsWith('housing') && /24/.test(`${number} ${name}`)).map(({ number }) => number));
    expect(numbers(await list(mixedId, { text: '  lever_10.stl ' }))).toEqual([10]);
    expect((await list(mixedId, { text: 'aluminium 6061' })).total).toBe(count - Math.floor(count / 11));
    expect(await list(mixedId, { text: 'nothing has this' })).toMatchObject({ items: [], total: 0 });
  });

  it.each(['%', '_', '\\', "'", '"; drop table parts; --', '('])('takes %j for itself, not for a pattern or an instruction', async (text) => {
    const found = await list(mixedId, { text, limit: 200 });
    for (const { name, revision } of found.items) expect(`${name} ${revision.fileName}`).toContain(text);
    expect(found.total).toBe(text === '_' ? count : 0);
  });

  it('counts by state what matches the text, whatever states are asked for', async () => {
    const rows = (await listAll(mixedId)).filter(({ name }) => name.includes('cover'));
    const answer = await list(mixedId, { text: 'cover', states: 'failed,ready' });
    const of = (state: string) => rows.filter((row) => row.state === state).length;
    for (const [state, n] of Object.entries(answer.counts)) expect(n, state).toBe(of(state));
    expect(Object.values(answer.counts).reduce((sum, n) => sum + n)).toBe(rows.length);
    expect(answer.total).toBe(of('failed') + of('ready'));
    expect(new Set(answer.items.map(({ state }) => state))).toEqual(new Set(['failed', 'ready']));
  });

  it.each(['states=odd', 'sort=weight', 'direction=up', 'limit=0', 'limit=201', 'offset=-1', `text=${'x'.repeat(201)}`])('refuses %s', async (query) => {
    expect(await engineer.ask('GET', `/projects/${mixedId}/parts?${query}`)).toMatchObject({ status: 422, body: { code: 'invalid-input' } });
  });

  it('of another organisation, and of no project, is not found', async () => {
    const stranger = api.visit();
    await stranger.signUp('Other Person');
    expect((await stranger.ask('GET', `/projects/${mixedId}/parts`)).status).toBe(404);
    expect((await engineer.ask('GET', `/projects/${randomUUID()}/parts`)).status).toBe(404);
  });

  it('has a file as soon as it is accepted, and names accents and case as people type them', async () => {
    const { id } = await engineer.createProject('Names');
    await engineer.addMesh(id, 'E\u0301crou M8.STL', block([0, 0, 0], [1, 2, 3]));
    await engineer.addMesh(id, 'bolt 10.stl', block([0, 0, 0], [1, 2, 4]));
    await engineer.addMesh(id, 'bolt 2.stl', block([0, 0, 0], [1, 2, 5]));
    expect((await list(id, { text: 'écrou' })).items).toMatchObject([{ number: 1, state: 'measuring' }]);
    expect((await list(id, { sort: 'name' })).items.map(({ name }) => name.toLowerCase().slice(0, 7))).toEqual(['bolt 2', 'bolt 10', expect.stringContaining('crou')]);
    await expectSummariesToFollow(database);
  });
});
