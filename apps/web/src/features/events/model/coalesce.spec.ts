import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { createCoalescer } from './coalesce';

describe('coalescer', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());

  it('runs the first call at once and a burst behind it once more', async () => {
    const action = vi.fn();
    const coalescer = createCoalescer(300);
    for (let call = 0; call < 200; call += 1) coalescer.run('parts', action);
    expect(action).toHaveBeenCalledTimes(1);
    await vi.advanceTimersByTimeAsync(300);
    expect(action).toHaveBeenCalledTimes(2);
    await vi.advanceTimersByTimeAsync(3000);
    expect(action).toHaveBeenCalledTimes(2);
  });
  it('never loses the last call', async () => {
    const seen: number[] = [];
    const coalescer = createCoalescer(300);
    for (const call of [1, 2, 3]) coalescer.run('parts', () => void seen.push(call));
    await vi.advanceTimersByTimeAsync(300);
    expect(seen.at(-1)).toBe(3);
  });
  it('lets an action end before it runs the next one, however long it takes', async () => {
    const order: string[] = [];
    const coalescer = createCoalescer(300);
    const read = (name: string) => async (): Promise<void> => {
      order.push(`${name} begun`);
      await new Promise((resolve) => setTimeout(resolve, 2_000));
      order.push(`${name} ended`);
    };
    coalescer.run('parts', read('first'));
    for (let call = 0; call < 5; call += 1) {
      await vi.advanceTimersByTimeAsync(350);
      coalescer.run('parts', read('second'));
    }
    expect(order).toEqual(['first begun']);
    await vi.advanceTimersByTimeAsync(5_000);
    expect(order).toEqual(['first begun', 'first ended', 'second begun', 'second ended']);
  });
  it('goes on after an action that failed', async () => {
    const second = vi.fn();
    const coalescer = createCoalescer(300);
    coalescer.run('parts', () => Promise.reject(new Error('cut off')));
    coalescer.run('parts', second);
    await vi.advanceTimersByTimeAsync(300);
    expect(second).toHaveBeenCalledTimes(1);
  });
  it('runs nothing any more once it is stopped', async () => {
    const action = vi.fn();
    const coalescer = createCoalescer(300);
    coalescer.run('parts', action);
    coalescer.run('parts', action);
    coalescer.stop();
    await vi.advanceTimersByTimeAsync(1_000);
    expect(action).toHaveBeenCalledTimes(1);
  });
  it('keeps keys apart', () => {
    const action = vi.fn();
    const coalescer = createCoalescer(300);
    coalescer.run('one', action);
    coalescer.run('two', action);
    expect(action).toHaveBeenCalledTimes(2);
  });
});
