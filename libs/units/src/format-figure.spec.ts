import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatCount, formatFigure, splitFigure, thinSpace, writeFigure } from './format-figure';

describe('figures for the eye', () => {
  it.each([
    [0, '0'],
    [-0, '0'],
    [1, '1.00000'],
    [-1.5, '-1.50000'],
    [1234.5678, '1 234.57'],
    [123456.4, '123 456'],
    [12345678, '12 345 678'],
    [999999999, '999 999 999'],
    [1e9, '1.00000×10⁹'],
    [999999999.9, '1 000 000 000'],
    [0.0001, '0.000100000'],
    [0.00012345678, '0.000123457'],
    [0.000099999999, '0.000100000'],
    [0.0000123456789, '1.23457×10⁻⁵'],
    [-6.02214076e23, '-6.02214×10²³'],
    [1e-300, '1.00000×10⁻³⁰⁰'],
    [9.9999999, '10.0000'],
    [0.5, '0.500000'],
    [2.5e-7, '2.50000×10⁻⁷'],
  ])('%d is shown as %s', (value, shown) => {
    expect(formatFigure(value)).toBe(shown.replaceAll(' ', thinSpace));
  });

  it('digits are chosen by the caller, and digits before the point are never lost', () => {
    expect(formatFigure(1234.5678, { digits: 3 })).toBe(`1${thinSpace}235`);
    expect(formatFigure(0.0123456, { digits: 2 })).toBe('0.012');
    expect(formatFigure(1e-6, { digits: 1 })).toBe('1×10⁻⁶');
    expect(formatFigure(1 / 3, { digits: 17 })).toBe('0.33333333333333331');
  });

  it('parts align on the decimal point', () => {
    expect(splitFigure(-1234.5)).toEqual({ sign: '-', integer: `1${thinSpace}234`, fraction: '50', exponent: '' });
    expect(splitFigure(1.5e-9, { digits: 3 })).toEqual({ sign: '', integer: '1', fraction: '50', exponent: '×10⁻⁹' });
  });

  it('rounding is within half a unit of the last digit shown', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-12, max: 1e12, noNaN: true }), fc.integer({ min: 1, max: 15 }), (value, digits) => {
        const { integer, fraction, exponent } = splitFigure(value, { digits });
        const power = exponent === '' ? 0 : Number(exponent.replace('×10', '').replace('⁻', '-').replace(/[⁰¹²³⁴⁵⁶⁷⁸⁹]/g, (digit) => String('⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(digit))));
        const shown = Number(`${integer.replaceAll(thinSpace, '')}.${fraction}e${power}`);
        expect(Math.abs(shown / value - 1)).toBeLessThanOrEqual(0.5000001 * 10 ** (1 - digits));
      }),
    );
  });

  it('what is not a finite number is not a figure', () => {
    expect(() => formatFigure(NaN)).toThrow(RangeError);
    expect(() => formatFigure(Infinity)).toThrow(RangeError);
  });

  it('counts have their thousands set off', () => {
    expect(formatCount(1200)).toBe(`1${thinSpace}200`);
    expect(formatCount(-1234567)).toBe(`-1${thinSpace}234${thinSpace}567`);
    expect(formatCount(999)).toBe('999');
  });

  it('figures for machines read back to the same bits', () => {
    fc.assert(fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }).filter((value) => !Object.is(value, -0)), (value) => Object.is(Number(writeFigure(value)), value)));
  });
});
