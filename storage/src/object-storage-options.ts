import { S3Client } from '@aws-sdk/client-s3';

export interface ObjectStorageOptions {
  /** Where our own programs reach the storage, for example `http://127.0.0.1:4604`. */
  endpoint: string;
  /** Where a browser reaches it; presigned addresses are made for this one. `endpoint` where it is not given. */
  publicEndpoint?: string;
  region: string;
  bucket: string;
  accessKeyId: string;
  secretAccessKey: string;
  /** The bucket in the path instead of in the host name. */
  forcePathStyle: boolean;
  /** How often a request is tried when the storage does not answer or is overloaded. 4 where it is not given. */
  maxAttempts?: number;
}

/** Where the addresses of parts lead: the origin that a page's policy must let through. */
export function findPublicOrigin({ endpoint, publicEndpoint, bucket, forcePathStyle }: Pick<ObjectStorageOptions, 'endpoint' | 'publicEndpoint' | 'bucket' | 'forcePathStyle'>): string {
  const { protocol, host, origin } = new URL(publicEndpoint ?? endpoint);
  return forcePathStyle ? origin : `${protocol}//${bucket}.${host}`;
}

// The SDK prints a notice about the age of the Node.js line into our logs unless told not to.
process.env['AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED'] ??= 'true';

export function createClient(options: ObjectStorageOptions, endpoint: string): S3Client {
  return new S3Client({
    endpoint,
    region: options.region,
    credentials: { accessKeyId: options.accessKeyId, secretAccessKey: options.secretAccessKey },
    forcePathStyle: options.forcePathStyle,
    maxAttempts: options.maxAttempts ?? 4,
    // Newer checksums are sent and expected only where the operation demands one: not every compatible storage knows them.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    requestHandler: {
      connectionTimeout: 3_000,
      // A socket on which nothing moves for so long is dead; a large object may take as long as it needs.
      socketTimeout: 60_000,
      httpAgent: { keepAlive: true, maxSockets: 128 },
      httpsAgent: { keepAlive: true, maxSockets: 128 },
    },
  });
}
