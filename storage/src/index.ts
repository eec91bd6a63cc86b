export { createObjectStorage, ObjectStorage } from './object-storage';
export { ObjectStorageError, type ObjectStorageErrorCode } from './object-storage-error';
export { type ObjectContent, type ObjectRange } from './object-reader';
export { findPublicOrigin, type ObjectStorageOptions } from './object-storage-options';
export {
  largestPartNumber,
  smallestPartBytes,
  type OpenUpload,
  type PartPresigned,
  type PartPresignRequest,
  type StoredPart,
  type UploadedPart,
} from './multipart-upload';
