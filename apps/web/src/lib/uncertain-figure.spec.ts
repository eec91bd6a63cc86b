import { describe, expect, it } from 'vitest';
import { countDecimals, sayUncertain, writeUncertain } from './uncertain-figure';

describe('figures with their uncertainty', () => {
  it.each([
    [105.312345, 0.61, '105.31', '0.61'],
    [16.2, 0.0000041, '16.2000000', '0.0000041'],
    [123456, 4321, '123\u2009500', '4\u2009300'],
    [-0.00012, 0.5, '0.00', '0.50'],
    [1.755, 0.0101, '1.755', '0.010'],
  ])('%d is rounded by ± %d', (value, uncertainty, text, spread) => {
    expect(writeUncertain(value, uncertainty)).toEqual({ value: text, spread, power: '' });
  });
  it('no more than nine digits are written, and a smaller uncertainty is said to be less', () => {
    expect(writeUncertain(16.2, 1e-13)).toEqual({ value: '16.2000000', spread: '<0.0000001', power: '' });
  });
  it('without an uncertainty there are six digits and no ±', () => {
    expect(writeUncertain(1 / 3, null)).toEqual({ value: '0.333333', spread: null, power: '' });
  });
  it('an uncertainty of nothing leaves the six digits', () => {
    expect(writeUncertain(16.2, 0)).toEqual({ value: '16.2000', spread: '0.0000', power: '' });
    expect(writeUncertain(0, 0)).toEqual({ value: '0', spread: '0', power: '' });
  });
  it('one power of ten belongs to both', () => {
    expect(writeUncertain(1.23456e-9, 1.2e-11)).toEqual({ value: '1.235', spread: '0.012', power: '×10⁻⁹' });
    expect(sayUncertain(1.23456e-9, 1.2e-11, 'g')).toBe('(1.235 ± 0.012)×10⁻⁹ g');
  });
  it('places can be limited, so that a zero beside large figures has no more of them', () => {
    expect(countDecimals(1.755, 0.01)).toBe(3);
    expect(writeUncertain(0, 6e-9, { mostDecimals: 3 })).toEqual({ value: '0.000', spread: '<0.001', power: '' });
  });
});
