import { describe, expect, it } from 'vitest';
import { choosePartsToKeep } from './kept-parts';

describe('parts that need not be sent again', () => {
  const part = (partNumber: number, sha256: string | null) => ({ partNumber, sizeBytes: 8, sha256 });

  it('are those whose stored hash is that of the file’s own part, and no others', async () => {
    const own = ['aa', 'bb', 'cc'];
    const kept = await choosePartsToKeep([part(1, 'aa'), part(2, 'xx'), part(3, null)], (partNumber) => Promise.resolve(own[partNumber - 1] ?? ''));
    expect(kept.map(({ partNumber }) => partNumber)).toEqual([1]);
  });
  it('are hashed one after the other, and only where there is something to compare with', async () => {
    let running = 0;
    let most = 0;
    const hashed: number[] = [];
    await choosePartsToKeep([part(1, 'aa'), part(2, null), part(5, 'bb')], async (partNumber) => {
      hashed.push(partNumber);
      most = Math.max(most, ++running);
      await Promise.resolve();
      running -= 1;
      return 'aa';
    });
    expect(hashed).toEqual([1, 5]);
    expect(most).toBe(1);
  });
});
