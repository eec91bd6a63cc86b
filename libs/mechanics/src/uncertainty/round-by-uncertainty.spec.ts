import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { roundByUncertainty } from './round-by-uncertainty';

describe('sensible digits', () => {
  it.each([
    [0.105312345, 0.00061234, { value: 0.10531, uncertainty: 0.00061, decimals: 5 }],
    [1234.5678, 12.3, { value: 1235, uncertainty: 12, decimals: 0 }],
    [123456, 4321, { value: 123500, uncertainty: 4300, decimals: -2 }],
    [-0.00012, 0.5, { value: 0, uncertainty: 0.5, decimals: 2 }],
    [0.0996, 0.0996, { value: 0.1, uncertainty: 0.1, decimals: 2 }],
    [5e-9, 1.04e-9, { value: 5e-9, uncertainty: 1e-9, decimals: 10 }],
    [0, 0.1, { value: 0, uncertainty: 0.1, decimals: 2 }],
    [9.996, 0.1, { value: 10, uncertainty: 0.1, decimals: 2 }],
    [6e-11, 1.2e-9, { value: 1e-10, uncertainty: 1.2e-9, decimals: 10 }],
    [0.006, 0.12, { value: 0.01, uncertainty: 0.12, decimals: 2 }],
  ])('%d ± %d', (value, uncertainty, rounded) => {
    expect(roundByUncertainty(value, uncertainty)).toEqual(rounded);
  });

  it('without an uncertainty a value keeps fifteen digits', () => {
    expect(roundByUncertainty(0.1 + 0.2, 0)).toEqual({ value: 0.3, uncertainty: 0, decimals: 15 });
    expect(roundByUncertainty(2, NaN).value).toBe(2);
  });

  it('rounding moves a value by no more than half a unit of the second digit of its uncertainty', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e9, max: 1e9, noNaN: true }), fc.double({ min: 1e-9, max: 1e6, noNaN: true }), (value, uncertainty) => {
        const rounded = roundByUncertainty(value, uncertainty);
        expect(Math.abs(rounded.value - value)).toBeLessThanOrEqual(0.5000001 * Number(`1e${-rounded.decimals}`) + 1e-15 * Math.abs(value));
        // 99.5 becomes 100, whose second digit is worth 10.
        expect(Number(`1e${-rounded.decimals}`) / uncertainty).toBeLessThanOrEqual(0.1006);
      }),
    );
  });
});
