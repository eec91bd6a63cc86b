import { createHash } from 'node:crypto';
import { buffer } from 'node:stream/consumers';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { findRefusal, makeBytes, RunningStorage } from '../test/running-storage';
import { smallestPartBytes, type UploadedPart } from '.';

let storage: RunningStorage;
beforeAll(async () => {
  storage = await RunningStorage.start();
});
afterAll(() => storage.stop());

const contentType = 'model/stl';
const hashOf = (bytes: Uint8Array | string): string => createHash('sha256').update(bytes).digest('hex');

async function putPart(key: string, uploadId: string, partNumber: number, bytes: Uint8Array): Promise<UploadedPart> {
  const sha256 = hashOf(bytes);
  const { url, headers } = await storage.client.presignPart({ key, uploadId, partNumber, sizeBytes: bytes.length, sha256, expiresSeconds: 60 });
  const answer = await fetch(url, { method: 'PUT', headers, body: bytes as Uint8Array<ArrayBuffer> });
  if (!answer.ok) throw new Error(`part ${partNumber}: ${answer.status} ${await answer.text()}`);
  return { partNumber, etag: answer.headers.get('etag') ?? '', sha256 };
}

describe('an upload in parts', () => {
  it('joins its parts in the order of their numbers, whatever the order of arrival', async () => {
    const parts = [makeBytes(smallestPartBytes, 1), makeBytes(smallestPartBytes + 11, 2), makeBytes(17, 3)];
    const uploadId = await storage.client.createMultipartUpload('joined', { contentType });
    const etags = [];
    for (const number of [3, 1, 2]) etags.push(await putPart('joined', uploadId, number, parts[number - 1] ?? makeBytes(0)));
    expect(await storage.client.headObject('joined')).toBeUndefined();
    await storage.client.completeMultipartUpload('joined', uploadId, etags);
    const stored = await buffer((await storage.client.getObjectStream('joined')).stream);
    expect(Buffer.compare(stored, Buffer.concat(parts))).toBe(0);
    expect(await findRefusal(storage.client.listParts('joined', uploadId))).toBe('no-such-upload');
  });

  it('lists what has arrived, over more than one page', { timeout: 60_000 }, async () => {
    const uploadId = await storage.client.createMultipartUpload('many', { contentType });
    const numbers = Array.from({ length: 1100 }, (_, i) => i + 1);
    for (let at = 0; at < numbers.length; at += 50) await Promise.all(numbers.slice(at, at + 50).map((number) => putPart('many', uploadId, number, makeBytes(number % 7, number))));
    const listed = await storage.client.listParts('many', uploadId);
    expect(listed.map((part) => part.partNumber)).toEqual(numbers);
    expect(listed.map((part) => part.sizeBytes)).toEqual(numbers.map((number) => number % 7));
    await storage.client.abortMultipartUpload('many', uploadId);
  });

  it('keeps the later of two parts with one number', async () => {
    const uploadId = await storage.client.createMultipartUpload('again', { contentType });
    const first = await putPart('again', uploadId, 1, makeBytes(100, 1));
    const second = await putPart('again', uploadId, 1, makeBytes(200, 2));
    expect(await storage.client.listParts('again', uploadId)).toEqual([{ ...second, sizeBytes: 200 }]);
    expect(await findRefusal(storage.client.completeMultipartUpload('again', uploadId, [first]))).toBe('invalid-parts');
    await storage.client.completeMultipartUpload('again', uploadId, [second]);
    expect(await storage.client.headObject('again')).toEqual({ sizeBytes: 200 });
  });

  it('lists the hash against which each part was checked, and takes no part with another or with none', async () => {
    const uploadId = await storage.client.createMultipartUpload('hashed', { contentType });
    const bytes = makeBytes(3000, 5);
    await putPart('hashed', uploadId, 1, bytes);
    expect(await storage.client.listParts('hashed', uploadId)).toMatchObject([{ partNumber: 1, sizeBytes: 3000, sha256: hashOf(bytes) }]);
    const { url, headers } = await storage.client.presignPart({ key: 'hashed', uploadId, partNumber: 2, sizeBytes: 3000, sha256: hashOf(bytes), expiresSeconds: 60 });
    const other = makeBytes(3000, 6);
    expect(await (await fetch(url, { method: 'PUT', headers, body: other })).text()).toContain('BadDigest');
    const lying = { 'x-amz-checksum-sha256': createHash('sha256').update(other).digest('base64') };
    expect(await (await fetch(url, { method: 'PUT', headers: lying, body: other })).text()).toContain('SignatureDoesNotMatch');
    expect((await fetch(url, { method: 'PUT', body: bytes })).status).toBe(403);
    expect(await storage.client.listParts('hashed', uploadId)).toHaveLength(1);
    await storage.client.completeMultipartUpload('hashed', uploadId, await storage.client.listParts('hashed', uploadId));
    expect(await storage.client.headObject('hashed')).toEqual({ sizeBytes: 3000 });
  });

  it('is not completed with a small part before the last, and stays open', async () => {
    const uploadId = await storage.client.createMultipartUpload('small', { contentType });
    const parts = [await putPart('small', uploadId, 1, makeBytes(smallestPartBytes - 1)), await putPart('small', uploadId, 2, makeBytes(1))];
    expect(await findRefusal(storage.client.completeMultipartUpload('small', uploadId, parts))).toBe('invalid-parts');
    expect(await storage.client.listParts('small', uploadId)).toHaveLength(2);
    expect(await storage.client.headObject('small')).toBeUndefined();
  });

  it('is not completed with a part that never came', async () => {
    const uploadId = await storage.client.createMultipartUpload('gap', { contentType });
    const part = await putPart('gap', uploadId, 2, makeBytes(9));
    expect(await findRefusal(storage.client.completeMultipartUpload('gap', uploadId, [{ partNumber: 1, etag: part.etag }, part]))).toBe('invalid-parts');
  });

  it('leaves nothing when aborted, and a second abort is no error', async () => {
    const uploadId = await storage.client.createMultipartUpload('dropped', { contentType });
    const part = await putPart('dropped', uploadId, 1, makeBytes(1000));
    await storage.client.abortMultipartUpload('dropped', uploadId);
    await storage.client.abortMultipartUpload('dropped', uploadId);
    expect(await findRefusal(storage.client.completeMultipartUpload('dropped', uploadId, [part]))).toBe('no-such-upload');
    await expect(putPart('dropped', uploadId, 1, makeBytes(10))).rejects.toThrow('404');
    expect(await storage.client.headObject('dropped')).toBeUndefined();
  });

  it('takes no late part once it is completed', async () => {
    const uploadId = await storage.client.createMultipartUpload('late', { contentType });
    const late = await storage.client.presignPart({ key: 'late', uploadId, partNumber: 1, sizeBytes: 4, sha256: hashOf('evil'), expiresSeconds: 60 });
    const part = await putPart('late', uploadId, 1, makeBytes(1000));
    await storage.client.completeMultipartUpload('late', uploadId, [part]);
    expect((await fetch(late.url, { method: 'PUT', headers: late.headers, body: 'evil' })).status).toBe(404);
    expect(await storage.client.headObject('late')).toEqual({ sizeBytes: 1000 });
    expect(await findRefusal(storage.client.completeMultipartUpload('late', uploadId, [part]))).toBe('no-such-upload');
  });

  it('replaces no object when absence is asked for', async () => {
    await storage.client.putObject('taken', makeBytes(3));
    const uploadId = await storage.client.createMultipartUpload('taken', { contentType });
    const part = await putPart('taken', uploadId, 1, makeBytes(1000));
    expect(await findRefusal(storage.client.completeMultipartUpload('taken', uploadId, [part], { onlyIfAbsent: true }))).toBe('already-exists');
    expect(await storage.client.headObject('taken')).toEqual({ sizeBytes: 3 });
  });

  it('stays open over a kill of the storage and is found by the sweeper', async () => {
    const uploadId = await storage.client.createMultipartUpload('open/one', { contentType });
    const part = await putPart('open/one', uploadId, 1, makeBytes(5000));
    await storage.restart('SIGKILL');
    const open = await storage.client.listMultipartUploads({ prefix: 'open/' });
    expect(open).toEqual([{ key: 'open/one', uploadId, initiatedAt: expect.any(Date) as Date }]);
    await storage.client.completeMultipartUpload('open/one', uploadId, [part]);
    expect(await storage.client.headObject('open/one')).toEqual({ sizeBytes: 5000 });
    expect(await storage.client.listMultipartUploads({ prefix: 'open/' })).toEqual([]);
  });
});
