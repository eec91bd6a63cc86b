import { sql } from 'drizzle-orm';
import { and, eq, lt } from 'drizzle-orm';
import { attempts } from '../schema';
import type { Transaction } from '../tenancy/database';

export interface AttemptKey {
  kind: string;
  keyHash: Buffer;
}

/**
 * Counts one more attempt and gives the count within the running window, and when that ends. Counting comes before the attempt,
 * so that a hundred at once can't all slip through.
 */
export async function countAttempt(tx: Transaction, key: AttemptKey, windowSeconds: number): Promise<{ count: number; windowEndsAt: Date }> {
  const fresh = sql`now() + ${`${windowSeconds} seconds`}::interval`;
  const rows = await tx
    .insert(attempts)
    .values({ ...key, count: 1, windowEndsAt: fresh })
    .onConflictDoUpdate({
      target: [attempts.kind, attempts.keyHash],
      set: {
        count: sql`case when ${attempts.windowEndsAt} <= now() then 1 else ${attempts.count} + 1 end`,
        windowEndsAt: sql`case when ${attempts.windowEndsAt} <= now() then ${fresh} else ${attempts.windowEndsAt} end`,
      },
    })
    .returning({ count: attempts.count, windowEndsAt: attempts.windowEndsAt });
  const row = rows[0];
  if (row === undefined) throw new Error('An upsert gave no row.');
  return row;
}

/** Takes back one counted attempt, for one that turned out right. */
export async function forgiveAttempt(tx: Transaction, key: AttemptKey): Promise<void> {
  await tx
    .update(attempts)
    .set({ count: sql`greatest(${attempts.count} - 1, 0)` })
    .where(and(eq(attempts.kind, key.kind), eq(attempts.keyHash, key.keyHash)));
}

export async function clearAttempts(tx: Transaction, key: AttemptKey): Promise<void> {
  await tx.delete(attempts).where(and(eq(attempts.kind, key.kind), eq(attempts.keyHash, key.keyHash)));
}

/** Forgets counters whose window is over. */
export async function sweepAttempts(tx: Transaction): Promise<void> {
  await tx.delete(attempts).where(lt(attempts.windowEndsAt, sql`now()`));
}
