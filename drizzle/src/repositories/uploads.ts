import { sql } from 'drizzle-orm';
import { and, eq, inArray, isNull, lt } from 'drizzle-orm';
import { parts, partSummaries, projects, revisions, uploads, type UploadState } from '../schema';
import type { Transaction } from '../tenancy/database';
import { isOfThisOrganisation } from '../tenancy/of-this-organisation';

export interface UploadRow {
  id: string;
  projectId: string;
  fileName: string;
  folder: string;
  sizeBytes: number;
  partSizeBytes: number;
  objectKey: string;
  multipartId: string;
  state: UploadState;
  createdAt: Date;
}

const columns = {
  id: uploads.id,
  projectId: uploads.projectId,
  fileName: uploads.fileName,
  folder: uploads.folder,
  sizeBytes: uploads.sizeBytes,
  partSizeBytes: uploads.partSizeBytes,
  objectKey: uploads.objectKey,
  multipartId: uploads.multipartId,
  state: uploads.state,
  createdAt: uploads.createdAt,
};

export async function insertUpload(
  tx: Transaction,
  upload: Omit<UploadRow, 'state' | 'createdAt'> & { organisationId: string; createdBy: string },
): Promise<UploadRow> {
  const [row] = await tx.insert(uploads).values(upload).returning(columns);
  if (row === undefined) throw new Error('An insert gave no row.');
  return row;
}

export async function findUpload(tx: Transaction, uploadId: string): Promise<UploadRow | undefined> {
  const rows = await tx.select(columns).from(uploads).where(eq(uploads.id, uploadId));
  return rows[0];
}

/** What a person began to send to a project and did not finish, the oldest first. */
export async function listOpenUploads(tx: Transaction, projectId: string, userId: string): Promise<UploadRow[]> {
  return tx
    .select(columns)
    .from(uploads)
    .where(and(isOfThisOrganisation(uploads), eq(uploads.projectId, projectId), eq(uploads.createdBy, userId), eq(uploads.state, 'open')))
    .orderBy(uploads.createdAt, uploads.id)
    .limit(2000);
}

/**
 * Bytes that the organisation's files take: those that are stored and those that are announced. Holds the organisation until the transaction ends,
 * so that two announcements at once can't both take the last room.
 */
export async function holdStoredBytes(tx: Transaction, organisationId: string): Promise<number> {
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`uploads of ${organisationId}`}, 0))`);
  return sumStoredBytes(tx, organisationId);
}

export async function sumStoredBytes(tx: Transaction, organisationId: string): Promise<number> {
  const [row] = await tx
    .select({ bytes: sql<string>`coalesce(sum(${uploads.sizeBytes}), 0)` })
    .from(uploads)
    .where(and(eq(uploads.organisationId, organisationId), inArray(uploads.state, ['open', 'stored'])));
  return Number(row?.bytes ?? 0);
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

/** By SHA-256 in hexadecimal digits: how many revisions of parts that are not deleted have those bytes. */
export async function countSameBytes(tx: Transaction, hashes: readonly Buffer[]): Promise<Map<string, number>> {
  if (hashes.length === 0) return new Map();
  const rows = await tx
    .select({ sha256: uploads.sha256, count: sql<number>`count(*)::int` })
    .from(uploads)
    .innerJoin(revisions, and(eq(revisions.organisationId, uploads.organisationId), eq(revisions.uploadId, uploads.id)))
    .innerJoin(parts, and(eq(parts.organisationId, revisions.organisationId), eq(parts.id, revisions.partId)))
    .where(and(isOfThisOrganisation(uploads), inArray(uploads.sha256, [...hashes]), isNull(parts.deletedAt)))
    .groupBy(uploads.sha256);
  return new Map(rows.map(({ sha256, count }) => [sha256?.toString('hex') ?? '', count]));
}

/** Revisions of the organisation, but the given one, that have these bytes, the oldest first. */
export async function listSameBytes(tx: Transaction, sha256: Buffer, exceptRevisionId: string) {
  return tx
    .select({ projectId: parts.projectId, projectName: projects.name, partId: parts.id, number: parts.number, name: parts.name, ordinal: revisions.ordinal })
    .from(uploads)
    .innerJoin(revisions, and(eq(revisions.organisationId, uploads.organisationId), eq(revisions.uploadId, uploads.id)))
    .innerJoin(parts, and(eq(parts.organisationId, revisions.organisationId), eq(parts.id, revisions.partId)))
    .innerJoin(projects, and(eq(projects.organisationId, parts.organisationId), eq(projects.id, parts.projectId)))
    .where(and(isOfThisOrganisation(uploads), eq(uploads.sha256, sha256), isNull(parts.deletedAt), sql`${revisions.id} <> ${exceptRevisionId}`))
    .orderBy(revisions.createdAt, revisions.id)
    .limit(20);
}

/** Parts of a project, deleted ones left out, whose latest revision's file has one of these names (`fileNameKey`), by number. */
export async function findPartsByFileName(tx: Transaction, projectId: string, fileKeys: readonly string[]): Promise<{ partId: string; fileKey: string }[]> {
  if (fileKeys.length === 0) return [];
  return tx
    .select({ partId: partSummaries.partId, fileKey: partSummaries.fileKey })
    .from(partSummaries)
    .where(and(isOfThisOrganisation(partSummaries), eq(partSummaries.projectId, projectId), inArray(partSummaries.fileKey, [...fileKeys]), isNull(partSummaries.deletedAt)))
    .orderBy(partSummaries.number);
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

/** The part that an upload became, or a revision of which it became, if it did. */
export async function findPartOfUpload(tx: Transaction, uploadId: string): Promise<string | undefined> {
  const rows = await tx.select({ partId: revisions.partId }).from(revisions).where(eq(revisions.uploadId, uploadId));
  return rows[0]?.partId;
}
