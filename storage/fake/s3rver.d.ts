// The few parts of s3rver that the layer in this folder touches; the package ships no types.

declare module 's3rver' {
  import { type IncomingMessage, type RequestListener } from 'node:http';

  export interface FakeContext {
    method: string;
    path: string;
    status: number;
    type: string;
    body: unknown;
    query: Record<string, string | string[] | undefined>;
    state: Record<string, unknown>;
    req: IncomingMessage;
    get(header: string): string;
    set(header: string, value: string): void;
  }

  class S3rver {
    constructor(options: { directory: string; silent?: boolean; vhostBuckets?: boolean });
    middleware: ((ctx: FakeContext, next: () => Promise<void>) => Promise<void>)[];
    store: object;
    context: { store: object };
    silent: boolean;
    on(event: 'error', listener: (error: Error & { status?: number; code?: string }) => void): this;
    callback(): RequestListener;
  }
  export default S3rver;
}

declare module 's3rver/lib/models/error.js' {
  class S3Error extends Error {
    constructor(code: string, message: string, detail?: Record<string, string | number>);
    code: string;
    status: number;
  }
  export default S3Error;
}

declare module 's3rver/lib/models/object.js' {
  class S3Object {
    constructor(bucket: string, key: string, content: unknown, metadata: Record<string, unknown>);
    bucket: string;
    key: string;
    content: unknown;
    metadata: Record<string, unknown>;
    range?: { start: number; end: number };
  }
  export default S3Object;
}

declare module 's3rver/lib/stores/filesystem.js' {
  class FilesystemStore {
    constructor(directory: string);
    getResourcePath(bucket: string, key: string | undefined, resource: string): string;
    getMetadata(bucket: string, key: string): Promise<Record<string, unknown>>;
    existsObject(bucket: string, key: string): Promise<boolean>;
  }
  export default FilesystemStore;
}
