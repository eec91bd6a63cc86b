import { describe, expect, it } from 'vitest';
import { describeDensity, readDensity, writeDensity } from './density';

describe('a typed density', () => {
  it('is read in the unit that is written with it', () => {
    expect(readDensity('2.7 g/cm3')).toEqual({ densityKgM3: 2700 });
    expect(readDensity('7850 kg/m³')).toEqual({ densityKgM3: 7850 });
  });
  it('left empty is stated later', () => {
    expect(readDensity('  ')).toEqual({ densityKgM3: null });
  });
  it('without a unit is refused: 2.7 could be grams to the cubic centimetre or kilograms to the cubic metre', () => {
    expect(readDensity('2.7').error).toMatch(/unit/i);
    expect(readDensity('2.7').densityKgM3).toBeUndefined();
  });
  it('of nothing or of more than any material has is refused', () => {
    expect(readDensity('0 g/cm3').error).toContain('greater than 0');
    expect(readDensity('1e-9 kg/m3').error).toContain('at least');
    expect(readDensity('2700 g/cm3').error).toContain('Check the unit');
  });
  it('is repeated in kg/m³ where it was typed otherwise, and only there', () => {
    expect(describeDensity(2700, '2.7 g/cm3')).toBe('= 2700 kg/m³');
    expect(describeDensity(2700, '2700 kg/m3')).toBe('');
  });
  it('is written with six digits, whatever a conversion makes of it', () => {
    expect(writeDensity(2712.6306616)).toBe('2712.63 kg/m³');
    expect(describeDensity(2712.6306616, '0.098 lb/in3')).toBe('= 2712.63 kg/m³');
    expect(describeDensity(2712.6306616, '2712.6306616 kg/m3')).toBe('');
    for (const density of [2700, 998.2, 0.163]) expect(readDensity(writeDensity(density))).toEqual({ densityKgM3: density });
  });
});
