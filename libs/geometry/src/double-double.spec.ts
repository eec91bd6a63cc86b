import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { add, createRegisters, differ, divide, multiply, put, round, squareRoot, subtract, type Registers } from './double-double';
import { toNumber } from './testing/exact-integrals';

/** A number as an integer multiple of 2⁻¹¹⁰⁰: the least that binary64 has is 2⁻¹⁰⁷⁴. */
const shift = 1100n;
function toBig(value: number): bigint {
  let scaled = value;
  let power = 0;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    power += 1;
  }
  return BigInt(scaled) << (shift - BigInt(power));
}
const read = (r: Registers, a: number): bigint => toBig(r[2 * a] ?? 0) + toBig(r[2 * a + 1] ?? 0);

const anyDouble = fc.double({ min: -1e30, max: 1e30, noNaN: true }).filter((value) => value === 0 || Math.abs(value) > 1e-30);
const anyPair = fc.tuple(anyDouble, fc.double({ min: -1, max: 1, noNaN: true })).map(([high, share]): [number, number] => [high, share === 0 ? 0 : high * share * 2 ** -54]);

function load(r: Registers, at: number, [high, low]: [number, number]): void {
  put(r, at, high);
  put(r, at + 1, low);
  add(r, at, at, at + 1);
}

/** Error of a result relative to a reference size. */
const relative = (found: bigint, exact: bigint, size: bigint): number => (size === 0n ? Number(found !== exact) : Math.abs(toNumber(found - exact, size)));

describe('double-double arithmetic, against integers', () => {
  it('differences of two numbers are exact', () => {
    fc.assert(
      fc.property(anyDouble, anyDouble, (a, b) => {
        const r = createRegisters(1);
        differ(r, 0, a, b);
        expect(read(r, 0)).toBe(toBig(a) - toBig(b));
      }),
    );
  });
  it('sums, differences, products, quotients and roots are right to 2⁻¹⁰⁰', () => {
    fc.assert(
      fc.property(anyPair, anyPair, (one, two) => {
        const r = createRegisters(10);
        load(r, 0, one);
        load(r, 2, two);
        const [a, b] = [read(r, 0), read(r, 2)];
        add(r, 4, 0, 2);
        expect(relative(read(r, 4), a + b, a + b)).toBeLessThan(2 ** -100);
        subtract(r, 4, 0, 2);
        expect(relative(read(r, 4), a - b, a - b)).toBeLessThan(2 ** -100);
        multiply(r, 4, 0, 2);
        expect(relative(read(r, 4) << shift, a * b, a * b)).toBeLessThan(2 ** -100);
        if (b !== 0n) {
          divide(r, 4, 0, 2, 6);
          expect(relative(read(r, 4) * b, a << shift, a << shift)).toBeLessThan(2 ** -100);
        }
        if (a > 0n) {
          squareRoot(r, 4, 0, 6);
          expect(relative(read(r, 4) ** 2n, a << shift, a << shift)).toBeLessThan(2 ** -100);
        }
      }),
      { numRuns: 500 },
    );
  });
  it('a negative number has no root here, and a rounded zero no sign', () => {
    const r = createRegisters(3);
    put(r, 0, -4);
    squareRoot(r, 1, 0, 2);
    expect(round(r, 1)).toBe(0);
    put(r, 0, -0);
    expect(Object.is(round(r, 0), 0)).toBe(true);
  });
});
