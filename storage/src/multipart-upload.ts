import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  ListMultipartUploadsCommand,
  ListPartsCommand,
  UploadPartCommand,
  type ListMultipartUploadsCommandOutput,
  type S3Client,
} from '@aws-sdk/client-s3';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import { attempt, ObjectStorageError } from './object-storage-error';

/** Every part but the last is at least this large. */
export const smallestPartBytes = 5 * 1024 * 1024;
export const largestPartNumber = 10_000;

export interface UploadedPart {
  partNumber: number;
  /** As the storage gave it, with or without its quotes. It is not the hash of the file. */
  etag: string;
  /** SHA-256 in hexadecimal digits against which the storage checked the bytes; undefined where it keeps no checksums. */
  sha256?: string | undefined;
}

export interface StoredPart extends UploadedPart {
  sizeBytes: number;
}

export interface OpenUpload {
  key: string;
  uploadId: string;
  initiatedAt: Date | undefined;
}

export interface PartPresignRequest {
  key: string;
  uploadId: string;
  partNumber: number;
  /** Goes under the signature: a body of any other length is refused. */
  sizeBytes: number;
  /** In hexadecimal digits; goes under the signature too, and the storage refuses a body of any other. */
  sha256: string;
  expiresSeconds: number;
}

export interface PartPresigned {
  url: string;
  /** What must be sent with the body. */
  headers: Record<string, string>;
}

const checksumHeader = 'x-amz-checksum-sha256';

export class MultipartUploads {
  constructor(
    private readonly client: S3Client,
    private readonly publicClient: S3Client,
    private readonly bucket: string,
  ) {}

  async create(key: string, contentType: string): Promise<string> {
    const answer = await attempt('create upload', () =>
      this.client.send(new CreateMultipartUploadCommand({ Bucket: this.bucket, Key: key, ContentType: contentType, ChecksumAlgorithm: 'SHA256' })),
    );
    if (!answer.UploadId) throw new ObjectStorageError('unexpected', 'Object storage: the answer has no upload id');
    return answer.UploadId;
  }

  async presignPart(request: PartPresignRequest): Promise<PartPresigned> {
    const { key, uploadId, partNumber, sizeBytes, sha256, expiresSeconds } = request;
    const checksum = Buffer.from(sha256, 'hex').toString('base64');
    const url = await attempt('presign part', () =>
      getSignedUrl(
        this.publicClient,
        new UploadPartCommand({ Bucket: this.bucket, Key: key, UploadId: uploadId, PartNumber: partNumber, ContentLength: sizeBytes, ChecksumSHA256: checksum }),
        // As a parameter of the address the checksum would be signed but not looked at.
        { expiresIn: expiresSeconds, signableHeaders: new Set(['host', 'content-length', checksumHeader]), unhoistableHeaders: new Set([checksumHeader]) },
      ),
    );
    return { url, headers: { [checksumHeader]: checksum } };
  }

  async listParts(key: string, uploadId: string): Promise<StoredPart[]> {
    return attempt('list parts', async () => {
      const parts: StoredPart[] = [];
      let marker: string | undefined;
      do {
        // The SDK's own paginator goes by the marker, which some storages send with the last page too.
        const page = await this.client.send(
          new ListPartsCommand({ Bucket: this.bucket, Key: key, UploadId: uploadId, PartNumberMarker: marker }),
        );
        for (const { PartNumber, ETag, Size, ChecksumSHA256 } of page.Parts ?? []) {
          if (PartNumber === undefined || ETag === undefined || Size === undefined) continue;
          parts.push({ partNumber: PartNumber, etag: ETag, sizeBytes: Size, sha256: ChecksumSHA256 === undefined ? undefined : Buffer.from(ChecksumSHA256, 'base64').toString('hex') });
        }
        marker = page.IsTruncated ? page.NextPartNumberMarker : undefined;
      } while (marker !== undefined);
      return parts;
    });
  }

  async complete(key: string, uploadId: string, parts: readonly UploadedPart[], onlyIfAbsent: boolean): Promise<void> {
    const Parts = [...parts].sort((a, b) => a.partNumber - b.partNumber).map(({ partNumber, etag, sha256 }) => ({
      PartNumber: partNumber,
      ETag: etag,
      ChecksumSHA256: sha256 === undefined ? undefined : Buffer.from(sha256, 'hex').toString('base64'),
    }));
    await attempt('complete upload', () =>
      this.client.send(
        new CompleteMultipartUploadCommand({
          Bucket: this.bucket,
          Key: key,
          UploadId: uploadId,
          MultipartUpload: { Parts },
          IfNoneMatch: onlyIfAbsent ? '*' : undefined,
        }),
      ),
    );
  }

  /** An upload that is gone already is no error: what was wanted is so. */
  async abort(key: string, uploadId: string): Promise<void> {
    try {
      await attempt('abort upload', () =>
        this.client.send(new AbortMultipartUploadCommand({ Bucket: this.bucket, Key: key, UploadId: uploadId })),
      );
    } catch (error) {
      if (!(error instanceof ObjectStorageError) || error.code !== 'no-such-upload') throw error;
    }
  }

  async list(prefix: string): Promise<OpenUpload[]> {
    return attempt('list uploads', async () => {
      const uploads: OpenUpload[] = [];
      let markers: { KeyMarker?: string; UploadIdMarker?: string } | undefined = {};
      do {
        const page: ListMultipartUploadsCommandOutput = await this.client.send(
          new ListMultipartUploadsCommand({ Bucket: this.bucket, Prefix: prefix, ...markers }),
        );
        for (const { Key, UploadId, Initiated } of page.Uploads ?? []) {
          if (Key !== undefined && UploadId !== undefined) uploads.push({ key: Key, uploadId: UploadId, initiatedAt: Initiated });
        }
        markers = page.IsTruncated ? { KeyMarker: page.NextKeyMarker, UploadIdMarker: page.NextUploadIdMarker } : undefined;
      } while (markers !== undefined);
      return uploads;
    });
  }
}
