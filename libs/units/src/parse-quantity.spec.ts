import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatFigure } from './format-figure';
import { parseQuantity } from './parse-quantity';
import { quantities, unitTable, type Quantity } from './unit-table';

const parse = (text: string, quantity: Quantity, bareUnit?: string): number | string => {
  const parsed = parseQuantity(text, quantity, { bareUnit });
  return 'error' in parsed ? parsed.error : parsed.value;
};

describe('what people type', () => {
  it.each([
    ['2.7 g/cm3', 'density', 2700],
    ['2.7g/cm³', 'density', 2700],
    ['2.7 g/cm^3', 'density', 2700],
    ['2.7 G/CM3', 'density', 2700],
    ['2.7 g/cc', 'density', 2700],
    ['2.7 g cm-3', 'density', 2700],
    ['2.7 g·cm⁻³', 'density', 2700],
    ['2700 kg/m3', 'density', 2700],
    ['2 700 kg/m3', 'density', 2700],
    ['2\u2009700\u00a0kg / m**3', 'density', 2700],
    ['2.7e3 kg/m3', 'density', 2700],
    ['2.7×10³ kg/m³', 'density', 2700],
    ['2.7 x 10^3 kg/m3', 'density', 2700],
    ['2.7e-9 t/mm3', 'density', 2700],
    ['.0975437 lb/in3', 'density', 2700.0003],
    ['1 t/m3', 'density', 1000],
    ['12.5 mm', 'length', 0.0125],
    ['1 in', 'length', 0.0254],
    ['2 inches', 'length', 0.0508],
    ['50 um', 'length', 5e-5],
    ['50 μm', 'length', 5e-5],
    ['+3. ft', 'length', 0.9144],
    ['3000 rpm', 'angularSpeed', 100 * Math.PI],
    ['3\u2009000 r/min', 'angularSpeed', 100 * Math.PI],
    ['50 Hz', 'angularSpeed', 100 * Math.PI],
    ['−20 rev/s', 'angularSpeed', -40 * Math.PI],
    ['360 °/s', 'angularSpeed', 2 * Math.PI],
    ['0.35 kg m^2', 'inertia', 0.35],
    ['0.35 kg*m2', 'inertia', 0.35],
    ['0.35 kg-m²', 'inertia', 0.35],
    ['0.35 kg.m2', 'inertia', 0.35],
    ['5 g m2', 'inertia', 0.005],
    ['10 lb-in^2', 'inertia', 2.926396534292e-3],
    ['10 slug ft2', 'inertia', 13.558179483314003],
    ['3 N m', 'torque', 3],
    ['3 Nm', 'torque', 3],
    ['10 in-lb', 'torque', 1.129848290276167],
    ['500 mJ', 'energy', 0.5],
    ['0.5 MJ', 'energy', 5e5],
    ['2 min', 'time', 120],
    ['500 ms', 'time', 0.5],
  ] as const)('"%s" as %s', (text, quantity, value) => {
    const parsed = parse(text, quantity);
    expect(typeof parsed).toBe('number');
    expect(Math.abs(Number(parsed) / value - 1)).toBeLessThan(2e-7);
  });

  it.each([
    ['2,7 g/cm3', 'density', /decimal point/],
    ['2.700,5 kg/m3', 'density', /decimal point/],
    ['2,700 kg/m3', 'density', /decimal point/],
    ['2.7', 'density', /^State the unit of a density, for instance 2\.7 g\/cm³\.$/],
    ['', 'density', /^Write a density, for instance/],
    ['heavy', 'density', /^Begin with a number/],
    ['kg/m3', 'density', /^Begin with a number/],
    ['2.7 furlongs', 'density', /"furlongs" is not a unit of a density that is known here\. Known are kg\/m³, g\/cm³/],
    ['2.7 kg', 'density', /"kg" is not a unit of a density/],
    ['5 mj', 'energy', /can mean mJ or MJ/],
    ['1.2.3 mm', 'length', /does not begin with a number/],
    ['1 2 mm', 'length', /not a unit/],
    ['1e999 mm', 'length', /too large/],
    ['1e308 t', 'mass', /too large/],
    ['- 5 mm', 'length', /^Begin with a number/],
    ['NaN mm', 'length', /^Begin with a number/],
    ['0x10 mm', 'length', /not a unit/],
  ] as const)('"%s" as %s is refused in words', (text, quantity, sentence) => {
    expect(parse(text, quantity)).toMatch(sentence);
  });

  it('a number alone has the unit that the caller names', () => {
    expect(parse('12', 'length', 'mm')).toBe(0.012);
    expect(parse('12 in', 'length', 'mm')).toBe(0.3048);
  });

  it('every symbol and every spelling of every unit is understood as that unit', () => {
    for (const quantity of quantities) {
      for (const unit of unitTable[quantity]) {
        for (const spelling of [unit.symbol, ...unit.spellings]) expect(parseQuantity(`2 ${spelling}`, quantity), `${quantity} ${spelling}`).toEqual({ value: expect.closeTo((2 * unit.numerator) / unit.denominator) as number, unit });
      }
    }
  });

  it('what is shown can be typed in again', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e15, max: 1e15, noNaN: true }), fc.integer({ min: 3, max: 15 }), (value, digits) => {
        const parsed = parse(`${formatFigure(value, { digits })} kg·m²`, 'inertia');
        expect(Math.abs(Number(parsed) - value)).toBeLessThanOrEqual(0.5000001 * 10 ** (1 - digits) * Math.abs(value));
      }),
    );
  });

  it('no text makes it throw', () => {
    fc.assert(
      fc.property(fc.oneof(fc.string({ unit: 'binary' }), fc.stringMatching(/^[-+\d.,eE ×^*²³/·a-zµ"']*$/)), fc.constantFrom(...quantities), (text, quantity) => {
        const parsed = parseQuantity(text, quantity);
        if ('error' in parsed) expect(parsed.error).toMatch(/\.$/);
        else expect(Number.isFinite(parsed.value)).toBe(true);
      }),
      { numRuns: 2000 },
    );
  });
});
