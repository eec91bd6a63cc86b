import type { Upload } from '@masswright/contracts';
import type { UploadRow } from '@masswright/drizzle';
import type { StoredPart } from '@masswright/storage';
import { countParts } from './part-layout';

export function presentUpload(row: UploadRow, storedParts: readonly StoredPart[]): Upload {
  return {
    id: row.id,
    projectId: row.projectId,
    fileName: row.fileName,
    sizeBytes: row.sizeBytes,
    state: row.state,
    partSizeBytes: row.partSizeBytes,
    partCount: countParts(row.sizeBytes, row.partSizeBytes),
    storedParts: storedParts.map(({ partNumber, sizeBytes, etag }) => ({ partNumber, sizeBytes, etag })),
  };
}
