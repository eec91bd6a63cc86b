import { expect } from 'vitest';
import { Database, findParts, readSummarySource } from '@masswright/drizzle';
import { summarisePart } from '@masswright/mechanics';
import { convertToMetres } from '@masswright/units';
import type { TestDatabase } from './test-database';

/** Holds every summary of every organisation against what it should follow from, computed here a second time; none may be missing or left over. */
export async function expectSummariesToFollow(testDatabase: TestDatabase): Promise<void> {
  const parts = await testDatabase.look<{ id: string; organisation_id: string }>('select id, organisation_id from parts order by id');
  const summaries = new Map((await testDatabase.look<{ part_id: string }>('select * from part_summaries')).map((row) => [row.part_id, row]));
  expect([...summaries.keys()].sort()).toEqual(parts.map(({ id }) => id).sort());
  const database = new Database({ url: testDatabase.applicationUrl, poolSize: 1, applicationName: 'summaries' });
  try {
    for (const organisationId of new Set(parts.map(({ organisation_id: id }) => id))) {
      const ids = parts.filter((part) => part.organisation_id === organisationId).map(({ id }) => id);
      for (const stored of await database.transaction({ organisationId }, (tx) => findParts(tx, ids))) {
        const { part, upload, revision, setting } = stored;
        const { state, figures } = summarisePart(readSummarySource(stored));
        expect(summaries.get(part.id), `the summary of part ${part.number}`).toMatchObject({
          organisation_id: organisationId,
          project_id: part.projectId,
          number: part.number,
          name_key: part.name.toLowerCase(),
          material_key: (setting.materialName ?? '').toLowerCase(),
          search_text: [part.number, part.name, upload.fileName, upload.folder, setting.materialName ?? ''].join('\n').normalize('NFC').toLowerCase(),
          state,
          deleted_at: part.deletedAt,
          changed_at: revision.createdAt > setting.changedAt ? revision.createdAt : setting.changedAt,
          length_unit_m: setting.lengthUnit === null ? null : convertToMetres(1, setting.lengthUnit),
          size_m: figures.sizeM === null ? null : Math.max(...figures.sizeM),
          volume_m3: figures.volumeM3,
          mass_kg: figures.massKg,
          moment_1_kg_m2: figures.principalMomentsKgM2?.[0] ?? null,
          moment_2_kg_m2: figures.principalMomentsKgM2?.[1] ?? null,
          moment_3_kg_m2: figures.principalMomentsKgM2?.[2] ?? null,
        });
      }
    }
  } finally {
    await database.close();
  }
}
