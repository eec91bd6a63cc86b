import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { createQuietWatch } from './quiet-watch';

describe('watch over parts of which nothing is heard', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());

  it('asks after three seconds, then less and less often', () => {
    const ask = vi.fn();
    createQuietWatch(ask).update(['a']);
    vi.advanceTimersByTime(2_999);
    expect(ask).not.toHaveBeenCalled();
    vi.advanceTimersByTime(1);
    expect(ask).toHaveBeenCalledTimes(1);
    vi.advanceTimersByTime(5_999);
    expect(ask).toHaveBeenCalledTimes(1);
    vi.advanceTimersByTime(1);
    expect(ask).toHaveBeenCalledTimes(2);
  });
  it('asks no more once all are measured', () => {
    const ask = vi.fn();
    const watch = createQuietWatch(ask);
    watch.update(['a']);
    vi.advanceTimersByTime(1_000);
    watch.update([]);
    vi.advanceTimersByTime(60_000);
    expect(ask).not.toHaveBeenCalled();
  });
  it('asks about the oldest only, however many there are', () => {
    const ask = vi.fn();
    createQuietWatch(ask).update(Array.from({ length: 200 }, (_, index) => `part-${index}`));
    vi.advanceTimersByTime(3_000);
    expect(ask.mock.calls.length).toBeLessThan(20);
    expect(ask).toHaveBeenCalledWith('part-0');
  });
});
