import { bigserial, index, integer, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';
import { at, createdAt, primaryId } from './columns';

/** Who changed what: written in the transaction of every change, and only ever added to. */
export const auditEvents = pgTable(
  'audit_events',
  {
    id: primaryId(),
    /** Null for what a person does apart from any organisation, such as setting a new password. */
    organisationId: uuid('organisation_id'),
    actorId: uuid('actor_id'),
    action: text('action').notNull(),
    subjectType: text('subject_type').notNull(),
    subjectId: uuid('subject_id').notNull(),
    before: jsonb('before'),
    after: jsonb('after'),
    requestId: text('request_id').notNull(),
    createdAt: createdAt(),
  },
  (table) => [index('audit_events_subject_index').on(table.organisationId, table.subjectId, table.createdAt)],
);

/**
 * Work that a committed change asks for. A row is done only when the work itself is, so a queue that forgets
 * (a flushed Redis, a killed worker) loses nothing: the relay hands out again what is not done.
 */
export const outbox = pgTable(
  'outbox',
  {
    id: bigserial('id', { mode: 'number' }).primaryKey(),
    organisationId: uuid('organisation_id'),
    job: text('job').notNull(),
    payload: jsonb('payload').notNull(),
    requestId: text('request_id').notNull(),
    createdAt: createdAt(),
    /** Not handed out before this time; moved on each time that the row is handed out. */
    dueAt: at('due_at').notNull().defaultNow(),
    handedOut: integer('handed_out').notNull().default(0),
    doneAt: at('done_at'),
  },
  (table) => [index('outbox_open_index').on(table.dueAt).where(sql`done_at is null`)],
);
