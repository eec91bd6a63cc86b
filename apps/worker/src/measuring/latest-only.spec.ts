import { describe, expect, it } from 'vitest';
import { LatestOnly } from './latest-only';

describe('LatestOnly', () => {
  it('runs one task at a time and passes over what a later value makes old', async () => {
    const seen: number[] = [];
    let release: () => void = () => undefined;
    const gate = new Promise<void>((resolve) => {
      release = resolve;
    });
    const latest = new LatestOnly(async (value: number) => {
      seen.push(value);
      if (value === 1) await gate;
    });
    latest.push(1);
    latest.push(2);
    latest.push(3);
    release();
    await gate;
    await new Promise((resolve) => setTimeout(resolve, 5));
    expect(seen).toEqual([1, 3]);
  });

  it('goes on after a task that failed, and settles without what still waits', async () => {
    const seen: number[] = [];
    const latest = new LatestOnly((value: number) => {
      seen.push(value);
      return value === 1 ? Promise.reject(new Error('no')) : Promise.resolve();
    });
    latest.push(1);
    await new Promise((resolve) => setTimeout(resolve, 5));
    latest.push(2);
    latest.push(3);
    await latest.settle();
    expect(seen).toEqual([1, 2]);
  });
});
