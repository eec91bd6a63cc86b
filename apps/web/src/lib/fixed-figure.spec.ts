import { thinSpace } from '@masswright/units';
import { describe, expect, it } from 'vitest';
import { chooseDecimals, createGroupFormat, formatDecimals } from './fixed-figure';

describe('figures with fixed decimals', () => {
  it('set off thousands before the point and leave the digits behind it alone', () => {
    expect(formatDecimals(1234567.12345, 4)).toBe(`1${thinSpace}234${thinSpace}567.1235`);
    expect(formatDecimals(999, 0)).toBe('999');
  });
  it('what rounds to nothing is 0 without a sign', () => {
    expect(formatDecimals(-1e-17, 3)).toBe('0.000');
    expect(formatDecimals(-0, 1)).toBe('0.0');
    expect(formatDecimals(-0.0006, 3)).toBe('-0.001');
  });
  it('the largest of a group gets the digits asked for, the others follow its decimals', () => {
    const values = [263.23, -0.51, 514.07];
    expect(chooseDecimals(values, 5)).toBe(2);
    const format = createGroupFormat(values, 5);
    expect(values.map(format)).toEqual(['263.23', '-0.51', '514.07']);
  });
  it('rounding that adds a digit takes a decimal away', () => {
    expect(chooseDecimals([999.9996], 5)).toBe(1);
  });
  it('a group of tiny figures is written with powers of ten', () => {
    expect(createGroupFormat([1.2345e-8, 2e-9], 3)(1.2345e-8)).toBe('1.23×10⁻⁸');
  });
  it('a group of zeros is written as zeros', () => {
    expect(createGroupFormat([0, 0], 5)(0)).toBe('0');
  });
});
