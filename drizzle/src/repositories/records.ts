import { sql } from 'drizzle-orm';
import { and, asc, eq, isNull, lte } from 'drizzle-orm';
import type { ServerEvent } from '@masswright/contracts';
import { auditEvents, outbox } from '../schema';
import type { Transaction } from '../tenancy/database';

export interface AuditEntry {
  organisationId: string | null;
  actorId: string | null;
  action: string;
  subject: { type: string; id: string };
  before?: unknown;
  after?: unknown;
  requestId: string;
}

/** Notes who changed what, in the transaction of the change. */
export async function recordAudit(tx: Transaction, entry: AuditEntry): Promise<void> {
  await tx.insert(auditEvents).values({
    organisationId: entry.organisationId,
    actorId: entry.actorId,
    action: entry.action,
    subjectType: entry.subject.type,
    subjectId: entry.subject.id,
    before: entry.before ?? null,
    after: entry.after ?? null,
    requestId: entry.requestId,
  });
}

/** Channel of {@link publishEvent}; its payload is a PublishedEvent. */
export const eventChannel = 'masswright_events';
/** Channel on which PostgreSQL itself says that the outbox has a new row. */
export const workChannel = 'masswright_work';
/** Channel on which PostgreSQL itself says that a session ended; its payload is the session's id. */
export const sessionChannel = 'masswright_sessions';

/** Channel on which PostgreSQL itself says that a session moved to another organisation; its payload is the session's id. */
export const sessionMoveChannel = 'masswright_session_moves';

export interface PublishedEvent {
  organisationId: string;
  event: ServerEvent;
}

/** Tells the event streams of an organisation, when and only when the transaction commits. */
export async function publishEvent(tx: Transaction, published: PublishedEvent): Promise<void> {
  await tx.execute(sql`select pg_notify(${eventChannel}, ${JSON.stringify(published)})`);
}

export interface OutboxEntry {
  organisationId: string | null;
  job: string;
  payload: unknown;
  requestId: string;
}

/** Asks for work, when and only when the transaction commits. */
export async function addToOutbox(tx: Transaction, entry: OutboxEntry): Promise<void> {
  await tx.insert(outbox).values(entry);
}

export interface DueWork {
  id: number;
  job: string;
  payload: unknown;
  requestId: string;
  handedOut: number;
}

/**
 * Takes rows that are due and not done, oldest first, and makes each due again after `againAfterMs`: should the queue or the worker
 * lose the job, it is handed out anew. Rows that another relay holds are passed over. Needs the relay's scope.
 */
export async function takeDueWork(tx: Transaction, options: { limit: number; againAfterMs: number }): Promise<DueWork[]> {
  const due = await tx
    .select({ id: outbox.id, job: outbox.job, payload: outbox.payload, requestId: outbox.requestId, handedOut: outbox.handedOut })
    .from(outbox)
    .where(and(isNull(outbox.doneAt), lte(outbox.dueAt, sql`now()`)))
    .orderBy(asc(outbox.dueAt), asc(outbox.id))
    .limit(options.limit)
    .for('update', { skipLocked: true });
  if (due.length > 0) {
    await tx
      .update(outbox)
      .set({
        dueAt: sql`now() + ${`${options.againAfterMs} milliseconds`}::interval`,
        handedOut: sql`${outbox.handedOut} + 1`,
      })
      .where(sql`${outbox.id} = any(${sql.param(due.map((row) => row.id))}::bigint[])`);
  }
  return due;
}

/** The work is done; its row may be forgotten. Safe to say twice. Needs the relay's scope. */
export async function markWorkDone(tx: Transaction, outboxId: number): Promise<void> {
  await tx.update(outbox).set({ doneAt: sql`now()` }).where(and(eq(outbox.id, outboxId), isNull(outbox.doneAt)));
}

/** Whether the work of an outbox row is still to be done. Needs the relay's scope. */
export async function isWorkOpen(tx: Transaction, outboxId: number): Promise<boolean> {
  const rows = await tx.select({ id: outbox.id }).from(outbox).where(and(eq(outbox.id, outboxId), isNull(outbox.doneAt)));
  return rows.length > 0;
}

/** Makes an open row due at once or later, for a job that will be tried again. Needs the relay's scope. */
export async function makeWorkDue(tx: Transaction, outboxId: number, afterMs: number): Promise<void> {
  await tx
    .update(outbox)
    .set({ dueAt: sql`now() + ${`${afterMs} milliseconds`}::interval` })
    .where(and(eq(outbox.id, outboxId), isNull(outbox.doneAt)));
}

/** Forgets rows that were done long ago. Needs the relay's scope. */
export async function forgetDoneWork(tx: Transaction, olderThanDays: number): Promise<void> {
  await tx.delete(outbox).where(lte(outbox.doneAt, sql`now() - ${`${olderThanDays} days`}::interval`));
}

/** How many rows wait and how long the oldest has, for the metrics. Needs the relay's scope. */
export async function measureBacklog(tx: Transaction): Promise<{ open: number; oldestAgeSeconds: number }> {
  const rows = await tx
    .select({
      open: sql<number>`count(*)::int`,
      oldestAgeSeconds: sql<number>`coalesce(extract(epoch from now() - min(${outbox.createdAt})), 0)::float8`,
    })
    .from(outbox)
    .where(isNull(outbox.doneAt));
  return rows[0] ?? { open: 0, oldestAgeSeconds: 0 };
}
