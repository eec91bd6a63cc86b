import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { createCoalescer } from './coalesce';

describe('coalescer', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());

  it('runs the first call at once and a burst behind it once more', () => {
    const action = vi.fn();
    const coalescer = createCoalescer(300);
    for (let call = 0; call < 200; call += 1) coalescer.run('parts', action);
    expect(action).toHaveBeenCalledTimes(1);
    vi.advanceTimersByTime(300);
    expect(action).toHaveBeenCalledTimes(2);
    vi.advanceTimersByTime(3000);
    expect(action).toHaveBeenCalledTimes(2);
  });
  it('never loses the last call', () => {
    const seen: number[] = [];
    const coalescer = createCoalescer(300);
    for (const call of [1, 2, 3]) coalescer.run('parts', () => seen.push(call));
    vi.advanceTimersByTime(300);
    expect(seen.at(-1)).toBe(3);
  });
  it('keeps keys apart', () => {
    const action = vi.fn();
    const coalescer = createCoalescer(300);
    coalescer.run('one', action);
    coalescer.run('two', action);
    expect(action).toHaveBeenCalledTimes(2);
  });
});
