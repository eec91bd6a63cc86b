import { cleanFileName, type NameMatches, type OpenUploads, type Upload } from '@masswright/contracts';
import type { StoredPart as PartWithRevision, UploadRow } from '@masswright/drizzle';
import type { StoredPart } from '@masswright/storage';
import { revisionLetter } from '../parts/part.presenter';
import { countParts } from './part-layout';

export function presentOpenUpload(row: UploadRow): OpenUploads['items'][number] {
  return {
    id: row.id,
    projectId: row.projectId,
    fileName: row.fileName,
    folder: row.folder,
    sizeBytes: row.sizeBytes,
    state: row.state,
    createdAt: row.createdAt.toISOString(),
    partSizeBytes: row.partSizeBytes,
    partCount: countParts(row.sizeBytes, row.partSizeBytes),
  };
}

export function presentUpload(row: UploadRow, storedParts: readonly StoredPart[]): Upload {
  return {
    ...presentOpenUpload(row),
    storedParts: storedParts.map(({ partNumber, sizeBytes, sha256 }) => ({ partNumber, sizeBytes, sha256: sha256 ?? null })),
  };
}

/** A part whose file has the name that was asked for. */
export function presentNameMatch(fileName: string, { part, revision, upload }: PartWithRevision): NameMatches['matches'][number] {
  return {
    fileName,
    partId: part.id,
    number: part.number,
    name: part.name,
    letter: revisionLetter(revision.ordinal),
    storedFileName: upload.fileName,
    folder: upload.folder,
    sizeBytes: upload.sizeBytes,
    sha256: upload.sha256?.toString('hex') ?? null,
    sameCase: upload.fileName === cleanFileName(fileName),
  };
}
