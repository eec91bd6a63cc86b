import { describe, expect, it } from 'vitest';
import { computeKeptUntil, describeDaysLeft } from './deleted-words';

const deletedAt = '2026-11-28T14:06:00Z';
const left = (now: string): string => describeDaysLeft(deletedAt, new Date(now)).replaceAll('\u2009', ' ');

describe('a deleted part', () => {
  it('is kept for thirty days', () => {
    expect(computeKeptUntil(deletedAt).toISOString()).toBe('2026-12-28T14:06:00.000Z');
  });
  it('has as many whole days left as surely remain', () => {
    expect(left('2026-11-28T14:06:00Z')).toBe('30 days left');
    expect(left('2026-12-01T15:00:00Z')).toBe('26 days left');
    expect(left('2026-12-27T14:05:00Z')).toBe('1 day left');
    expect(left('2026-12-28T02:00:00Z')).toBe('Less than a day left');
  });
});
