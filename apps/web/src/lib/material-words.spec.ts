import { describe, expect, it } from 'vitest';
import { filterMaterials, groupMaterials, writePlain, writeSpreadDensity } from './material-words';

const materials = [
  { name: 'Steel 4140', group: 'steel' as const },
  { name: 'Aluminium 7075-T6', group: 'aluminium' as const },
  { name: 'Aluminium 6061-T6', group: 'aluminium' as const },
  { name: 'Polyamide 12, cast', group: 'polymer' as const },
];

describe('materials in words', () => {
  it('a density stands with its spread, thousands set off, without digits that say nothing', () => {
    expect(writeSpreadDensity({ densityKgM3: 2700, densitySpreadKgM3: 27 })).toBe('2\u2009700 ± 27 kg/m³');
    expect(writeSpreadDensity({ densityKgM3: 16.3, densitySpreadKgM3: 1.6333 })).toBe('16.3 ± 1.6 kg/m³');
    expect(writeSpreadDensity({ densityKgM3: 7850, densitySpreadKgM3: null })).toBe('7\u2009850 kg/m³');
  });
  it('thousands are set off before the point only', () => {
    expect(writePlain(12345.6789, 9)).toBe('12\u2009345.6789');
  });
  it('a search holds every word to the name or the family, whatever the case', () => {
    expect(filterMaterials(materials, 'ALU 6061').map(({ name }) => name)).toEqual(['Aluminium 6061-T6']);
    expect(filterMaterials(materials, 'polymer').map(({ name }) => name)).toEqual(['Polyamide 12, cast']);
    expect(filterMaterials(materials, 'brass')).toEqual([]);
    expect(filterMaterials(materials, ' ')).toHaveLength(4);
  });
  it('families stand in their order, and what is in them by name', () => {
    expect(groupMaterials(materials).map(({ name, items }) => [name, items.map((item) => item.name)])).toEqual([
      ['Aluminium', ['Aluminium 6061-T6', 'Aluminium 7075-T6']],
      ['Iron and steel', ['Steel 4140']],
      ['Polymers', ['Polyamide 12, cast']],
    ]);
  });
});
