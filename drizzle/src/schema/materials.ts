import { sql } from 'drizzle-orm';
import { check, doublePrecision, integer, pgTable, text, unique, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import type { MaterialGroup, SpreadBasis } from '@masswright/contracts';
import { at, createdAt, ofOrganisation, primaryId } from './columns';
import { organisations, users } from './people';

/** An organisation's own materials; those that every installation has are in the code. */
export const materials = pgTable(
  'materials',
  {
    id: primaryId(),
    organisationId: ofOrganisation().references(() => organisations.id),
    name: text('name').notNull(),
    group: text('group_name').$type<MaterialGroup>().notNull(),
    densityKgM3: doublePrecision('density_kg_m3').notNull(),
    densitySpreadKgM3: doublePrecision('density_spread_kg_m3').notNull(),
    spreadBasis: text('spread_basis').$type<SpreadBasis>().notNull(),
    source: text('source').notNull(),
    version: integer('version').notNull().default(1),
    archivedAt: at('archived_at'),
    createdAt: createdAt(),
    changedAt: at('changed_at').notNull().defaultNow(),
    changedBy: uuid('changed_by').notNull().references(() => users.id),
  },
  (table) => [
    unique('materials_organisation_id_id_key').on(table.organisationId, table.id),
    uniqueIndex('materials_name_key').on(table.organisationId, sql`lower(${table.name})`),
    check('materials_density_is_positive', sql`${table.densityKgM3} > 0`),
    check('materials_spread_is_not_negative', sql`${table.densitySpreadKgM3} >= 0`),
  ],
);
