import { PassThrough, Readable } from 'node:stream';
import { GetObjectCommand, type S3Client } from '@aws-sdk/client-s3';
import { attempt, ObjectStorageError, toObjectStorageError } from './object-storage-error';

/** First and last byte, both included; without an end, to the last byte of the object. */
export interface ObjectRange {
  rangeStart?: number;
  rangeEnd?: number;
  signal?: AbortSignal;
}

export interface ObjectContent {
  /** Ends in an ObjectStorageError when the connection breaks, when fewer bytes come than announced, and when the signal fires. */
  stream: Readable;
  /** Bytes in the stream: of the range where one was asked for. */
  sizeBytes: number;
}

function toRangeHeader({ rangeStart, rangeEnd }: ObjectRange): string | undefined {
  if (rangeStart === undefined && rangeEnd === undefined) return undefined;
  return `bytes=${rangeStart ?? 0}-${rangeEnd ?? ''}`;
}

/** Passes the bytes on and counts them: a broken connection must not look like the end of the object. */
function guardStream(body: Readable, sizeBytes: number, signal: AbortSignal | undefined): Readable {
  let received = 0;
  const guarded = new PassThrough({
    transform(chunk: Buffer, _encoding, done) {
      received += chunk.length;
      done(null, chunk);
    },
    flush(done) {
      done(received === sizeBytes ? null : new ObjectStorageError('unavailable', `Object storage: ${received} of ${sizeBytes} bytes came`));
    },
  });
  const abort = () => guarded.destroy(new ObjectStorageError('aborted', 'Object storage: reading was aborted'));
  signal?.addEventListener('abort', abort, { once: true });
  body.once('error', (error) => guarded.destroy(toObjectStorageError('read object', error)));
  guarded.once('close', () => {
    signal?.removeEventListener('abort', abort);
    body.destroy();
  });
  if (signal?.aborted) abort();
  return body.pipe(guarded);
}

export async function getObjectStream(client: S3Client, bucket: string, key: string, range: ObjectRange): Promise<ObjectContent> {
  const answer = await attempt('read object', () =>
    client.send(new GetObjectCommand({ Bucket: bucket, Key: key, Range: toRangeHeader(range) }), { abortSignal: range.signal }),
  );
  if (!(answer.Body instanceof Readable) || answer.ContentLength === undefined) {
    throw new ObjectStorageError('unexpected', 'Object storage: the answer has no body of known length');
  }
  return { stream: guardStream(answer.Body, answer.ContentLength, range.signal), sizeBytes: answer.ContentLength };
}
