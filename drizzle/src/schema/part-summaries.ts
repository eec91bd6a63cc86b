import { sql } from 'drizzle-orm';
import { doublePrecision, foreignKey, index, integer, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import type { PartState } from '@masswright/contracts';
import { at, ofOrganisation } from './columns';
import { parts } from './parts';

/**
 * One row a part: what a list is searched, filtered and sorted by. Everything in it follows from the part's latest revision, its setting and its measurement,
 * and is written in the same transaction as those (`refreshPartSummaries`); no figure is ever shown from it.
 */
export const partSummaries = pgTable(
  'part_summaries',
  {
    partId: uuid('part_id').primaryKey(),
    organisationId: ofOrganisation(),
    projectId: uuid('project_id').notNull(),
    number: integer('number').notNull(),
    /** In small letters, as are the two that follow: what is sorted and compared by. */
    nameKey: text('name_key').notNull(),
    fileKey: text('file_key').notNull(),
    materialKey: text('material_key').notNull(),
    /** Number, name, file, folder and material in small letters; each word of a search must be somewhere in it. */
    searchText: text('search_text').notNull(),
    state: text('state').$type<PartState>().notNull(),
    deletedAt: at('deleted_at'),
    changedAt: at('changed_at').notNull(),
    lengthUnitM: doublePrecision('length_unit_m'),
    /** Longest side of the bounding box. */
    sizeM: doublePrecision('size_m'),
    volumeM3: doublePrecision('volume_m3'),
    massKg: doublePrecision('mass_kg'),
    moment1KgM2: doublePrecision('moment_1_kg_m2'),
    moment2KgM2: doublePrecision('moment_2_kg_m2'),
    moment3KgM2: doublePrecision('moment_3_kg_m2'),
  },
  (table) => [
    // Every list is of one project: a test of uuids, which row-level security lets through to the index, leaves only its rows for the text search.
    index('part_summaries_project_index').on(table.organisationId, table.projectId, table.number),
    // So that a list by name needs no sorting: comparing names as people count is slow, and it is the order asked for most.
    index('part_summaries_name_index').on(table.organisationId, table.projectId, sql`(${table.nameKey} collate natural_order)`, table.number),
    index('part_summaries_file_index').on(table.organisationId, table.projectId, table.fileKey),
    // Every list says how many deleted parts there are beside it.
    index('part_summaries_deleted_index').on(table.organisationId, table.projectId).where(sql`${table.deletedAt} is not null`),
    foreignKey({
      name: 'part_summaries_part_fkey',
      columns: [table.organisationId, table.partId],
      foreignColumns: [parts.organisationId, parts.id],
    }).onDelete('cascade'),
  ],
);
