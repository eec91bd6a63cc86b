import { integer, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { at, bytea } from './columns';

/**
 * How often something that is limited was tried, counted in PostgreSQL so that it holds across api processes and restarts.
 * `key_hash` is a keyed hash of the account or address: the table names nobody.
 */
export const attempts = pgTable(
  'attempts',
  {
    kind: text('kind').notNull(),
    keyHash: bytea('key_hash').notNull(),
    count: integer('count').notNull(),
    windowEndsAt: at('window_ends_at').notNull(),
  },
  (table) => [primaryKey({ columns: [table.kind, table.keyHash] })],
);
