import { sql } from 'drizzle-orm';
import { and, eq, gt, lte, or } from 'drizzle-orm';
import { sessions } from '../schema';
import type { Transaction } from '../tenancy/database';

export interface SessionRow {
  id: string;
  userId: string;
  organisationId: string;
  lastSeenAt: Date;
  absoluteEndsAt: Date;
}

export async function insertSession(
  tx: Transaction,
  session: { tokenHash: Buffer; userId: string; organisationId: string; idleEndsAt: Date; absoluteEndsAt: Date },
): Promise<string> {
  const rows = await tx.insert(sessions).values(session).returning({ id: sessions.id });
  const row = rows[0];
  if (row === undefined) throw new Error('An insert gave no row.');
  return row.id;
}

const stands = and(gt(sessions.idleEndsAt, sql`now()`), gt(sessions.absoluteEndsAt, sql`now()`));

/** The session of a token, if it stands. Needs the scope of the token. */
export async function findSessionByToken(tx: Transaction, tokenHash: Buffer): Promise<SessionRow | undefined> {
  const rows = await tx
    .select({
      id: sessions.id,
      userId: sessions.userId,
      organisationId: sessions.organisationId,
      lastSeenAt: sessions.lastSeenAt,
      absoluteEndsAt: sessions.absoluteEndsAt,
    })
    .from(sessions)
    .where(and(eq(sessions.tokenHash, tokenHash), stands));
  return rows[0];
}

/** The organisation that a session is in, if it still stands. Needs the scope of its person. */
export async function findOrganisationOfSession(tx: Transaction, sessionId: string): Promise<string | undefined> {
  const rows = await tx.select({ organisationId: sessions.organisationId }).from(sessions).where(and(eq(sessions.id, sessionId), stands));
  return rows[0]?.organisationId;
}

/** Moves the idle limit on. Needs the scope of the token. */
export async function touchSession(tx: Transaction, sessionId: string, idleEndsAt: Date): Promise<void> {
  await tx.update(sessions).set({ lastSeenAt: sql`now()`, idleEndsAt }).where(eq(sessions.id, sessionId));
}

export async function moveSession(tx: Transaction, sessionId: string, organisationId: string): Promise<void> {
  await tx.update(sessions).set({ organisationId }).where(eq(sessions.id, sessionId));
}

export async function deleteSession(tx: Transaction, sessionId: string): Promise<void> {
  await tx.delete(sessions).where(eq(sessions.id, sessionId));
}

export async function deleteSessionsOfUser(tx: Transaction, userId: string): Promise<void> {
  await tx.delete(sessions).where(eq(sessions.userId, userId));
}

/** Deletes the person's sessions whose time is over. */
export async function sweepSessionsOfUser(tx: Transaction, userId: string): Promise<void> {
  await tx
    .delete(sessions)
    .where(and(eq(sessions.userId, userId), or(lte(sessions.idleEndsAt, sql`now()`), lte(sessions.absoluteEndsAt, sql`now()`))));
}
