import { describe, expect, it } from 'vitest';
import { countSelected, everything, isSelected, listRange, nothing, toggle, withSelected, writeSelection } from './selection';

const filter = { text: 'drum', states: 'ready', deleted: false };

describe('a selection', () => {
  it('of some names them one by one', () => {
    const some = toggle(toggle(nothing, 'a'), 'b');
    expect([isSelected(some, 'a'), isSelected(some, 'c'), countSelected(some, 9)]).toEqual([true, false, 2]);
    expect(writeSelection(toggle(some, 'a'), filter)).toEqual({ ids: ['b'] });
  });
  it('of all holds for rows that were never looked at, less those that are taken out', () => {
    const most = toggle(everything, 'a');
    expect([isSelected(most, 'a'), isSelected(most, 'never seen'), countSelected(most, 10_000)]).toEqual([false, true, 9_999]);
    expect(writeSelection(most, filter)).toEqual({ filter, except: ['a'] });
    expect(writeSelection(most, filter, 9)).toEqual({ filter, except: ['a'], expected: 8 });
    expect(countSelected(toggle(most, 'a'), 10_000)).toBe(10_000);
  });
  it('takes a range in, also out of all but some', () => {
    expect(countSelected(withSelected(nothing, ['a', 'b', 'c'], true), 9)).toBe(3);
    expect(countSelected(withSelected(toggle(everything, 'a'), ['a', 'b'], true), 9)).toBe(9);
    expect(countSelected(withSelected(everything, ['a', 'b'], false), 9)).toBe(7);
  });
  it('a range has both its ends, whichever comes first', () => {
    expect(listRange(3, 5)).toEqual([3, 4, 5]);
    expect(listRange(5, 3)).toEqual([3, 4, 5]);
    expect(listRange(2, 2)).toEqual([2]);
  });
});
