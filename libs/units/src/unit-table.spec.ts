import { describe, expect, it } from 'vitest';
import { convertFromMetres, convertToMetres, lengthUnits } from './length';
import { fromSi, getUnit, toSi } from './unit';
import { getDisplayUnit, unitFamilies } from './unit-families';
import { quantities, unitTable, type Quantity } from './unit-table';

/** A fraction of integers: the units are recomputed from their definitions without rounding. */
class Fraction {
  constructor(
    readonly n: bigint,
    readonly d: bigint = 1n,
  ) {}
  times(other: Fraction): Fraction {
    return new Fraction(this.n * other.n, this.d * other.d);
  }
  over(other: Fraction): Fraction {
    return new Fraction(this.n * other.d, this.d * other.n);
  }
  equals(other: Fraction): boolean {
    return this.n * other.d === other.n * this.d;
  }
}

const one = new Fraction(1n);
const power = (base: Fraction, exponent: number): Fraction => (exponent === 0 ? one : exponent > 0 ? base.times(power(base, exponent - 1)) : power(base, exponent + 1).over(base));

// Definitions: NIST SP 811, from memory.
const inch = new Fraction(254n, 10_000n);
const foot = inch.times(new Fraction(12n));
const pound = new Fraction(45_359_237n, 100_000_000n);
const gravity = new Fraction(980_665n, 100_000n);
const poundForce = pound.times(gravity);
const milli = new Fraction(1n, 1000n);
const base: Record<string, Fraction> = {
  m: one, cm: new Fraction(1n, 100n), mm: milli, µm: power(milli, 2), in: inch, ft: foot, L: milli,
  kg: one, g: milli, mg: power(milli, 2), t: new Fraction(1000n), lb: pound, oz: pound.over(new Fraction(16n)), slug: poundForce.over(foot),
  N: one, kN: new Fraction(1000n), lbf: poundForce, ozf: poundForce.over(new Fraction(16n)), kgf: gravity,
  J: one, mJ: milli, kJ: new Fraction(1000n), MJ: new Fraction(1_000_000n), W: one, kW: new Fraction(1000n),
  s: one, ms: milli, min: new Fraction(60n), h: new Fraction(3600n),
};

/** A symbol such as `lbf·in·s²` or `kg/m³` in SI, from the definitions. */
function compute(symbol: string): Fraction {
  const [over = '', ...under] = symbol.split('/');
  const product = (text: string): Fraction =>
    text.split('·').reduce((sum, factor) => {
      const [, name = '', raised = ''] = /^(.*?)([²³]?)$/.exec(factor) ?? [];
      const value = base[name];
      if (value === undefined) throw new Error(`No definition of ${name}.`);
      return sum.times(power(value, raised === '²' ? 2 : raised === '³' ? 3 : 1));
    }, one);
  return under.reduce((quotient, text) => quotient.over(product(text)), product(over));
}

const rational = quantities.filter((quantity) => quantity !== 'angularSpeed' && quantity !== 'angularAcceleration');

describe('factors', () => {
  it.each(rational.flatMap((quantity) => unitTable[quantity].map((unit) => [quantity, unit.symbol, unit] as const)))('%s %s follows exactly from the definitions', (_quantity, symbol, unit) => {
    expect(Number.isSafeInteger(unit.numerator) || unit.numerator % 2 === 0).toBe(true);
    expect(new Fraction(BigInt(unit.numerator), BigInt(unit.denominator)).equals(compute(symbol))).toBe(true);
  });

  it.each([
    // As printed in the tables: NIST SP 811, from memory.
    ['torque', 'lbf·in', 0.1129848290276167],
    ['mass', 'slug', 14.593902937206],
    ['inertia', 'lb·in²', 2.926396534e-4],
    ['inertia', 'lb·ft²', 0.0421401101],
    ['inertia', 'slug·ft²', 1.35581794833],
    ['inertia', 'lbf·in·s²', 0.112984829],
    ['inertia', 'oz·in²', 1.82899783e-5],
    ['inertia', 'ozf·in·s²', 0.00706155181],
    ['density', 'lb/in³', 27679.9047],
    ['density', 'lb/ft³', 16.01846337],
    ['inertia', 'kg·mm²', 1e-6],
    ['inertia', 'g·mm²', 1e-9],
    ['inertia', 't·mm²', 1e-3],
    ['angularSpeed', 'r/min', 0.10471975511966],
    ['angularSpeed', 'rev/s', 6.28318530717959],
    ['angularSpeed', 'deg/s', 0.0174532925199433],
  ] as const)('one unit of %s, %s, is %d in SI to the printed digits', (quantity, symbol, printed) => {
    expect(Math.abs(toSi(1, getUnit(unitTable[quantity], symbol)) / printed - 1)).toBeLessThan(5e-9);
  });

  it('a conversion and its way back end within one unit in the last place', () => {
    for (const quantity of quantities) {
      for (const unit of unitTable[quantity]) for (const value of [1, 3, 0.1, 1234.5678, 1e-12]) expect(Math.abs(fromSi(toSi(value, unit), unit) / value - 1)).toBeLessThanOrEqual(2.3e-16);
    }
  });

  it('symbols and spellings are unambiguous within a quantity', () => {
    for (const quantity of quantities) {
      const all = unitTable[quantity].flatMap((unit) => [unit.symbol, ...unit.spellings]);
      expect(new Set(all).size, quantity).toBe(all.length);
    }
  });

  it('an unknown symbol is refused with those that are known', () => {
    expect(() => getUnit(unitTable.time, 'fortnight')).toThrow('There is no unit fortnight among s, ms, min, h.');
  });
});

describe('units of meshes', () => {
  it('25.4 mm are an inch, twelve inches a foot, and a thousand microns a millimetre', () => {
    expect(convertToMetres(25.4, 'mm')).toBe(convertToMetres(1, 'inch'));
    expect(convertToMetres(12, 'inch')).toBe(convertToMetres(1, 'foot'));
    expect(convertToMetres(1000, 'micron')).toBe(convertToMetres(1, 'mm'));
    expect(convertToMetres(1, 'foot')).toBe(0.3048);
  });
  it('powers are rounded once: 1 mm³ is 1e-9 m³, 1 mm⁵ is 1e-15 m⁵, 1 in³ is 1.6387064e-5 m³', () => {
    expect(convertToMetres(1, 'mm', 3)).toBe(1e-9);
    expect(convertToMetres(1, 'mm', 5)).toBe(1e-15);
    expect(convertToMetres(1, 'inch', 3)).toBe(1.6387064e-5);
  });
  it.each(lengthUnits)('%s: there and back again', (unit) => {
    for (const exponent of [1, 2, 3, 4, 5] as const) expect(Math.abs(convertFromMetres(convertToMetres(0.7, unit, exponent), unit, exponent) / 0.7 - 1)).toBeLessThan(5e-16);
  });
});

describe('families of units', () => {
  it.each(unitFamilies)('%s shows every quantity', (family) => {
    for (const quantity of quantities) expect(toSi(1, getDisplayUnit(family, quantity))).toBeGreaterThan(0);
  });
  it('the t-mm family is consistent: t·mm² times rad/s² is N·mm, t/mm³ times mm³ is t', () => {
    const factor = (quantity: Quantity): number => toSi(1, getDisplayUnit('t-mm', quantity));
    expect(factor('inertia') * factor('angularAcceleration')).toBeCloseTo(factor('torque'), 15);
    expect((factor('density') * factor('volume')) / factor('mass')).toBeCloseTo(1, 14);
  });
});
