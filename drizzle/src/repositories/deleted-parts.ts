import { sql } from 'drizzle-orm';
import { and, eq, inArray, lt } from 'drizzle-orm';
import { measuringRuns, parts, partSummaries, revisions, settings, uploads } from '../schema';
import type { Transaction } from '../tenancy/database';

/** The one thing of a summary that deleting and restoring change; ten thousand parts needn't be summarised anew for it. */
async function carryOverToSummaries(tx: Transaction, partIds: readonly string[]): Promise<void> {
  await tx.execute(sql`
    update part_summaries set deleted_at = parts.deleted_at from parts
    where parts.organisation_id = part_summaries.organisation_id and parts.id = part_summaries.part_id and part_summaries.part_id = any(${sql.param([...partIds])}::uuid[])`);
}

/** Marks parts as deleted, in their summaries too; those that were already keep their date. Gives those that were not. */
export async function markPartsDeleted(tx: Transaction, partIds: readonly string[], deletedBy: string): Promise<string[]> {
  const rows = await tx
    .update(parts)
    .set({ deletedAt: sql`now()`, deletedBy })
    .where(sql`${parts.id} = any(${sql.param([...partIds])}::uuid[]) and ${parts.deletedAt} is null`)
    .returning({ id: parts.id });
  const ids = rows.map(({ id }) => id);
  await carryOverToSummaries(tx, ids);
  return ids;
}

/** Takes the mark of deletion away, from their summaries too; gives the parts that had it. */
export async function unmarkPartsDeleted(tx: Transaction, partIds: readonly string[]): Promise<string[]> {
  const rows = await tx
    .update(parts)
    .set({ deletedAt: null, deletedBy: null })
    .where(sql`${parts.id} = any(${sql.param([...partIds])}::uuid[]) and ${parts.deletedAt} is not null`)
    .returning({ id: parts.id });
  const ids = rows.map(({ id }) => id);
  await carryOverToSummaries(tx, ids);
  return ids;
}

/** Parts of every organisation that were deleted longer ago than they are kept, the oldest first. Needs the relay's scope. */
export async function findPartsToForget(tx: Transaction, afterDays: number, limit: number): Promise<{ partId: string; organisationId: string }[]> {
  return tx
    .select({ partId: parts.id, organisationId: parts.organisationId })
    .from(parts)
    .where(lt(parts.deletedAt, sql`now() - ${`${afterDays} days`}::interval`))
    .orderBy(parts.deletedAt)
    .limit(limit);
}

/**
 * Forgets a part for good if it is still deleted and its time is over: revisions, settings, runs, summary, what bulk changes know of it. Its measurements
 * stay, since they are the organisation's and belong to bytes, not to a part. Gives what the storage holds for it, whose uploads are discarded; undefined
 * where somebody restored or forgot it first.
 */
export async function forgetPart(tx: Transaction, partId: string, afterDays: number): Promise<{ number: number; projectId: string; objectKeys: string[] } | undefined> {
  const [part] = await tx
    .select({ number: parts.number, projectId: parts.projectId })
    .from(parts)
    .where(and(eq(parts.id, partId), lt(parts.deletedAt, sql`now() - ${`${afterDays} days`}::interval`)))
    .for('update');
  if (part === undefined) return undefined;
  const its = await tx.select({ revisionId: revisions.id, uploadId: revisions.uploadId }).from(revisions).where(eq(revisions.partId, partId));
  const revisionIds = its.map(({ revisionId }) => revisionId);
  await tx.delete(measuringRuns).where(inArray(measuringRuns.revisionId, revisionIds));
  await tx.delete(settings).where(inArray(settings.revisionId, revisionIds));
  await tx.delete(revisions).where(eq(revisions.partId, partId));
  await tx.delete(partSummaries).where(eq(partSummaries.partId, partId));
  await tx.delete(parts).where(eq(parts.id, partId));
  const discarded = await tx
    .update(uploads)
    .set({ state: 'discarded' })
    .where(inArray(uploads.id, its.map(({ uploadId }) => uploadId)))
    .returning({ objectKey: uploads.objectKey });
  return { ...part, objectKeys: discarded.map(({ objectKey }) => objectKey) };
}
