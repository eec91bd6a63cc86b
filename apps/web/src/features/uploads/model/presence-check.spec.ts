import { describe, expect, it } from 'vitest';
import { createPresenceCheck } from './presence-check';
import type { NameMatch } from './upload-entry';

const match = (change: Partial<NameMatch> = {}): NameMatch => ({
  fileName: 'a.stl',
  partId: 'p',
  number: 1,
  name: 'a',
  letter: 'A',
  storedFileName: 'a.stl',
  sameCase: true,
  folder: 'left',
  sizeBytes: 3,
  sha256: 'aa',
  ...change,
});
const file = new File(['abc'], 'a.stl');

describe('a file that a part has already', () => {
  it('is the one of the same name, folder, size and hash', async () => {
    const find = createPresenceCheck(() => Promise.resolve('aa'));
    expect(await find(file, 'left', [match({ sha256: 'bb' }), match({ partId: 'q' })])).toMatchObject({ partId: 'q' });
  });
  it.each<[string, Partial<NameMatch>]>([
    ['lies in another folder', { folder: 'right' }],
    ['has another size', { sizeBytes: 4 }],
    ['was not hashed yet', { sha256: null }],
    ['differs in the case of its name', { sameCase: false }],
  ])('is none that %s, and the file is not read for it', async (_, change) => {
    let read = 0;
    const find = createPresenceCheck(() => Promise.resolve(String((read += 1))));
    expect(await find(file, 'left', [match(change)])).toBeUndefined();
    expect(read).toBe(0);
  });
  it('is none of another hash, and none where the file can’t be read', async () => {
    expect(await createPresenceCheck(() => Promise.resolve('bb'))(file, 'left', [match()])).toBeUndefined();
    expect(await createPresenceCheck(() => Promise.reject(new Error('gone')))(file, 'left', [match()])).toBeUndefined();
  });
});
