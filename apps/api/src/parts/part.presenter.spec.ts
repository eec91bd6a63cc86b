import { describe, expect, it } from 'vitest';
import { revisionLetter } from './part.presenter';

describe('the letter of a revision', () => {
  it.each([
    [1, 'A'],
    [26, 'Z'],
    [27, 'AA'],
    [52, 'AZ'],
    [53, 'BA'],
    [702, 'ZZ'],
    [703, 'AAA'],
  ])('of the %dth is %s', (ordinal, letter) => {
    expect(revisionLetter(ordinal)).toBe(letter);
  });
});
