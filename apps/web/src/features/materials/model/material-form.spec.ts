import { describe, expect, it } from 'vitest';
import { emptyMaterial, readMaterial, writeMaterial } from './material-form';

const typed = { ...emptyMaterial, name: ' PA12, sintered ', group: 'polymer' as const, density: '0.96 g/cm3', spread: '0.03 g/cm3', source: 'our own bars, 2026' };

describe('a material as it is typed', () => {
  it('has its density and spread in kg/m³', () => {
    const { material, errors } = readMaterial(typed);
    expect(errors).toEqual({});
    expect(material).toMatchObject({ name: 'PA12, sintered', densityKgM3: 960, spreadBasis: 'judgement' });
    expect(material?.densitySpreadKgM3).toBeCloseTo(30, 9);
  });
  it('may have its spread as a share', () => {
    expect(readMaterial({ ...typed, spread: '3 %' }).material?.densitySpreadKgM3).toBeCloseTo(28.8, 9);
  });
  it('is refused without a name, a density or a spread, each in a sentence of its own', () => {
    const { material, errors } = readMaterial(emptyMaterial);
    expect(material).toBeUndefined();
    expect(Object.keys(errors).sort()).toEqual(['density', 'name', 'spread']);
  });
  it('is refused with a bare number for a spread: it could be of any unit', () => {
    expect(readMaterial({ ...typed, spread: '0.03' }).errors.spread).toContain('unit');
  });
  it('is refused with a spread beyond the density', () => {
    expect(readMaterial({ ...typed, spread: '120 %' }).errors.spread).toContain('more than the density');
  });
  it('keeps a spread that was typed as a share a share, also when the density is changed later', () => {
    const { material } = readMaterial({ ...typed, spread: '1 %' });
    if (!material) throw new Error('It could not be read.');
    const written = writeMaterial({ ...material, id: 'x', origin: 'own', version: 1, archivedAt: null, usedByParts: 0, can: { edit: true } });
    expect(written.spread).toBe('1 %');
    expect(readMaterial({ ...written, density: '2 g/cm3' }).material?.densitySpreadKgM3).toBeCloseTo(20, 9);
  });
  it('reads back as it is written', () => {
    const { material } = readMaterial(typed);
    if (!material) throw new Error('It could not be read.');
    const written = writeMaterial({ ...material, id: 'x', origin: 'own', version: 1, archivedAt: null, usedByParts: 0, can: { edit: true } });
    expect(readMaterial(written).material).toEqual(material);
  });
});
