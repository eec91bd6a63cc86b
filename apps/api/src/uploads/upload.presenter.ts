import type { OpenUploads, Upload } from '@masswright/contracts';
import type { UploadRow } from '@masswright/drizzle';
import type { StoredPart } from '@masswright/storage';
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
