import { foreignKey, index, integer, jsonb, pgTable, primaryKey, unique, uuid } from 'drizzle-orm/pg-core';
import type { Setting } from '@masswright/contracts';
import { createdAt, ofOrganisation, primaryId } from './columns';
import { projects, revisions } from './parts';
import { users } from './people';

/** A change of many settings at once, which can be taken back at once. */
export const settingsChanges = pgTable(
  'settings_changes',
  {
    id: primaryId(),
    organisationId: ofOrganisation(),
    projectId: uuid('project_id').notNull(),
    /** The change that this one took back. A change is taken back once. */
    reverses: uuid('reverses'),
    createdAt: createdAt(),
    createdBy: uuid('created_by').notNull().references(() => users.id),
  },
  (table) => [
    unique('settings_changes_organisation_id_id_key').on(table.organisationId, table.id),
    unique('settings_changes_reverses_key').on(table.organisationId, table.reverses),
    foreignKey({
      name: 'settings_changes_project_fkey',
      columns: [table.organisationId, table.projectId],
      foreignColumns: [projects.organisationId, projects.id],
    }),
  ],
);

/** A setting as it was, with when and by whom its unit was stated: taking a change back restores that too. */
export type SettingBefore = Setting & { unitStatedAt: string | null; unitStatedBy: string | null };

/** One setting of a bulk change: what it was before, and the version that the change made of it. */
export const settingsChangeItems = pgTable(
  'settings_change_items',
  {
    organisationId: ofOrganisation(),
    changeId: uuid('change_id').notNull(),
    revisionId: uuid('revision_id').notNull(),
    before: jsonb('before').$type<SettingBefore>().notNull(),
    versionAfter: integer('version_after').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.organisationId, table.changeId, table.revisionId] }),
    index('settings_change_items_revision_index').on(table.organisationId, table.revisionId),
    foreignKey({
      name: 'settings_change_items_change_fkey',
      columns: [table.organisationId, table.changeId],
      foreignColumns: [settingsChanges.organisationId, settingsChanges.id],
    }),
    foreignKey({
      name: 'settings_change_items_revision_fkey',
      columns: [table.organisationId, table.revisionId],
      foreignColumns: [revisions.organisationId, revisions.id],
    }).onDelete('cascade'),
  ],
);
