import { describe, expect, it } from 'vitest';
import { createPace, describeTimeLeft } from './pace';

describe('the pace of sending', () => {
  it('is what was sent in the last seconds, over their time', () => {
    let now = 0;
    const pace = createPace(() => now);
    pace.note('a', 0, 0);
    now = 2000;
    pace.note('a', 4_000_000, 0);
    expect(pace.read('a')).toBe(2_000_000);
    now = 4000;
    // Nothing has arrived since: it gets slower.
    expect(pace.read('a')).toBe(1_000_000);
    expect(pace.read()).toBe(1_000_000);
  });
  it('leaves out what was in the storage before', () => {
    let now = 0;
    const pace = createPace(() => now);
    pace.note('a', 16_000_000, 16_000_000);
    now = 1000;
    pace.note('a', 17_000_000, 16_000_000);
    expect(pace.read('a')).toBe(1_000_000);
  });
  it('adds the files up, and says nothing before it knows something', () => {
    let now = 0;
    const pace = createPace(() => now);
    pace.note('a', 0, 0);
    pace.note('b', 0, 0);
    expect(pace.read()).toBeUndefined();
    now = 1000;
    pace.note('a', 300, 0);
    pace.note('b', 700, 0);
    expect(pace.read()).toBe(1000);
    pace.forget('b');
    expect(pace.read()).toBe(300);
  });
});

describe('the time that is left', () => {
  it.each([
    [1000, 1000, 'a few seconds left'],
    [42_000, 1000, '45 s left'],
    [600_000, 1000, '10 min left'],
    [7_260_000, 1000, '2 h 1 min left'],
    [1e15, 1, 'more than four days left'],
  ])('for %d bytes at %d a second: %s', (bytes, rate, words) => {
    expect(describeTimeLeft(bytes, rate)).toBe(words);
  });
  it('is not guessed while nothing moves', () => {
    expect(describeTimeLeft(1000, 0)).toBeUndefined();
    expect(describeTimeLeft(1000, undefined)).toBeUndefined();
  });
});
