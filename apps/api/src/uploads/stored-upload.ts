import { findUpload, type Transaction, type UploadRow } from '@masswright/drizzle';
import { ObjectStorageError, type ObjectStorage, type StoredPart } from '@masswright/storage';
import { AppError, notFound } from '../platform/app-error';
import { formatBytes } from './format-bytes';
import { countParts } from './part-layout';

export async function getUpload(tx: Transaction, uploadId: string): Promise<UploadRow> {
  const upload = await findUpload(tx, uploadId);
  if (upload === undefined) throw notFound('upload');
  return upload;
}

/** What has arrived of an open upload; nothing when the storage has ended it meanwhile. */
export async function listStoredParts(storage: ObjectStorage, upload: UploadRow): Promise<StoredPart[]> {
  try {
    return await storage.listParts(upload.objectKey, upload.multipartId);
  } catch (error) {
    if (error instanceof ObjectStorageError && error.code === 'no-such-upload') return [];
    throw error;
  }
}

/**
 * Makes the object of an upload's parts once all of it has arrived. Safe to do twice.
 * @param partHashes what the sender says that the parts are; a part of other bytes is refused
 */
export async function completeObject(storage: ObjectStorage, upload: UploadRow, partHashes: readonly string[] | undefined): Promise<void> {
  const { objectKey, multipartId, sizeBytes } = upload;
  try {
    const parts = await storage.listParts(objectKey, multipartId);
    checkParts(upload, parts, partHashes);
    await storage.completeMultipartUpload(objectKey, multipartId, parts);
  } catch (error) {
    // An earlier request may have completed it and died, or be completing it at this moment; then the object is there.
    if (!(error instanceof ObjectStorageError)) throw error;
    if (error.code === 'invalid-parts') {
      throw new AppError('upload-incomplete', 'A part changed while the upload was completed. Complete it again.', {}, { cause: error });
    }
    if (error.code !== 'no-such-upload') throw error;
  }
  const object = await storage.headObject(objectKey);
  if (object?.sizeBytes !== sizeBytes) {
    throw new AppError('upload-incomplete', 'The stored file is not as long as the one that was announced. Add the file again.');
  }
}

function checkParts({ sizeBytes, partSizeBytes }: UploadRow, parts: readonly StoredPart[], partHashes: readonly string[] | undefined): void {
  const arrived = parts.reduce((sum, part) => sum + part.sizeBytes, 0);
  if (arrived !== sizeBytes || parts.length !== countParts(sizeBytes, partSizeBytes)) {
    throw new AppError('upload-incomplete', `${formatBytes(arrived)} of ${formatBytes(sizeBytes)} have arrived. Send the missing parts, then complete the upload.`);
  }
  const other = partHashes === undefined ? undefined : parts.find(({ partNumber, sha256 }) => sha256 !== undefined && sha256 !== partHashes[partNumber - 1]);
  if (other !== undefined) {
    throw new AppError('upload-incomplete', `Part ${other.partNumber} in the storage is not the one of this file: another file of its name was sent at the same time. Send the parts that differ, then complete the upload.`);
  }
}
