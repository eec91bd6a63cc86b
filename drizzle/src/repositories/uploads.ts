import { sql } from 'drizzle-orm';
import { and, eq, inArray, lt } from 'drizzle-orm';
import { revisions, uploads } from '../schema';
import type { Transaction } from '../tenancy/database';

export interface UploadRow {
  id: string;
  projectId: string;
  fileName: string;
  sizeBytes: number;
  partSizeBytes: number;
  objectKey: string;
  multipartId: string;
  state: 'open' | 'stored' | 'cancelled';
}

const columns = {
  id: uploads.id,
  projectId: uploads.projectId,
  fileName: uploads.fileName,
  sizeBytes: uploads.sizeBytes,
  partSizeBytes: uploads.partSizeBytes,
  objectKey: uploads.objectKey,
  multipartId: uploads.multipartId,
  state: uploads.state,
};

export async function insertUpload(
  tx: Transaction,
  upload: Omit<UploadRow, 'state'> & { organisationId: string; createdBy: string },
): Promise<void> {
  await tx.insert(uploads).values(upload);
}

export async function findUpload(tx: Transaction, uploadId: string): Promise<UploadRow | undefined> {
  const rows = await tx.select(columns).from(uploads).where(eq(uploads.id, uploadId));
  return rows[0];
}

/** Turns an open upload into a stored or a cancelled one; false when it was no longer open. */
export async function closeUpload(tx: Transaction, uploadId: string, state: 'stored' | 'cancelled'): Promise<boolean> {
  const rows = await tx
    .update(uploads)
    .set(state === 'stored' ? { state, storedAt: sql`now()` } : { state })
    .where(and(eq(uploads.id, uploadId), eq(uploads.state, 'open')))
    .returning({ id: uploads.id });
  return rows.length > 0;
}

export async function setUploadHash(tx: Transaction, uploadId: string, sha256: Buffer): Promise<void> {
  await tx.update(uploads).set({ sha256 }).where(eq(uploads.id, uploadId));
}

/** Uploads of every organisation that were begun so long ago and never completed. Needs the relay's scope. */
export async function findAbandonedUploads(tx: Transaction, olderThanHours: number): Promise<{ id: string; organisationId: string; objectKey: string; multipartId: string }[]> {
  return tx
    .select({ id: uploads.id, organisationId: uploads.organisationId, objectKey: uploads.objectKey, multipartId: uploads.multipartId })
    .from(uploads)
    .where(and(eq(uploads.state, 'open'), lt(uploads.createdAt, sql`now() - ${`${olderThanHours} hours`}::interval`)))
    .limit(200);
}

/** Which of the keys no upload knows. Needs the relay's scope. */
export async function findUnknownKeys(tx: Transaction, keys: readonly string[]): Promise<string[]> {
  const known = await tx.select({ key: uploads.objectKey }).from(uploads).where(inArray(uploads.objectKey, [...keys]));
  const names = new Set(known.map(({ key }) => key));
  return keys.filter((key) => !names.has(key));
}

/** The part that an upload became, if it did. */
export async function findPartOfUpload(tx: Transaction, uploadId: string): Promise<string | undefined> {
  const rows = await tx.select({ partId: revisions.partId }).from(revisions).where(eq(revisions.uploadId, uploadId));
  return rows[0]?.partId;
}
