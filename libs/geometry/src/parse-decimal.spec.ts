import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isNonFiniteWord, parseDecimal } from './parse-decimal';

const encode = (text: string): Uint8Array => Uint8Array.from(text, (character) => character.charCodeAt(0));
const parse = (text: string): number | undefined => parseDecimal(encode(text), 0, text.length);

describe('decimal numbers', () => {
  it('are read to the last bit, however they are printed', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), fc.integer({ min: 1, max: 21 }), (value, digits) => {
        for (const text of [String(value), value.toExponential(digits - 1), value.toPrecision(digits), `+${Math.abs(value)}`, value.toExponential(digits - 1).toUpperCase()]) {
          if (!Object.is(parse(text), Number(text))) throw new Error(text);
        }
      }),
      { numRuns: 3000 },
    );
  });
  it('are read to the last bit with up to thirty digits and a small exponent', () => {
    fc.assert(
      fc.property(fc.stringMatching(/^[+-]?\d{1,15}(\.\d{0,15})?([eE][+-]?\d{1,2})?$/), (text) => {
        expect(Object.is(parse(text), Number(text))).toBe(true);
      }),
      { numRuns: 3000 },
    );
  });
  it('are read to the last bit half-way between two numbers, and next to it', () => {
    fc.assert(
      fc.property(fc.integer({ min: 2 ** 52, max: 2 ** 53 - 1 }), fc.integer({ min: 0, max: 3 }), fc.integer({ min: -1, max: 1 }), fc.integer({ min: -22, max: 22 }), (mantissa, power, step, scale) => {
        // (mantissa + 1/2) · 2^power has up to 19 digits; one unit of its last digit to either side rounds away from the middle.
        const middle = (2n * BigInt(mantissa) + 1n) * 2n ** BigInt(power) + BigInt(step);
        for (const text of [String(middle), `${middle}e${scale}`]) expect(Object.is(parse(text), Number(text))).toBe(true);
      }),
      { numRuns: 3000 },
    );
  });
  it.each(['.5', '5.', '-.5e1', '+0', '-0', '1e400', '1e-400', '0e999999999999', '000000000000000000000000.1', '123456789012345678901234567890', '9007199254740993', '2.2250738585072011e-308'])('%s means what the language says it means', (text) => {
    expect(Object.is(parse(text), Number(text))).toBe(true);
  });
  it.each(['', '.', '-', '+', 'e5', '1e', '1e+', '1,5', '1.2.3', '0x10', '1_000', 'Infinity', 'nan', '1d5', '--1', '1e5.5', '1 2'])('"%s" is no number', (text) => {
    expect(parse(text)).toBeUndefined();
  });
  it('are found in place, in the middle of other bytes', () => {
    expect(parseDecimal(encode('vertex 1.25 9'), 7, 11)).toBe(1.25);
  });
  it.each(['nan', 'NaN', '-nan', 'inf', '-INF', 'Infinity', 'nan(ind)', '-nan(snan)', '1.#QNAN', '-1.#IND', '1.#INF'])('%s is a way to print what is not finite', (text) => {
    expect(isNonFiniteWord(encode(text), 0, text.length)).toBe(true);
  });
  it.each(['outer', 'nano', 'info', '1', '1.5'])('%s is not one', (text) => {
    expect(isNonFiniteWord(encode(text), 0, text.length)).toBe(false);
  });
});
