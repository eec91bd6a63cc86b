import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { exportedRecord, failedRecord, statementRecord, type ExportedRecord, type Part, type StatementRecord } from '@masswright/contracts';
import { startTestApi, type TestApi } from '../../support/api';
import type { Answer, ApiUser } from '../../support/api-user';
import { fillProject } from '../../support/filled-project';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';

let database: TestDatabase;
let api: TestApi;
let engineer: ApiUser;
let projectId: string;
let ids: string[];
const count = 423;

const ask = <Body = string>(query: string, user = engineer): Promise<Answer<Body>> => user.ask<Body>('GET', `/projects/${projectId}/parts/export?${query}`);
type Row = Record<string, string>;
const rowsOf = ({ body }: Answer<string>): Row[] => parse(body, { columns: true, bom: true });

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  engineer = api.visit();
  const session = await engineer.signUp();
  projectId = (await engineer.createProject('Reel / mark "2"; ünits')).id;
  ids = await fillProject(database.look, database.applicationUrl, { organisationId: session.organisation.id, projectId, userId: session.user.id, count, mixed: true });
});
afterAll(async () => {
  await api.close();
  await database.drop();
});

describe('an export of the list as a table', () => {
  it('has a row a part in the list’s order, and numbers to the last bit', async () => {
    const answer = await ask('format=csv&sort=mass&direction=descending');
    const rows = rowsOf(answer);
    expect(rows).toHaveLength(count);
    const [heaviest] = rows;
    const part = await engineer.get<Part>(`/parts/${ids[Number(heaviest?.['number']) - 1]}`);
    const record = await engineer.get<StatementRecord>(`/parts/${part.id}/statement`);
    expect(Number(heaviest?.['mass_kg'])).toBe(record.massKg);
    expect([1, 2, 3].map((axis) => Number(heaviest?.[`principal_moment_${axis}_kg_m2`]))).toEqual(record.principalMomentsKgM2);
    expect(['xx', 'yy', 'zz', 'xy', 'yz', 'zx'].map((element) => Number(heaviest?.[`inertia_${element}_kg_m2`]))).toEqual(['xx', 'yy', 'zz', 'xy', 'yz', 'zx'].map((element) => record.inertiaAtCentreOfMassKgM2?.[element as 'xx']));
    expect(['x', 'y', 'z'].map((axis) => Number(heaviest?.[`centre_of_mass_${axis}_m`]))).toEqual(record.centreOfMassM);
    expect(heaviest).toMatchObject({ length_unit: 'mm', material: 'Aluminium 6061-T6', density_kg_m3: '2700', state: 'ready', closed: 'true', sha256: record.sha256 });
    expect([Number(heaviest?.['mass_uncertainty_kg']), Number(heaviest?.['volume_uncertainty_m3']), heaviest?.['coverage_factor']]).toEqual([record.uncertainty?.massKg, record.uncertainty?.volumeM3, '2']);
    const counts = (['shells', 'cavities', 'selfIntersections'] as const).map((name) => record.soundness[name]?.toString() ?? '');
    expect([heaviest?.['shells'], heaviest?.['cavities'], heaviest?.['self_intersections'], heaviest?.['examined']]).toEqual([...counts, part.revision.measurement?.examined]);
    const masses = rows.map((row) => row['mass_kg']);
    expect(masses.filter((mass) => mass !== '').map(Number)).toEqual(masses.filter((mass) => mass !== '').map(Number).sort((a, b) => b - a));
  });

  it('says with every tensor its point, axes and sign convention, and no convention without figures', async () => {
    for (const row of rowsOf(await ask('format=csv'))) {
      const isThere = row['inertia_xx_kg_m2'] !== '';
      expect([row['tensor_point'], row['tensor_axes'], row['off_diagonals']]).toEqual(isThere ? ['centre of mass', 'mesh frame', 'inertia_xy = -∫xy dm'] : ['', '', '']);
      expect([row['principal_moments_point'], row['principal_moments_axes']]).toEqual(isThere ? ['centre of mass', 'principal axes'] : ['', '']);
    }
  });

  it('has the columns that are asked for, in that order, with what belongs to them', async () => {
    const { body } = await ask('format=csv&columns=mass,name,moments,name&states=ready&text=lever');
    const [header, ...rows] = parse(body, { bom: true });
    expect(header).toEqual(['mass_kg', 'name', 'principal_moment_1_kg_m2', 'principal_moment_2_kg_m2', 'principal_moment_3_kg_m2', 'principal_moments_point', 'principal_moments_axes']);
    expect(rows.length).toBeGreaterThan(5);
    for (const [, name] of rows) expect(name).toContain('lever');
  });

  it('has every column where none is asked for: the density stands beside the mass', async () => {
    const { body } = await ask('format=csv&text=nothing-has-this');
    const [header] = parse(body, { bom: true });
    expect(header).toEqual(expect.arrayContaining(['number', 'name', 'revision', 'sha256', 'material', 'length_unit', 'density_kg_m3', 'mass_kg', 'state']));
  });

  it('is a file to be saved: named after the project, never shown or guessed at, with the mark by which spreadsheets know UTF-8', async () => {
    const { headers } = await ask('format=csv');
    expect(headers.get('content-type')).toBe('text/csv; charset=utf-8');
    expect(headers.get('x-content-type-options')).toBe('nosniff');
    expect(headers.get('cache-control')).toBe('no-store');
    expect(headers.get('content-disposition')).toMatch(/^attachment; filename="Parts of Reel - mark -2- \?nits\.csv"; filename\*=UTF-8''Parts%20of%20Reel%20-%20mark%20-2-%20%C3%BCnits\.csv$/);
    const response = await fetch(`${api.url}/api/v1/projects/${projectId}/parts/export?format=csv`, { headers: { Cookie: engineer.cookie ?? '' } });
    expect([...new Uint8Array(await response.arrayBuffer()).slice(0, 3)]).toEqual([0xef, 0xbb, 0xbf]);
  });

  it('is safe to open: a name that is a formula is text, and a negative number is a number', async () => {
    const names = ['=HYPERLINK("http://x")', '+1', '-2', '@a', "'=b", 'plain'];
    for (const [index, name] of names.entries()) await engineer.expect('PATCH', `/parts/${ids[index + 100]}`, { name });
    await engineer.expect('PATCH', `/parts/${ids[100]}/setting`, { version: 1, lengthUnit: 'mm' });
    const rows = rowsOf(await ask('format=csv&columns=number,name,centre,tensor'));
    expect(rows.slice(100, 106).map((row) => row['name'])).toEqual(["'=HYPERLINK(\"http://x\")", "'+1", "'-2", "'@a", "''=b", 'plain']);
    for (const row of rows) for (const [column, value] of Object.entries(row)) if (/_m$|_kg_m2$/.test(column)) expect(value).not.toContain("'");
  });
});

describe('an export of the list as records', () => {
  it('has for each part its record, or in its place why there is none', async () => {
    const { body } = await ask<ExportedRecord[]>('format=json');
    expect(body).toHaveLength(count);
    const codes = body.map((record) => ('error' in record ? record.error.code : 'record'));
    for (const [index, code] of codes.entries()) {
      const number = index + 1;
      expect(code, `part ${number}`).toBe(number === 101 ? 'record' : number % 13 === 0 ? 'not-measured-yet' : number % 17 === 0 ? 'file-truncated' : number % 10 === 0 ? 'unit-not-stated' : 'record');
    }
    for (const { part, ...record } of body) {
      expect('error' in record ? failedRecord.parse(record) : statementRecord.parse(record)).toEqual(record);
      expect(exportedRecord.parse({ part, ...record })).toEqual({ part, ...record });
    }
  });

  it('says of each record of which part and revision it is, beside the record’s own keys', async () => {
    const { body } = await ask<ExportedRecord[]>('format=json');
    const rows = rowsOf(await ask('format=csv&columns=number,name,revision'));
    expect(body.map(({ part }) => [String(part.number), part.revision])).toEqual(rows.map(({ number, revision }) => [number, revision]));
    const third = await engineer.get<Part>(`/parts/${ids[2]}`);
    const { part, ...record } = body[2] ?? {};
    expect(part).toEqual({ number: 3, name: third.name, revision: third.revision.letter });
    expect(record).toEqual(await engineer.get(`/parts/${ids[2]}/statement`));
  });

  it('of nothing is an empty array', async () => {
    expect((await ask<unknown[]>('format=json&text=nothing-has-this')).body).toEqual([]);
  });
});

describe('who may not have it', () => {
  it('gets no file: another organisation, a visitor, a wrong column', async () => {
    const stranger = api.visit();
    await stranger.signUp('Other Person');
    expect((await ask('format=csv', stranger)).status).toBe(404);
    expect((await ask('format=csv', api.visit())).status).toBe(401);
    expect((await ask('format=csv&columns=weight')).status).toBe(422);
    expect((await ask('format=xls')).status).toBe(422);
  });
});
