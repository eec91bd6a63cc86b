import { measuringVersion, type Measurement, type Setting } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { makeMeasurement } from './testing/measurements';
import { isOutdated, listVersionDifferences } from './version-differences';

const metal: Setting = { lengthUnit: 'mm', densityKgM3: 1000, densitySpreadKgM3: null, material: null, weighing: null, axis: { kind: 'mesh', along: 'z' }, drive: null };
const block = makeMeasurement();
const larger = (share: number): Measurement => {
  if (!block.volume) throw new Error('A block has a volume.');
  return { ...block, measuringVersion: 'm1', volume: { ...block.volume, content: block.volume.content * (1 + share) } };
};

describe('what versions found otherwise', () => {
  it('a measurement of another version than the present one is outdated', () => {
    expect(isOutdated({ ...block, measuringVersion })).toBe(false);
    expect(isOutdated({ ...block, measuringVersion: 'm1' })).toBe(true);
  });
  it('is told as a difference and as a share of what it was', () => {
    const rows = listVersionDifferences(larger(1e-3), block, metal);
    // 6 cm³ now, 6.006 before.
    expect(rows?.find(({ name }) => name === 'Volume')).toEqual({ name: 'Volume', symbol: 'cm³', before: '6.00600', difference: '-0.0060', share: '-0.0010' });
    expect(rows?.find(({ name }) => name === 'Surface')).toMatchObject({ difference: 'none', share: '' });
    expect(rows?.map(({ name }) => name)).toContain('Principal moment 3');
  });
  it('a figure that only one of them has is left out, and nothing is told without a unit', () => {
    expect(listVersionDifferences({ ...block, volume: null }, block, metal)?.map(({ name }) => name)).toEqual(['Surface']);
    expect(listVersionDifferences(block, block, { ...metal, lengthUnit: null })).toBeUndefined();
  });
});
