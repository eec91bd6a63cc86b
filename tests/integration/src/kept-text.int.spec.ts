import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Part, Problem } from '@masswright/contracts';
import { startTestApi, type TestApi } from '../../support/api';
import { password, type ApiUser } from '../../support/api-user';
import { block } from '../../support/meshes';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';

let database: TestDatabase;
let api: TestApi;
let engineer: ApiUser;
let projectId: string;
let part: Part;

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  engineer = api.visit();
  await engineer.signUp();
  projectId = (await engineer.createProject()).id;
  part = await engineer.addMesh(projectId, 'cover.stl', block([0, 0, 0], [1, 1, 1]));
});
afterAll(async () => {
  await api.close();
  await database.drop();
});

const nul = 'co\u0000ver';
const alloy = { name: 'Alloy', group: 'aluminium', densityKgM3: 2700, densitySpreadKgM3: 27, spreadBasis: 'judgement', source: '' };
type Ask = [string, () => [string, string, object?]];
const withText = (text: string): Ask[] => [
  ['the name of a project', () => ['POST', '/projects', { name: text }]],
  ['a project’s new name', () => ['PATCH', `/projects/${projectId}`, { name: text }]],
  ['a part’s new name', () => ['PATCH', `/parts/${part.id}`, { name: text }]],
  ['the name of a material', () => ['POST', '/materials', { ...alloy, name: text }]],
  ['the source of a material', () => ['POST', '/materials', { ...alloy, source: text }]],
  ['the material of a setting', () => ['PATCH', `/parts/${part.id}/setting`, { version: 1, material: { id: text } }]],
  ['the material of many settings', () => ['POST', `/projects/${projectId}/setting-changes`, { parts: { ids: [part.id] }, change: { material: { id: text } } }]],
  ['the filter of a deletion', () => ['POST', `/projects/${projectId}/part-deletions`, { parts: { filter: { text }, except: [] } }]],
  ['a person’s name', () => ['POST', '/sign-up', { organisationName: 'Halyard', name: text, email: 'nul.one@halyard.example', password }]],
  ['an organisation’s name', () => ['POST', '/sign-up', { organisationName: text, name: 'Ines Marsh', email: 'nul.two@halyard.example', password }]],
];

describe('text with a character that can’t be kept', () => {
  it.each(withText(nul))('is refused in words: NUL in %s', async (_, make) => {
    const answer = await engineer.ask<Problem>(...make());
    expect(answer).toMatchObject({ status: 422, body: { code: 'invalid-input', detail: expect.stringContaining('can’t be kept') as string } });
  });
  it.each(withText('co\ud800ver'))('is refused in words: half of a surrogate pair in %s', async (_, make) => {
    expect(await engineer.ask<Problem>(...make())).toMatchObject({ status: 422, body: { code: 'invalid-input' } });
  });
  it.each([
    ['parts', () => `/projects/${projectId}/parts?text=%00`],
    ['an export', () => `/projects/${projectId}/parts/export?format=csv&text=a%00`],
    ['materials', () => '/materials?text=%00'],
  ])('is refused in words in the search of %s', async (_, makePath) => {
    expect(await engineer.ask<Problem>('GET', makePath())).toMatchObject({ status: 422, body: { detail: expect.stringContaining('text:') as string } });
  });
  it('names no material', async () => {
    expect((await engineer.ask('GET', '/materials/%00/parts')).status).toBe(404);
    expect((await engineer.ask('PATCH', '/materials/a%00', { version: 1, name: 'B' })).status).toBe(404);
  });
  it('is refused when an upload is completed: as the part’s name and as the reason of a revision', async () => {
    const { id } = await engineer.send(projectId, 'cover.stl', block([0, 0, 0], [1, 1, 2]));
    const setting = { lengthUnit: 'mm' };
    expect((await engineer.ask('POST', `/uploads/${id}/completion`, { setting, partName: nul })).status).toBe(422);
    expect((await engineer.ask('POST', `/uploads/${id}/completion`, { setting, revisionOf: { partId: part.id, reason: nul } })).status).toBe(422);
    // Pairs that are whole are letters like others.
    expect((await engineer.complete(id, undefined, { partName: 'Seil 𝛼 🪢' })).name).toBe('Seil 𝛼 🪢');
  });
  it('is refused in a table of materials, by its row', async () => {
    const { errors } = await engineer.expect<{ errors: object[] }>('POST', '/materials/import', { csv: 'name,density_kg_m3,spread_kg_m3\nfine,1000,10\nco\u0000ver,1000,10\n', rehearse: false });
    expect(errors).toMatchObject([{ row: 3, column: 'name' }]);
  });
});
