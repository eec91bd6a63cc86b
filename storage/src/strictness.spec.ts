import { createHash } from 'node:crypto';
import net from 'node:net';
import { Readable } from 'node:stream';
import { setTimeout as sleep } from 'node:timers/promises';
import { GetObjectCommand, PutObjectCommand, S3Client } from '@aws-sdk/client-s3';
import { getSignedUrl } from '@aws-sdk/s3-request-presigner';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { allowedOrigin, makeBytes, RunningStorage } from '../test/running-storage';

let storage: RunningStorage;
let sdk: S3Client;
beforeAll(async () => {
  storage = await RunningStorage.start();
  sdk = makeSdk('WHEN_REQUIRED');
});
function makeSdk(requestChecksumCalculation: 'WHEN_REQUIRED' | 'WHEN_SUPPORTED'): S3Client {
  return new S3Client({
    endpoint: storage.endpoint,
    region: 'local',
    forcePathStyle: true,
    credentials: { accessKeyId: 'test-key', secretAccessKey: 'test-secret' },
    requestChecksumCalculation,
    responseChecksumValidation: 'WHEN_REQUIRED',
    maxAttempts: 1,
  });
}
afterAll(async () => {
  sdk.destroy();
  await storage.stop();
});

async function presign(sizeBytes: number, key = 'part', expiresSeconds = 60): Promise<{ address: string; uploadId: string }> {
  const uploadId = await storage.client.createMultipartUpload(key, { contentType: 'model/stl' });
  const { url } = await storage.client.presignPart({ key, uploadId, partNumber: 1, sizeBytes, sha256: createHash('sha256').update(body).digest('hex'), expiresSeconds });
  return { address: url, uploadId };
}
/** Whatever is sent, the hash that goes with it is the one that was signed: so it is the rest that is refused. */
const body = '12345';
const checksum = { 'x-amz-checksum-sha256': createHash('sha256').update(body).digest('base64') };
const put = (address: string, sent: string, headers: Record<string, string> = {}) => fetch(address, { method: 'PUT', body: sent, headers: { ...checksum, ...headers } });
const refusal = async (answer: Response) => `${answer.status} ${/<Code>(\w+)<\/Code>/.exec(await answer.text())?.[1] ?? ''}`;

describe('a presigned address', () => {
  it('takes a body of the length that was signed and no other', async () => {
    const { address } = await presign(5);
    expect(await refusal(await put(address, '123456'))).toBe('403 SignatureDoesNotMatch');
    expect(await refusal(await put(address, '1234'))).toBe('403 SignatureDoesNotMatch');
    expect((await put(address, '12345')).status).toBe(200);
  });

  it('is refused with another part number, key, upload or method, and without its signature', async () => {
    const { address } = await presign(5);
    const change = (edit: (url: URL) => void) => {
      const url = new URL(address);
      edit(url);
      return url.href;
    };
    expect(await refusal(await put(change((url) => url.searchParams.set('partNumber', '2')), '12345'))).toBe('403 SignatureDoesNotMatch');
    expect(await refusal(await put(change((url) => (url.pathname = '/meshes/other')), '12345'))).toBe('403 SignatureDoesNotMatch');
    expect(await refusal(await put(change((url) => url.searchParams.set('uploadId', 'f'.repeat(32))), '12345'))).toBe('403 SignatureDoesNotMatch');
    expect(await refusal(await put(change((url) => url.searchParams.set('X-Amz-Expires', '604800')), '12345'))).toBe('403 SignatureDoesNotMatch');
    expect(await refusal(await put(change((url) => url.searchParams.delete('X-Amz-Signature')), '12345'))).toBe('403 SignatureDoesNotMatch');
    expect(await refusal(await put(change((url) => (url.search = '')), '12345'))).toBe('403 AccessDenied');
    expect(await refusal(await fetch(address))).toBe('403 SignatureDoesNotMatch');
    expect(await refusal(await fetch(address, { method: 'DELETE' }))).toBe('403 SignatureDoesNotMatch');
    expect((await put(address, '12345')).status).toBe(200);
  });

  it('is refused when it has expired', async () => {
    const { address } = await presign(5, 'expiring', 1);
    await sleep(2100);
    expect(await refusal(await put(address, '12345'))).toBe('403 AccessDenied');
  });

  it('is refused with a header of the protocol that was not signed', async () => {
    const { address } = await presign(5);
    expect(await refusal(await put(address, '12345', { 'x-amz-copy-source': '/meshes/secret' }))).toBe('403 AccessDenied');
  });
});

describe('reading', () => {
  const range = async (key: string, wanted: string) => {
    const address = await getSignedUrl(sdk, new GetObjectCommand({ Bucket: 'meshes', Key: key }), { expiresIn: 60 });
    const answer = await fetch(address, { headers: { range: wanted } });
    return { status: answer.status, range: answer.headers.get('content-range'), bytes: Buffer.from(await answer.arrayBuffer()) };
  };

  it('understands a range that counts from the end', async () => {
    const bytes = makeBytes(1000);
    await storage.client.putObject('suffix', bytes);
    expect(await range('suffix', 'bytes=-84')).toEqual({ status: 206, range: 'bytes 916-999/1000', bytes: Buffer.from(bytes.slice(916)) });
    expect(await range('suffix', 'bytes=-5000')).toEqual({ status: 206, range: 'bytes 0-999/1000', bytes: Buffer.from(bytes) });
    expect((await range('suffix', 'bytes=-0')).status).toBe(416);
  });

  it('answers that nothing changed to a reader who names the ETag', async () => {
    await storage.client.putObject('cached', makeBytes(10));
    const address = await getSignedUrl(sdk, new GetObjectCommand({ Bucket: 'meshes', Key: 'cached' }), { expiresIn: 60 });
    const etag = (await fetch(address)).headers.get('etag') ?? '';
    expect((await fetch(address, { headers: { 'if-none-match': etag } })).status).toBe(304);
  });
});

describe('a body', () => {
  it('with another hash than its header says is refused and not kept', async () => {
    const wrong = createHash('md5').update('something else').digest('base64');
    await expect(sdk.send(new PutObjectCommand({ Bucket: 'meshes', Key: 'md5', Body: 'hello', ContentMD5: wrong }))).rejects.toMatchObject({ name: 'BadDigest' });
    expect(await storage.client.headObject('md5')).toBeUndefined();
    expect(await storage.listIncoming()).toEqual([]);
  });

  it.each(['an object', 'a part'])('that breaks off leaves nothing of %s', async (what) => {
    const key = what === 'a part' ? 'broken-part' : 'broken-object';
    const part = what === 'a part' ? await presign(100_000, key) : undefined;
    const address = new URL(part?.address ?? (await getSignedUrl(sdk, new PutObjectCommand({ Bucket: 'meshes', Key: key, ContentLength: 100_000 }), { expiresIn: 60 })));
    const socket = net.connect(Number(address.port), address.hostname);
    socket.write(`PUT ${address.pathname}${address.search} HTTP/1.1\r\nHost: ${address.host}\r\nContent-Length: 100000\r\n${part ? `x-amz-checksum-sha256: ${checksum['x-amz-checksum-sha256']}\r\n` : ''}\r\n`);
    socket.write(makeBytes(60_000));
    await vi.waitFor(async () => expect(await storage.listIncoming()).toHaveLength(1));
    socket.destroy();
    await vi.waitFor(async () => expect(await storage.listIncoming()).toEqual([]));
    expect(await storage.client.headObject(key)).toBeUndefined();
    if (part) expect(await storage.client.listParts(key, part.uploadId)).toEqual([]);
  });

  it('in signed chunks is refused in words instead of being stored with their frames', async () => {
    const streaming = makeSdk('WHEN_SUPPORTED');
    const body = Readable.from([Buffer.from('hello')]);
    await expect(streaming.send(new PutObjectCommand({ Bucket: 'meshes', Key: 'framed', Body: body, ContentLength: 5 }))).rejects.toMatchObject({ name: 'NotImplemented' });
    streaming.destroy();
    expect(await storage.client.headObject('framed')).toBeUndefined();
  });
});

describe('a web page', () => {
  const preflight = (origin: string, method: string) =>
    fetch(`${storage.endpoint}/meshes/some/key`, { method: 'OPTIONS', headers: { origin, 'access-control-request-method': method, 'access-control-request-headers': 'content-type' } });

  it('of an allowed origin may put a part and read its ETag', async () => {
    const answer = await preflight(allowedOrigin, 'PUT');
    expect(answer.status).toBe(204);
    expect(answer.headers.get('access-control-allow-origin')).toBe(allowedOrigin);
    expect(answer.headers.get('access-control-allow-headers')).toBe('content-type');
    const { address } = await presign(5);
    const stored = await put(address, '12345', { origin: allowedOrigin });
    expect(stored.headers.get('access-control-allow-origin')).toBe(allowedOrigin);
    expect(stored.headers.get('access-control-expose-headers')).toBe('ETag');
    expect(stored.headers.get('etag')).toMatch(/^"[0-9a-f]{32}"$/);
  });

  it('learns of a refusal too', async () => {
    const { address } = await presign(5);
    const answer = await put(address, '123', { origin: allowedOrigin });
    expect([answer.status, answer.headers.get('access-control-allow-origin')]).toEqual([403, allowedOrigin]);
  });

  it('of another origin, or one that would delete, is refused', async () => {
    for (const answer of [await preflight('http://evil.example', 'PUT'), await preflight(allowedOrigin, 'DELETE')]) {
      expect(answer.status).toBe(403);
    }
    const { address } = await presign(5);
    expect((await put(address, '12345', { origin: 'http://evil.example' })).headers.get('access-control-allow-origin')).toBeNull();
  });
});
