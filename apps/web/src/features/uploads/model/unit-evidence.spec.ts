import { describe, expect, it } from 'vitest';
import { computeUnitEvidence, findMedianMesh } from './unit-evidence';

const box = (a: number, b: number, c: number) => ({ boundingBox: { min: [0, 0, 0] as [number, number, number], max: [a, b, c] as [number, number, number] }, volume: a * b * c });

describe('what each unit would make of the meshes', () => {
  const meshes = [box(10, 10, 10), box(100, 20, 5), box(400, 10, 10)];

  it('gives smallest, median and largest size, median and total mass', () => {
    const mm = computeUnitEvidence(meshes, 2700).find(({ lengthUnit }) => lengthUnit === 'mm');
    // Volumes 1000, 10 000 and 40 000 mm³, at 2.7 g/cm³: by hand.
    expect(mm).toMatchObject({ smallestM: 0.01, medianM: 0.1, largestM: 0.4, isPlausible: true, readsAs: 'hand-held parts' });
    expect(mm?.medianKg).toBeCloseTo(0.027, 12);
    expect(mm?.totalKg).toBeCloseTo(0.1377, 12);
    const inch = computeUnitEvidence(meshes, 2700).find(({ lengthUnit }) => lengthUnit === 'inch');
    expect(inch?.medianM).toBeCloseTo(2.54, 12);
    expect(inch?.totalKg).toBeCloseTo(0.1377 * 16387.064, 6);
  });
  it('states no mass while no density is stated', () => {
    expect(computeUnitEvidence(meshes, null).every(({ medianKg, totalKg }) => medianKg === null && totalKg === null)).toBe(true);
  });
  it('lists the units by size and lets the implausible ones recede', () => {
    const evidence = computeUnitEvidence(meshes, null);
    expect(evidence.map(({ lengthUnit }) => lengthUnit)).toEqual(['micron', 'mm', 'cm', 'inch', 'foot', 'm']);
    expect(evidence.filter(({ isPlausible }) => isPlausible).map(({ lengthUnit }) => lengthUnit)).toEqual(['mm', 'cm', 'inch']);
  });
  it('takes the mean of the two in the middle of an even number', () => {
    expect(computeUnitEvidence([box(10, 1, 1), box(30, 1, 1)], null)[1]?.medianM).toBeCloseTo(0.02, 15);
  });
  it('leaves what encloses nothing out of the masses, not out of the sizes', () => {
    const mm = computeUnitEvidence([...meshes, { ...box(500, 1, 1), volume: 1e9, hasInside: false }], 2700).find(({ lengthUnit }) => lengthUnit === 'mm');
    expect(mm?.totalKg).toBeCloseTo(0.1377, 12);
    expect(mm?.largestM).toBe(0.5);
  });
  it('says nothing where nothing is read', () => {
    expect(computeUnitEvidence([], 2700)).toEqual([]);
    expect(findMedianMesh([])).toBeUndefined();
  });
  it('pictures a mesh of middle size', () => {
    expect(findMedianMesh(meshes)).toBe(meshes[1]);
  });
});
