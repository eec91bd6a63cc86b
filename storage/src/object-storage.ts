import { createHash } from 'node:crypto';
import {
  DeleteObjectCommand,
  HeadBucketCommand,
  HeadObjectCommand,
  ListObjectsV2Command,
  PutObjectCommand,
  type ListObjectsV2CommandOutput,
  type S3Client,
} from '@aws-sdk/client-s3';
import { MultipartUploads, type OpenUpload, type PartPresigned, type PartPresignRequest, type StoredPart, type UploadedPart } from './multipart-upload';
import { getObjectStream, type ObjectContent, type ObjectRange } from './object-reader';
import { attempt, ObjectStorageError } from './object-storage-error';
import { createClient, type ObjectStorageOptions } from './object-storage-options';

/** One bucket of an S3-compatible storage. Every method throws ObjectStorageError and nothing else. */
export class ObjectStorage {
  private readonly uploads: MultipartUploads;

  constructor(
    private readonly client: S3Client,
    private readonly publicClient: S3Client,
    private readonly bucket: string,
  ) {
    this.uploads = new MultipartUploads(client, publicClient, bucket);
  }

  /** Begins an upload in parts; nothing can be read under the key until it is completed. */
  createMultipartUpload(key: string, options: { contentType: string }): Promise<string> {
    return this.uploads.create(key, options.contentType);
  }

  /** An address to which a browser PUTs one part of exactly `sizeBytes` and `sha256`; the ETag is in the answer's header. */
  presignPart(request: PartPresignRequest): Promise<PartPresigned> {
    return this.uploads.presignPart(request);
  }

  listParts(key: string, uploadId: string): Promise<StoredPart[]> {
    return this.uploads.listParts(key, uploadId);
  }

  /**
   * Makes the object of the parts named, in the order of their numbers.
   * After a lost answer a second try finds `no-such-upload`: then `headObject` tells whether the first succeeded.
   */
  completeMultipartUpload(key: string, uploadId: string, parts: readonly UploadedPart[], options: { onlyIfAbsent?: boolean } = {}): Promise<void> {
    return this.uploads.complete(key, uploadId, parts, options.onlyIfAbsent ?? false);
  }

  /** No error when the upload is gone already. */
  abortMultipartUpload(key: string, uploadId: string): Promise<void> {
    return this.uploads.abort(key, uploadId);
  }

  /** Uploads that are neither completed nor aborted. */
  listMultipartUploads(options: { prefix?: string } = {}): Promise<OpenUpload[]> {
    return this.uploads.list(options.prefix ?? '');
  }

  async headObject(key: string): Promise<{ sizeBytes: number } | undefined> {
    try {
      const answer = await attempt('head object', () => this.client.send(new HeadObjectCommand({ Bucket: this.bucket, Key: key })));
      return { sizeBytes: answer.ContentLength ?? 0 };
    } catch (error) {
      if (error instanceof ObjectStorageError && error.code === 'not-found') return undefined;
      throw error;
    }
  }

  getObjectStream(key: string, range: ObjectRange = {}): Promise<ObjectContent> {
    return getObjectStream(this.client, this.bucket, key, range);
  }

  /** Writes a small object in one request, whole or not at all; the storage checks the bytes against our hash. */
  async putObject(key: string, bytes: Uint8Array, options: { contentType?: string; onlyIfAbsent?: boolean } = {}): Promise<void> {
    await attempt('put object', () =>
      this.client.send(
        new PutObjectCommand({
          Bucket: this.bucket,
          Key: key,
          Body: bytes,
          ContentType: options.contentType ?? 'application/octet-stream',
          ContentMD5: createHash('md5').update(bytes).digest('base64'),
          IfNoneMatch: options.onlyIfAbsent ? '*' : undefined,
        }),
      ),
    );
  }

  /** No error when there is no such object. */
  async deleteObject(key: string): Promise<void> {
    await attempt('delete object', () => this.client.send(new DeleteObjectCommand({ Bucket: this.bucket, Key: key })));
  }

  /** The keys below a prefix, for sweeping and for tests. */
  async listObjects(options: { prefix?: string } = {}): Promise<{ key: string; sizeBytes: number }[]> {
    return attempt('list objects', async () => {
      const objects: { key: string; sizeBytes: number }[] = [];
      let token: string | undefined;
      do {
        const page: ListObjectsV2CommandOutput = await this.client.send(
          new ListObjectsV2Command({ Bucket: this.bucket, Prefix: options.prefix, ContinuationToken: token }),
        );
        for (const { Key, Size } of page.Contents ?? []) if (Key !== undefined) objects.push({ key: Key, sizeBytes: Size ?? 0 });
        token = page.IsTruncated ? page.NextContinuationToken : undefined;
      } while (token !== undefined);
      return objects;
    });
  }

  /** Resolves when the bucket answers within the time; for readiness. */
  async checkReachable(options: { timeoutMs?: number } = {}): Promise<void> {
    await attempt('reach bucket', () =>
      this.client.send(new HeadBucketCommand({ Bucket: this.bucket }), { abortSignal: AbortSignal.timeout(options.timeoutMs ?? 2_000) }),
    );
  }

  /** Ends the open connections. */
  close(): void {
    this.client.destroy();
    this.publicClient.destroy();
  }
}

export function createObjectStorage(options: ObjectStorageOptions): ObjectStorage {
  const client = createClient(options, options.endpoint);
  const publicClient = createClient(options, options.publicEndpoint ?? options.endpoint);
  return new ObjectStorage(client, publicClient, options.bucket);
}
