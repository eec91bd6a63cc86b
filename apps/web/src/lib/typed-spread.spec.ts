import { describe, expect, it } from 'vitest';
import { readSpread, writeSpread } from './typed-spread';

describe('a quantity with how far it may be off', () => {
  it('is read with a percentage, with a unit for each, or with one for both', () => {
    for (const text of ['2.7 g/cm3 ± 1 %', '2700 ± 27 kg/m³', '2700 kg/m3 +- 27 kg/m3', '2.7 g/cm3 +/- 27 kg/m3', '2700 kg/m³ ± 27']) {
      const { value, spread } = readSpread(text, 'density');
      expect([text, Math.round(value ?? 0), Math.round(spread ?? 0)]).toEqual([text, 2700, 27]);
    }
  });
  it('has no spread where none is written', () => {
    expect(readSpread('0.311 kg', 'mass')).toEqual({ value: 0.311, spread: null });
  });
  it('keeps powers of ten apart from units', () => {
    expect(readSpread('2.7e3 kg/m3 ± 2.7e1', 'density')).toEqual({ value: 2700, spread: 27 });
  });
  it('is refused without any unit, with half a spread, and with two', () => {
    expect(readSpread('2.7 ± 1 %', 'density').error).toMatch(/unit/i);
    expect(readSpread('2.7 g/cm3 ±', 'density').error).toContain('behind the ±');
    expect(readSpread('2.7 g/cm3 ± 1 % ± 2 %', 'density').error).toContain('one ±');
    expect(readSpread('2.7 g/cm3 ± some', 'density').error).toContain('Behind the ±');
  });
  it('is written so that it reads back', () => {
    expect(writeSpread(2700, 27, 'kg/m³')).toBe('2700 ± 27 kg/m³');
    expect(writeSpread(0.311, 0.002, 'g', 1e-3)).toBe('311 ± 2 g');
    const { value, spread } = readSpread(writeSpread(0.311, 0.002, 'g', 1e-3), 'mass');
    expect([value, spread]).toEqual([0.311, 0.002]);
  });
});
