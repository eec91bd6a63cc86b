import { createHash } from 'node:crypto';
import { buffer } from 'node:stream/consumers';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { findRefusal, makeBytes, RunningStorage } from '../test/running-storage';

let storage: RunningStorage;
beforeAll(async () => {
  storage = await RunningStorage.start();
});
afterAll(() => storage.stop());

const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');
const read = async (key: string, range = {}) => buffer((await storage.client.getObjectStream(key, range)).stream);

describe('an object', () => {
  it.each([0, 1, 600_000, 20 * 1024 * 1024 + 7])('of %i bytes comes back byte for byte', async (length) => {
    const bytes = makeBytes(length);
    await storage.client.putObject(`whole/${length}`, bytes);
    expect(await storage.client.headObject(`whole/${length}`)).toEqual({ sizeBytes: length });
    const content = await storage.client.getObjectStream(`whole/${length}`);
    expect(content.sizeBytes).toBe(length);
    expect(sha256(await buffer(content.stream))).toBe(sha256(bytes));
  });

  it('is readable in ranges, the very first byte alone too', async () => {
    const bytes = makeBytes(1000);
    await storage.client.putObject('ranges', bytes);
    expect(await read('ranges', { rangeStart: 0, rangeEnd: 0 })).toEqual(Buffer.from(bytes.slice(0, 1)));
    expect(await read('ranges', { rangeStart: 10, rangeEnd: 19 })).toEqual(Buffer.from(bytes.slice(10, 20)));
    expect(await read('ranges', { rangeStart: 990 })).toEqual(Buffer.from(bytes.slice(990)));
    expect(await read('ranges', { rangeStart: 990, rangeEnd: 5000 })).toEqual(Buffer.from(bytes.slice(990)));
    expect(await findRefusal(read('ranges', { rangeStart: 1000 }))).toBe('unexpected');
  });

  it('that is not there is not found, and its removal is no error', async () => {
    expect(await storage.client.headObject('nothing')).toBeUndefined();
    expect(await findRefusal(storage.client.getObjectStream('nothing'))).toBe('not-found');
    await storage.client.deleteObject('nothing');
  });

  it('is replaced by a second write, unless the writer asks for absence', async () => {
    await storage.client.putObject('once', makeBytes(10, 1));
    await storage.client.putObject('once', makeBytes(12, 2));
    expect(await read('once')).toEqual(Buffer.from(makeBytes(12, 2)));
    expect(await findRefusal(storage.client.putObject('once', makeBytes(5), { onlyIfAbsent: true }))).toBe('already-exists');
    expect(await read('once')).toEqual(Buffer.from(makeBytes(12, 2)));
  });

  it('goes to exactly one of many that want to be the first', async () => {
    const codes = await Promise.all(
      Array.from({ length: 12 }, (_, i) => findRefusal(storage.client.putObject('race', makeBytes(1000, i), { onlyIfAbsent: true }))),
    );
    expect(codes.filter((code) => code === 'none')).toHaveLength(1);
    expect(codes.filter((code) => code === 'already-exists')).toHaveLength(11);
  });

  it('is gone after it is deleted, and the listing knows', async () => {
    await storage.client.putObject('list/a', makeBytes(3));
    await storage.client.putObject('list/b/c', makeBytes(4));
    expect(await storage.client.listObjects({ prefix: 'list/' })).toEqual([
      { key: 'list/a', sizeBytes: 3 },
      { key: 'list/b/c', sizeBytes: 4 },
    ]);
    await storage.client.deleteObject('list/a');
    expect(await storage.client.listObjects({ prefix: 'list/' })).toEqual([{ key: 'list/b/c', sizeBytes: 4 }]);
  });

  it('stops coming when the reader gives up', async () => {
    await storage.client.putObject('long', makeBytes(20 * 1024 * 1024));
    const giveUp = new AbortController();
    const { stream } = await storage.client.getObjectStream('long', { signal: giveUp.signal });
    stream.once('data', () => giveUp.abort());
    expect(await findRefusal(buffer(stream))).toBe('aborted');
  });

  it('survives a kill of the storage', async () => {
    const bytes = makeBytes(100_000);
    await storage.client.putObject('kept', bytes);
    await storage.restart('SIGKILL');
    expect(sha256(await read('kept'))).toBe(sha256(bytes));
  });
});

describe('reaching the storage', () => {
  it('succeeds while it runs', async () => {
    await storage.client.checkReachable();
  });

  it('fails as unavailable where nothing listens', async () => {
    const lost = storage.clientWith({ endpoint: 'http://127.0.0.1:9', maxAttempts: 1 });
    expect(await findRefusal(lost.checkReachable())).toBe('unavailable');
  });

  it('fails as denied with another secret, another key or another region', async () => {
    for (const change of [{ secretAccessKey: 'wrong' }, { accessKeyId: 'nobody' }]) {
      const stranger = storage.clientWith(change);
      expect(await findRefusal(stranger.checkReachable())).toBe('denied');
      expect(await findRefusal(stranger.putObject('stolen', makeBytes(3)))).toBe('denied');
      expect(await findRefusal(stranger.getObjectStream('stolen'))).toBe('denied');
    }
    expect(await storage.client.headObject('stolen')).toBeUndefined();
  });

  it('fails as not found for a bucket that is not there', async () => {
    expect(await findRefusal(storage.clientWith({ bucket: 'elsewhere' }).checkReachable())).toBe('not-found');
  });
});
