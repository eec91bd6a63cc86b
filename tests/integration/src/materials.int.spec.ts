import { randomUUID } from 'node:crypto';
import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { CreateMaterialRequest, ImportMaterialsAnswer, Material, MaterialList, MaterialUses, Part } from '@masswright/contracts';
import { starterLibrary } from '@masswright/mechanics';
import { startTestApi, type TestApi } from '../../support/api';
import type { Answer, ApiUser } from '../../support/api-user';
import { listen } from '../../support/events';
import { fillProject } from '../../support/filled-project';
import { expectSummariesToFollow } from '../../support/summaries';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';

let database: TestDatabase;
let api: TestApi;
let engineer: ApiUser;

const alloy: CreateMaterialRequest = { name: 'Housing alloy', group: 'aluminium', densityKgM3: 2680.5, densitySpreadKgM3: 13.4, spreadBasis: 'source', source: 'Supplier’s sheet of 2026' };
const create = (fields: Partial<CreateMaterialRequest> = {}): Promise<Material> => engineer.expect<Material>('POST', '/materials', { ...alloy, ...fields });
const list = async (query = ''): Promise<Material[]> => (await engineer.get<MaterialList>(`/materials?${query}`)).items;
const own = async (query = ''): Promise<Material[]> => (await list(query)).filter(({ origin }) => origin === 'own');
const take = (csv: string, rehearse = false): Promise<Answer<ImportMaterialsAnswer>> => engineer.ask<ImportMaterialsAnswer>('POST', '/materials/import', { csv, rehearse });
const header = 'name,group,density_kg_m3,spread_kg_m3,spread_basis,source';

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
});
// An organisation of its own for each test: the library is the organisation's.
beforeEach(async () => {
  engineer = api.visit();
  await engineer.signUp();
});
afterAll(async () => {
  await api.close();
  await database.drop();
});

async function fill(count: number): Promise<string[]> {
  const session = engineer.session;
  if (session === undefined) throw new Error('Nobody is signed in.');
  const { id: projectId } = await engineer.createProject();
  return fillProject(database.look, database.applicationUrl, { organisationId: session.organisation.id, projectId, userId: session.user.id, count });
}

describe('the library', () => {
  it('has the starter library and, beside it, the organisation’s own; nobody else sees these', async () => {
    const made = await create();
    expect(made).toMatchObject({ ...alloy, origin: 'own', version: 1, archivedAt: null, usedByParts: 0, can: { edit: true } });
    const all = await list();
    expect(all.filter(({ origin }) => origin === 'starter').map(({ id }) => id)).toEqual(starterLibrary.map(({ id }) => id));
    expect(all.filter(({ origin }) => origin === 'own')).toEqual([made]);
    const stranger = api.visit();
    await stranger.signUp('Other Person');
    expect((await stranger.get<MaterialList>('/materials')).items.filter(({ origin }) => origin === 'own')).toEqual([]);
    expect((await stranger.ask('PATCH', `/materials/${made.id}`, { version: 1, name: 'Mine' })).status).toBe(404);
    expect((await stranger.ask('GET', `/materials/${made.id}/parts`)).status).toBe(404);
  });

  it('is searched by words of the name, the group and the source', async () => {
    await create();
    expect((await list('text=ALUMINIUM%206061')).map(({ id }) => id)).toEqual(['al-6061-t6']);
    expect((await list('text=supplier%20alloy')).map(({ name }) => name)).toEqual(['Housing alloy']);
    expect(await list('text=nothing%20has%20this')).toEqual([]);
  });

  it('has each name once, letter case left aside, the starter library’s included', async () => {
    await create();
    for (const name of ['HOUSING ALLOY', 'aluminium 6061-t6', ' Pine ']) {
      expect(await engineer.ask('POST', '/materials', { ...alloy, name }), name).toMatchObject({ status: 409, body: { code: 'conflict', fields: [{ path: 'name' }] } });
    }
    const other = await create({ name: 'Other' });
    expect((await engineer.ask('PATCH', `/materials/${other.id}`, { version: 1, name: 'housing Alloy' })).status).toBe(409);
    expect(await engineer.expect<Material>('PATCH', `/materials/${other.id}`, { version: 1, name: 'OTHER' })).toMatchObject({ name: 'OTHER', version: 2 });
  });

  it('made of one name by several at once has it once', async () => {
    const answers = await Promise.all([1, 2, 3, 4].map(() => engineer.ask('POST', '/materials', alloy)));
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409, 409]);
  });

  it('changes an own material by its version, and never one of the starter library', async () => {
    const { id } = await create();
    expect(await engineer.expect<Material>('PATCH', `/materials/${id}`, { version: 1, densityKgM3: 2690 })).toMatchObject({ densityKgM3: 2690, name: alloy.name, version: 2 });
    expect(await engineer.ask('PATCH', `/materials/${id}`, { version: 1, densityKgM3: 1 })).toMatchObject({ status: 409, body: { code: 'stale-version' } });
    const answers = await Promise.all([engineer.ask('PATCH', `/materials/${id}`, { version: 2, densityKgM3: 1 }), engineer.ask('PATCH', `/materials/${id}`, { version: 2, densityKgM3: 2 })]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(await engineer.ask('PATCH', '/materials/pine', { version: 1, densityKgM3: 1 })).toMatchObject({ status: 409, body: { code: 'conflict', detail: expect.stringContaining('can’t be changed') as string } });
    for (const unknown of [randomUUID(), 'unobtainium']) expect((await engineer.ask('PATCH', `/materials/${unknown}`, { version: 1 })).status).toBe(404);
  });

  it('keeps an archived material out of the list until it is asked for or taken back', async () => {
    const { id } = await create();
    const archived = await engineer.expect<Material>('PATCH', `/materials/${id}`, { version: 1, archived: true });
    expect(archived.archivedAt).not.toBeNull();
    expect(await own()).toEqual([]);
    expect(await own('archived=true')).toEqual([archived]);
    await engineer.expect('PATCH', `/materials/${id}`, { version: 2, archived: false });
    expect(await own()).toMatchObject([{ id, archivedAt: null, version: 3 }]);
  });

  it('tells the organisation of its changes, and keeps them in the audit', async () => {
    const ears = await listen(engineer);
    await ears.wait(({ type }) => type === 'hello');
    const { id } = await create();
    await ears.wait(({ type }) => type === 'materials');
    ears.close();
    await engineer.expect('PATCH', `/materials/${id}`, { version: 1, densityKgM3: 2690 });
    expect(await database.look(`select action, before, after from audit_events where subject_id = $1 order by created_at`, [id])).toMatchObject([
      { action: 'material.create', after: alloy },
      { action: 'material.change', before: { densityKgM3: 2680.5 }, after: { densityKgM3: 2690 } },
    ]);
  });
});

describe('a part that is set to a material', () => {
  it('keeps the density that it was set with; the library says by how much it has moved', async () => {
    const ids = await fill(3);
    const { id } = await create({ densityKgM3: 2000, densitySpreadKgM3: 20 });
    const set = await engineer.expect<Part>('PATCH', `/parts/${ids[0]}/setting`, { version: 1, material: { id } });
    expect(set.revision.setting).toMatchObject({ densityKgM3: 2000, densitySpreadKgM3: 20, material: { id, name: alloy.name } });
    await engineer.expect('PATCH', `/materials/${id}`, { version: 1, densityKgM3: 2500, name: 'Housing alloy, new' });
    expect((await engineer.get<Part>(`/parts/${ids[0]}`)).revision.setting).toMatchObject({ densityKgM3: 2000, material: { id, name: alloy.name } });
    const uses = await engineer.get<MaterialUses>(`/materials/${id}/parts`);
    expect(uses).toMatchObject({ total: 1, items: [{ partId: ids[0], number: 1, letter: 'A', densityKgM3: 2000 }] });
    // The first block is 11 × 21 × 6 mm; m = ρabc.
    expect(uses.items[0]?.massKg).toBeCloseTo(2000 * 0.011 * 0.021 * 0.006, 12);
    expect(uses.items[0]?.massAtPresentDensityKg).toBeCloseTo(2500 * 0.011 * 0.021 * 0.006, 12);
    await expectSummariesToFollow(database);
  });

  it('is counted while it is there, and taken to the present density by choosing the material again', async () => {
    const ids = await fill(3);
    const { id } = await create();
    for (const partId of ids) await engineer.expect('PATCH', `/parts/${partId}/setting`, { version: 1, material: { id } });
    const { projectId } = await engineer.get<Part>(`/parts/${ids[0]}`);
    await engineer.expect('POST', `/projects/${projectId}/part-deletions`, { parts: { ids: [ids[2]] } });
    expect((await own())[0]?.usedByParts).toBe(2);
    expect((await engineer.get<MaterialUses>(`/materials/${id}/parts`)).items.map(({ partId }) => partId)).toEqual(ids.slice(0, 2));
    await engineer.expect('PATCH', `/materials/${id}`, { version: 1, densityKgM3: 2700 });
    expect(await engineer.expect('POST', `/projects/${projectId}/setting-changes`, { parts: { ids: [ids[0]] }, change: { material: { id } } })).toMatchObject({ changed: 1 });
    expect((await engineer.get<MaterialUses>(`/materials/${id}/parts`)).items.map(({ densityKgM3 }) => densityKgM3)).toEqual([2700, 2680.5]);
  });

  it('whose mass is weighed is not moved by the library', async () => {
    const [partId] = await fill(1);
    const { id } = await create({ densityKgM3: 2000, densitySpreadKgM3: 200 });
    await engineer.expect('PATCH', `/parts/${partId}/setting`, { version: 1, material: { id }, weighing: { massKg: 2010 * 0.011 * 0.021 * 0.006, uncertaintyKg: 0 } });
    const { items } = await engineer.get<MaterialUses>(`/materials/${id}/parts`);
    expect(items).toMatchObject([{ densityKgM3: 2000, massAtPresentDensityKg: null }]);
    expect(items[0]?.massKg).toBeCloseTo(2010 * 0.011 * 0.021 * 0.006, 12);
  });

  it('has the starter library’s parts named too', async () => {
    const ids = await fill(2);
    expect(await engineer.get<MaterialUses>('/materials/al-6061-t6/parts')).toMatchObject({ total: 2, items: ids.map((partId) => ({ partId, densityKgM3: 2700 })) });
    expect((await engineer.ask('GET', '/materials/unobtainium/parts')).status).toBe(404);
  });
});

describe('the library as a table', () => {
  it('goes out safe for spreadsheets and comes in again as it was', async () => {
    await create({ name: '=SUM(A1)', source: "-'quoted', with a comma", densityKgM3: 2700.0000000000005, densitySpreadKgM3: 1e-7 });
    const { body, headers } = await engineer.ask<string>('GET', '/materials/export');
    expect(headers.get('content-disposition')).toBe('attachment; filename=Materials.csv');
    const rows: Record<string, string>[] = parse(body, { columns: true, bom: true });
    expect(Object.keys(rows[0] ?? {}).join(',')).toBe(header);
    expect(rows).toHaveLength(starterLibrary.length + 1);
    expect(rows.at(-1)).toMatchObject({ name: "'=SUM(A1)", density_kg_m3: '2700.0000000000005', spread_kg_m3: '1e-7', source: "'-'quoted', with a comma" });
    expect((await take(body)).body).toEqual({ added: 0, changed: 0, unchanged: starterLibrary.length + 1, errors: [] });
    // Into an organisation that has nothing of it.
    engineer = api.visit();
    await engineer.signUp('Other Person');
    expect((await take(body)).body).toMatchObject({ added: 1, unchanged: starterLibrary.length, errors: [] });
    expect(await own()).toMatchObject([{ name: '=SUM(A1)', densityKgM3: 2700.0000000000005, densitySpreadKgM3: 1e-7, source: "-'quoted', with a comma" }]);
  });

  it('is rehearsed first: what would happen is said, and nothing does', async () => {
    await create();
    const csv = `${header}\nHousing alloy,aluminium,2700,27,judgement,\nNew one,steel,7850,78,judgement,\n`;
    const before = await list('archived=true');
    const rehearsal = (await take(csv, true)).body;
    expect(rehearsal).toEqual({ added: 1, changed: 1, unchanged: 0, errors: [] });
    expect(await list('archived=true')).toEqual(before);
    expect((await take(csv)).body).toEqual(rehearsal);
    expect(await own()).toMatchObject([{ name: 'Housing alloy', densityKgM3: 2700, version: 2 }, { name: 'New one', densityKgM3: 7850, version: 1 }]);
    expect((await take(csv)).body).toEqual({ added: 0, changed: 0, unchanged: 2, errors: [] });
  });

  it('has its errors by row and column in words, and the good rows are taken', async () => {
    const csv = [
      header,
      'Good,steel,7850,1 %,judgement,from a sheet',
      ',steel,7850,78,judgement,',
      'Bad group,stone,2700,27,judgement,',
      'Bad density,steel,heavy,78,judgement,',
      'No spread,steel,7850,,judgement,',
      'good,steel,7850,78,judgement,',
      'Pine,wood,400,60,judgement,',
      'Comma,steel,7,85,0,78,judgement',
      '',
      'Negative,steel,-5,1,judgement,',
      'Also good,,1200,±12,SOURCE,',
    ].join('\n');
    const { body } = await take(csv);
    expect(body).toMatchObject({ added: 2, changed: 0, unchanged: 0 });
    const said = body.errors.map(({ row, column }) => [row, column]);
    expect(said).toEqual([[3, 'name'], [4, 'group'], [5, 'density_kg_m3'], [6, 'spread_kg_m3'], [7, 'name'], [8, 'name'], [9, null], [9, 'spread_basis'], [11, 'density_kg_m3']]);
    for (const { message } of body.errors) expect(message).toMatch(/^[A-Z"].*\.$/u);
    expect(body.errors[4]?.message).toContain('Row 2');
    expect(await own()).toMatchObject([{ name: 'Also good', group: 'other', densitySpreadKgM3: 12, spreadBasis: 'source' }, { name: 'Good', densitySpreadKgM3: 78.5 }]);
  });

  it('may name its families as the page does, in a column of that name', async () => {
    const words = ['Polymers', 'polymers', 'polymer', 'POLYMER', 'Iron and steel', 'Glass, ceramics and stone', 'glass-ceramic', 'Glass ceramic', 'Other metals', 'other_metal', ''];
    const { body } = await take(`name,Family,density_kg_m3,spread_kg_m3\n${words.map((word, index) => `M${String(index).padStart(2, '0')},"${word}",1000,10\n`).join('')}`);
    expect(body).toMatchObject({ added: words.length, errors: [] });
    expect((await own()).map(({ group }) => group)).toEqual(['polymer', 'polymer', 'polymer', 'polymer', 'steel', 'glass-ceramic', 'glass-ceramic', 'glass-ceramic', 'other-metal', 'other-metal', 'other']);
  });

  it('may come from any spreadsheet: a mark at its head, CRLF, semicolons, tabs, units in the cells', async () => {
    expect((await take(`\uFEFF${header}\r\nA,steel,7850,78,judgement,"two\r\nlines"\r\n`)).body).toMatchObject({ added: 1, errors: [] });
    expect((await take('Name;Group;Density;Spread\nB;steel;7.85 g/cm3;78 kg/m³\nC;steel;7,85 g/cm3;1 %')).body).toMatchObject({ added: 1, errors: [{ row: 3, column: 'density', message: expect.stringContaining('decimal point') as string }] });
    expect((await take('name\tdensity\tspread\nD\t0.0361 lb/in3\t1%')).body).toMatchObject({ added: 1, errors: [] });
    expect((await take('name,density,spread\nE,2700,27 kg/m3')).body).toMatchObject({ added: 0, errors: [{ row: 2, column: 'density', message: expect.stringContaining('State the unit') as string }] });
    const found = await own();
    expect(found.map(({ name, densityKgM3 }) => [name, Math.round(densityKgM3)])).toEqual([['A', 7850], ['B', 7850], ['D', 999]]);
    expect(found[0]?.source).toBe('two\r\nlines');
  });

  it.each([
    ['nothing', '', 1],
    ['no density', 'name,group\nA,steel', 1],
    ['an open quotation mark', `${header}\n"A,steel,1,1,judgement,\n`, 2],
    ['too many rows', `${header}\n${'A,steel,1,1,judgement,\n'.repeat(5001)}`, 5002],
  ])('with %s is refused in words', async (_, csv, row) => {
    const { body } = await take(csv);
    expect(body).toMatchObject({ added: 0, changed: 0, unchanged: 0, errors: [{ row }] });
  });

  it('of two million characters is read; a longer one is refused', async () => {
    const row = `${'x'.repeat(40)},steel,1,1,judgement,${'s'.repeat(290)}\n`;
    expect((await take(`${header}\n${row.repeat(4999)}`)).body.errors).toHaveLength(4998);
    expect((await take('x'.repeat(2_000_001))).status).toBe(422);
    expect((await engineer.ask('POST', '/projects', { name: 'x'.repeat(2_000_000) })).status).toBe(413);
  });

  it('brings an archived material back', async () => {
    const { id } = await create();
    await engineer.expect('PATCH', `/materials/${id}`, { version: 1, archived: true });
    expect((await take(`${header}\n${alloy.name},aluminium,2680.5,13.4,source,Supplier’s sheet of 2026`)).body).toMatchObject({ changed: 1 });
    expect(await own()).toMatchObject([{ id, archivedAt: null }]);
  });
});
