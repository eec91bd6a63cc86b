import { randomUUID } from 'node:crypto';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Part, PartList, PartSelection, SettingsChange, StoredSetting } from '@masswright/contracts';
import { startTestApi, type TestApi } from '../../support/api';
import type { Answer, ApiUser } from '../../support/api-user';
import { listen } from '../../support/events';
import { fillProject } from '../../support/filled-project';
import { block } from '../../support/meshes';
import { expectSummariesToFollow } from '../../support/summaries';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';

let database: TestDatabase;
let api: TestApi;
let engineer: ApiUser;
let projectId: string;
let ids: string[];

async function fill(count: number, mixed = false): Promise<{ projectId: string; ids: string[] }> {
  const { id } = await engineer.createProject();
  const session = engineer.session;
  if (session === undefined) throw new Error('Nobody is signed in.');
  return { projectId: id, ids: await fillProject(database.look, database.applicationUrl, { organisationId: session.organisation.id, projectId: id, userId: session.user.id, count, mixed }) };
}
const change = (parts: PartSelection, made: object, user = engineer): Promise<Answer<SettingsChange>> => user.ask<SettingsChange>('POST', `/projects/${projectId}/setting-changes`, { parts, change: made });
const undo = (changeId: string, user = engineer): Promise<Answer<SettingsChange>> => user.ask<SettingsChange>('POST', `/setting-changes/${changeId}/undo`);
const at = (index: number): string => ids[index] ?? 'none';
const settingOf = async (partId: string): Promise<StoredSetting> => (await engineer.get<Part>(`/parts/${partId}`)).revision.setting;
const settings = async (): Promise<StoredSetting[]> => Promise.all(ids.map(settingOf));
/** A setting without what counts and dates its changes. */
const content = ({ version: _, changedAt: __, ...setting }: StoredSetting) => setting;

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  engineer = api.visit();
  await engineer.signUp();
});
beforeEach(async () => {
  ({ projectId, ids } = await fill(22, true));
});
afterEach(async () => {
  await expectSummariesToFollow(database);
});
afterAll(async () => {
  await api.close();
  await database.drop();
});

describe('one change for many parts', () => {
  it('states a unit, and the figures follow at once', async () => {
    const { status, body } = await change({ ids }, { lengthUnit: 'cm' });
    expect(status).toBe(201);
    expect(body).toMatchObject({ projectId, changed: 22, unchanged: 0, left: [], reverses: null, createdBy: 'Ines Marsh' });
    for (const setting of await settings()) expect(setting).toMatchObject({ lengthUnit: 'cm', version: 2, unitStated: { by: 'Ines Marsh' } });
    const [row] = (await engineer.get<PartList>(`/projects/${projectId}/parts?offset=2&limit=1`)).items;
    // m = ρabc: standard handbook value, from memory.
    expect(row?.massKg).toBeCloseTo(2700 * 0.13 * 0.23 * 0.08, 9);
  });

  it('takes the density of the library for a material, and leaves what is so already', async () => {
    const { body } = await change({ ids }, { material: { id: 'al-6061-t6' } });
    // Two of twenty-two had no density, the others this very one.
    expect(body).toMatchObject({ changed: 2, unchanged: 20 });
    for (const setting of await settings()) expect(setting).toMatchObject({ densityKgM3: 2700, densitySpreadKgM3: 27, material: { id: 'al-6061-t6', name: 'Aluminium 6061-T6' } });
  });

  it('leaves the tolerance as made as it is, and so does taking it back', async () => {
    const asMade = { kind: 'scale', spread: 0.003 };
    const { status } = await engineer.ask<Part>('PATCH', `/parts/${at(0)}/setting`, { version: 1, asMade });
    expect(status).toBe(200);
    const { body } = await change({ ids }, { lengthUnit: 'cm' });
    expect(await settingOf(at(0))).toMatchObject({ lengthUnit: 'cm', asMade });
    await undo(body.id);
    expect(await settingOf(at(0))).toMatchObject({ asMade, shellDensities: [] });
  });

  it('by a filter takes what matches the text and the states, but some', async () => {
    const { items } = await engineer.get<PartList>(`/projects/${projectId}/parts?text=housing&states=ready`);
    expect(items.length).toBeGreaterThan(1);
    const spared = items[0]?.id ?? 'none';
    const { body } = await change({ filter: { text: 'housing', states: 'ready' }, except: [spared] }, { axis: { kind: 'principal', number: 3 } });
    expect(body.changed).toBe(items.length - 1);
    const changed = (await Promise.all(ids.map(async (id) => ({ id, ...(await settingOf(id)) })))).filter(({ axis }) => axis.kind === 'principal');
    expect(changed.map(({ id }) => id)).toEqual(items.slice(1).map(({ id }) => id));
  });

  it('is heard by the project’s readers as one event, and stands in the audit once', async () => {
    const ears = await listen(engineer);
    await ears.wait(({ type }) => type === 'hello');
    const { body } = await change({ ids }, { densityKgM3: 1234.5 });
    await ears.wait((event) => event.type === 'parts' && event.projectId === projectId);
    ears.close();
    expect(ears.events.filter(({ type }) => type === 'part')).toEqual([]);
    const audit = await database.look<{ action: string; after: unknown }>(`select action, after from audit_events where subject_id = $1`, [body.id]);
    expect(audit).toMatchObject([{ action: 'settings.change', after: { projectId, changed: 22, said: { densityKgM3: 1234.5 } } }]);
  });

  it('keeps every digit', async () => {
    const densityKgM3 = 2700.0000000000005;
    const axis = { kind: 'typed', pointM: [0.1 + 0.2, -1e-7, 5e-324], direction: [1 / 3, -0.1, 1e-9] };
    await change({ ids: [at(0)] }, { densityKgM3, axis });
    const { body } = await change({ ids: [at(0)] }, { lengthUnit: 'inch' });
    await undo(body.id);
    expect(await settingOf(at(0))).toMatchObject({ densityKgM3, axis, lengthUnit: 'mm', version: 4 });
  });

  it.each([
    ['an unknown part', () => [at(0), randomUUID()], { lengthUnit: 'mm' }, 404, 'not-found'],
    ['an unknown material', () => [at(0)], { material: { id: 'unobtainium' } }, 422, 'invalid-input'],
    ['a part of another project', async () => [at(0), (await fill(1)).ids[0] ?? ''], { lengthUnit: 'mm' }, 404, 'not-found'],
    ['a density of nothing', () => [at(0)], { densityKgM3: 0 }, 422, 'invalid-input'],
  ])('with %s is refused whole', async (_, choose, made, status, code) => {
    const before = await settings();
    expect(await change({ ids: await choose() }, made)).toMatchObject({ status, body: { code } });
    expect(await settings()).toEqual(before);
  });

  it('leaves a part that is deleted as it is and names it; of deleted ones alone it is refused with the way out', async () => {
    await engineer.expect('POST', `/projects/${projectId}/part-deletions`, { parts: { ids: [at(3)] } });
    const before = await settingOf(at(3));
    const { status, body } = await change({ ids }, { lengthUnit: 'm' });
    expect([status, body.changed, body.left]).toMatchObject([201, 21, [{ partId: at(3), number: 4, changedBy: '' }]]);
    expect(await settingOf(at(3))).toEqual(before);
    const alone = await engineer.ask<{ detail: string }>('POST', `/projects/${projectId}/setting-changes`, { parts: { ids: [at(3)] }, change: { lengthUnit: 'm' } });
    expect([alone.status, alone.body.detail]).toEqual([409, expect.stringContaining('Restore it first')]);
    // A filter means the others.
    const filtered = await change({ filter: {}, except: [] }, { lengthUnit: 'cm' });
    expect([filtered.body.changed, filtered.body.left]).toEqual([21, []]);
    // Nor, where the person says how many they saw, others than those.
    const unseen = await engineer.ask<{ detail: string }>('POST', `/projects/${projectId}/setting-changes`, { parts: { filter: {}, except: [], expected: 20 }, change: { lengthUnit: 'm' } });
    expect([unseen.status, unseen.body.detail]).toEqual([409, '21 parts match now; you chose 20. Look again.']);
  });
});

describe('taking it back', () => {
  it('restores every setting as it was, and when and by whom its unit was stated', async () => {
    const before = (await settings()).map(content);
    const { body } = await change({ ids }, { lengthUnit: 'foot', material: { id: 'pla' }, axis: { kind: 'mesh', along: 'x' } });
    const back = await undo(body.id);
    expect(back).toMatchObject({ status: 201, body: { changed: 22, left: [], reverses: body.id } });
    const after = await settings();
    expect(after.map(({ changedBy: _, ...setting }) => content(setting as StoredSetting))).toEqual(before.map(({ changedBy: _, ...setting }) => setting));
    expect(new Set(after.map(({ version }) => version))).toEqual(new Set([3]));
  });

  it('can be taken back in turn, and again', async () => {
    const { body: first } = await change({ ids }, { lengthUnit: 'foot' });
    let last = first.id;
    for (const unit of ['before', 'foot', 'before', 'foot']) {
      const { body } = await undo(last);
      expect(body.reverses).toBe(last);
      const units = new Set((await settings()).map(({ lengthUnit }) => lengthUnit));
      expect(units).toEqual(unit === 'foot' ? new Set(['foot']) : new Set(['mm', null]));
      last = body.id;
    }
  });

  it('twice is refused, and says who did it', async () => {
    const { body } = await change({ ids }, { lengthUnit: 'm' });
    await undo(body.id);
    const again = await undo(body.id);
    expect(again).toMatchObject({ status: 409, body: { code: 'conflict', detail: expect.stringContaining('Ines Marsh has taken this change back already') as string } });
    expect((await undo(randomUUID())).status).toBe(404);
  });

  it('twice at once happens once', async () => {
    const { body } = await change({ ids }, { lengthUnit: 'm' });
    const answers = await Promise.all([undo(body.id), undo(body.id), undo(body.id)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409]);
    expect(new Set((await settings()).map(({ version }) => version))).toEqual(new Set([3]));
  });

  it('leaves what was changed since, what has a new revision and what is deleted, and names them', async () => {
    const { body } = await change({ ids }, { lengthUnit: 'm' });
    await engineer.expect('PATCH', `/parts/${at(1)}/setting`, { version: 2, densityKgM3: 1 });
    await engineer.addMesh(projectId, 'next.stl', block([0, 0, 0], [1, 1, 1]), { lengthUnit: 'mm', densityKgM3: 1000 }, { revisionOf: { partId: at(4), reason: 'Thicker' } });
    await engineer.expect('POST', `/projects/${projectId}/part-deletions`, { parts: { ids: [at(7)] } });
    const back = await undo(body.id);
    expect(back.body).toMatchObject({ changed: 19, left: [{ number: 2, partId: at(1), changedBy: 'Ines Marsh' }, { number: 5 }, { number: 8, changedBy: '' }] });
    expect(await settingOf(at(1))).toMatchObject({ lengthUnit: 'm', densityKgM3: 1, version: 3 });
    expect(await settingOf(at(2))).toMatchObject({ lengthUnit: 'mm', version: 3 });
  });

  it('is refused with names where nothing can be put back, and not used up by that', async () => {
    const { body } = await change({ ids: [at(0), at(1)] }, { lengthUnit: 'm' });
    const { body: later } = await change({ ids: [at(0)] }, { lengthUnit: 'foot' });
    await engineer.expect('POST', `/projects/${projectId}/part-deletions`, { parts: { ids: [at(1)] } });
    const refused = await undo(body.id);
    expect(refused).toMatchObject({ status: 409, body: { code: 'conflict', detail: expect.stringMatching(/^Nothing was put back, .*\(Ines Marsh\), .*\(deleted\)\.$/) as string } });
    expect(await settingOf(at(0))).toMatchObject({ lengthUnit: 'foot', version: 3 });
    await engineer.expect('POST', `/projects/${projectId}/part-restorations`, { parts: { ids: [at(1)] } });
    expect(await undo(body.id)).toMatchObject({ status: 201, body: { changed: 1, left: [{ number: 1 }], reverses: body.id } });
    expect((await undo(later.id)).status).toBe(201);
  });
});

describe('several people at once', () => {
  it('two changes of the same parts come one after the other: nothing is lost', async () => {
    for (let round = 0; round < 5; round++) {
      const answers = await Promise.all([change({ ids }, { lengthUnit: round % 2 === 0 ? 'inch' : 'mm' }), change({ ids: [...ids].reverse() }, { axis: { kind: 'principal', number: round % 2 === 0 ? 1 : 2 } })]);
      expect(answers.map(({ status, body }) => [status, body.changed])).toEqual([[201, 22], [201, 22]]);
    }
    for (const setting of await settings()) expect(setting).toMatchObject({ lengthUnit: 'inch', axis: { kind: 'principal', number: 1 }, version: 11 });
  });

  it('a change of many against one of a single part: the single one is either in it or told that it is stale', async () => {
    for (let round = 0; round < 8; round++) {
      const { version } = await settingOf(at(0));
      const [many, single] = await Promise.all([change({ ids }, { lengthUnit: round % 2 === 0 ? 'inch' : 'cm' }), engineer.ask<Part>('PATCH', `/parts/${at(0)}/setting`, { version, densityKgM3: 1000 + round })]);
      expect(many.status).toBe(201);
      expect([200, 409]).toContain(single.status);
      const after = await settingOf(at(0));
      expect(after).toMatchObject({ lengthUnit: round % 2 === 0 ? 'inch' : 'cm', version: version + (single.status === 200 ? 2 : 1) });
      expect(after.densityKgM3 === 1000 + round).toBe(single.status === 200);
    }
  });

  it('taking back against a change of a single part: whichever was first stands, and no setting is half of each', async () => {
    for (let round = 0; round < 8; round++) {
      const { body } = await change({ ids }, { lengthUnit: 'foot', densityKgM3: 500 + round });
      const { version } = await settingOf(at(0));
      const [back, single] = await Promise.all([undo(body.id), engineer.ask<Part>('PATCH', `/parts/${at(0)}/setting`, { version, densityKgM3: 9000 + round })]);
      expect(back.status).toBe(201);
      const after = await settingOf(at(0));
      if (single.status === 200) {
        expect(after).toMatchObject({ lengthUnit: 'foot', densityKgM3: 9000 + round });
        expect(back.body.left).toMatchObject([{ number: 1 }]);
      } else {
        expect(single.status).toBe(409);
        expect(after.densityKgM3).not.toBe(9000 + round);
        expect(back.body).toMatchObject({ changed: 22, left: [] });
      }
    }
  });

  it('a change of many against their deletion: it is whole or refused', async () => {
    const [made, deleted] = await Promise.all([change({ ids }, { lengthUnit: 'm' }), engineer.ask('POST', `/projects/${projectId}/part-deletions`, { parts: { ids } })]);
    expect(deleted.status).toBe(201);
    expect([201, 409]).toContain(made.status);
    expect(new Set((await settings()).map(({ version }) => version))).toEqual(new Set([made.status === 201 ? 2 : 1]));
  });

  it('people of another organisation can neither change nor take back', async () => {
    const stranger = api.visit();
    await stranger.signUp('Other Person');
    const { body } = await change({ ids }, { lengthUnit: 'm' });
    expect((await change({ ids }, { lengthUnit: 'm' }, stranger)).status).toBe(404);
    expect((await undo(body.id, stranger)).status).toBe(404);
  });
});
