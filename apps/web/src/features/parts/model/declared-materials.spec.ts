import type { Material } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { findDeclaredMaterials } from './declared-materials';

const named = (name: string, archivedAt: string | null = null): Material =>
  ({ id: name.toLowerCase(), name, group: 'polymer', densityKgM3: 1240, densitySpreadKgM3: null, spreadBasis: null, source: '', origin: 'own', version: 1, archivedAt, usedByParts: 0, can: { edit: false } }) as unknown as Material;
const library = [named('PLA'), named('PLA, wood filled'), named('Aluminium 6061-T6'), named('Aluminium 7075-T6'), named('Steel 4140', '2026-01-01T00:00:00Z')];
const namesOf = (name: string): string[] => findDeclaredMaterials([name], library).flatMap(({ proposals }) => proposals.map((material) => material.name));

describe('materials that a file names', () => {
  it('the entry of just that name is proposed, whatever its case and marks', () => {
    expect(namesOf('pla')).toEqual(['PLA']);
    expect(namesOf('ALUMINIUM_6061_T6')).toEqual(['Aluminium 6061-T6']);
  });
  it('else those that hold all words of it', () => {
    expect(namesOf('aluminium')).toEqual(['Aluminium 6061-T6', 'Aluminium 7075-T6']);
    expect(namesOf('6061')).toEqual(['Aluminium 6061-T6']);
  });
  it('nothing is proposed for a name that says nothing to the library, nor what is put away', () => {
    expect(namesOf('Body 1')).toEqual([]);
    expect(namesOf('Steel 4140')).toEqual([]);
    expect(namesOf('***')).toEqual([]);
  });
  it('a name is told once', () => {
    expect(findDeclaredMaterials(['PLA', 'PLA ', ''], library)).toHaveLength(1);
  });
});
