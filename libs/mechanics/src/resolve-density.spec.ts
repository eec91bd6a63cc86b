import { describe, expect, it } from 'vitest';
import { resolveDensity } from './resolve-density';

const aluminium = { id: 'al-6061-t6', name: 'Aluminium 6061-T6' };
const named = { densityKgM3: 2700, densitySpreadKgM3: 27, material: aluminium };
const litre = 1e-3;

describe('the density that a statement counts with', () => {
  it('is the typed or the material’s one without a weighing', () => {
    expect(resolveDensity(litre, { ...named, weighing: null })).toEqual({ densityKgM3: 2700, weighing: null });
    expect(resolveDensity(litre, { densityKgM3: null, densitySpreadKgM3: null, material: null, weighing: null }).densityKgM3).toBeNull();
  });
  it('is mass over volume while that agrees with the named material', () => {
    // A litre of 2.72 kg: 20 kg/m³ off, within √(27² + 5²) = 27.46.
    const { densityKgM3, weighing } = resolveDensity(litre, { ...named, weighing: { massKg: 2.72, uncertaintyKg: 0.005 } });
    expect(densityKgM3).toBeCloseTo(2720, 9);
    expect(weighing).toMatchObject({ verdict: 'agrees', massKg: 2.72 });
  });
  it('takes spread and uncertainty together as independent', () => {
    const verdictAt = (massKg: number) => resolveDensity(litre, { ...named, weighing: { massKg, uncertaintyKg: 0.036 } }).weighing?.verdict;
    // √(27² + 36²) = 45 kg/m³.
    expect(verdictAt(2.7449)).toBe('agrees');
    expect(verdictAt(2.7451)).toBe('disagrees');
    expect(verdictAt(2.6549)).toBe('disagrees');
  });
  it('stays the material’s where the weight contradicts it: the part is hollow, filled or of something else', () => {
    const { densityKgM3, weighing } = resolveDensity(litre, { ...named, weighing: { massKg: 1.1, uncertaintyKg: 0.001 } });
    expect(densityKgM3).toBe(2700);
    expect(weighing).toEqual({ massKg: 1.1, uncertaintyKg: 0.001, impliedDensityKgM3: 1100, verdict: 'disagrees' });
  });
  it('follows the weight unchecked where no material is named, also beside a typed density', () => {
    const weighing = { massKg: 1.1, uncertaintyKg: 0.001 };
    expect(resolveDensity(litre, { densityKgM3: 2700, densitySpreadKgM3: null, material: null, weighing })).toMatchObject({ densityKgM3: 1100, weighing: { verdict: 'unchecked' } });
  });
  it('says nothing of a weighing where there is no volume to hold it against', () => {
    expect(resolveDensity(null, { ...named, weighing: { massKg: 1, uncertaintyKg: 0 } })).toEqual({ densityKgM3: 2700, weighing: null });
  });
});
