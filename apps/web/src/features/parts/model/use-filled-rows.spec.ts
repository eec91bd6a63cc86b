import { describe, expect, it } from 'vitest';
import { growFilled } from './use-filled-rows';

const all = (): boolean => true;
const grow = (filled: number[], first: number, last: number, isRead: (index: number) => boolean = all): number[] => [...growFilled(new Set(filled), { first, last }, isRead, 3)].sort((a, b) => a - b);

describe('growFilled', () => {
  it('begins at the top of the page and goes down, a few at a time', () => {
    expect(grow([], 40, 60)).toEqual([40, 41, 42]);
    expect(grow([40, 41, 42], 40, 60)).toEqual([40, 41, 42, 43, 44, 45]);
  });
  it('keeps what is filled and drops what has left the page', () => {
    expect(grow([10, 11, 12, 13], 12, 20)).toEqual([12, 13, 14, 15, 16]);
  });
  it('passes over what was not read, and fills it in its turn', () => {
    expect(grow([5, 6], 5, 12, (index) => index > 8)).toEqual([9, 10, 11]);
    expect(grow([9, 10, 11], 5, 12)).toEqual([5, 6, 7, 9, 10, 11]);
  });
  it('ends when every row in the page is filled', () => {
    expect(grow([5, 6], 5, 6)).toEqual([5, 6]);
    expect(grow([], 0, -1)).toEqual([]);
  });
});
