import type { FigureChanges, StatementRecord, UncertaintyTermName } from '@masswright/contracts';
import { uncertaintyTermName } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { doubtfulFigures, listDoubt, listUncounted, termWords } from './doubt-ledger';

const changes = (massKg: number, areaM2: number | null): FigureChanges => ({
  volumeM3: 0, areaM2, massKg, centreOfMassM: [0, 0, 0], inertiaAtCentreOfMassKgM2: null, principalMomentsKgM2: [1, 2, 3], radiiOfGyrationM: null, aboutAxis: null,
});
const term = (name: UncertaintyTermName, massKg: number, areaM2: number | null) => ({ name, shares: changes(massKg, areaM2) });
const record = {
  massKg: 2,
  weighing: null,
  uncertainty: { ...changes(0.1, null), k: 2, terms: [term('density', 0.64, 0), term('facets', 0.36, 0.5), term('as-made', 0, null)] },
} as unknown as StatementRecord;
const figure = (id: string) => {
  const found = doubtfulFigures.find((one) => one.id === id);
  if (!found) throw new Error(id);
  return found;
};
const plain = { lengthUnit: 'mm', densityKgM3: 2700, densitySpreadKgM3: 27, material: null, weighing: null, axis: { kind: 'mesh', along: 'z' }, drive: null } as const;

describe('the doubt ledger', () => {
  it('has the terms of a figure by their size, each with what it would come to alone', () => {
    expect(listDoubt(record, figure('mass')).map(({ term: name, share, alone }) => [name, share, Number(alone?.toFixed(6))])).toEqual([
      ['density', 0.64, 0.08],
      ['facets', 0.36, 0.06],
    ]);
  });
  it('what cannot be told of a figure stands first and says so, what does nothing to it is left out', () => {
    expect(listDoubt(record, figure('area')).map(({ term: name, alone }) => [name, alone])).toEqual([
      ['as-made', null],
      ['facets', null],
    ]);
  });
  it('every term has a name, what it is and what would shrink it', () => {
    for (const name of uncertaintyTermName.options) expect(termWords[name].remedy).toMatch(/^[A-Z].*\.$/);
  });
  it('says what is not counted: no spread, no tolerance, facets that were not examined', () => {
    expect(listUncounted(record, { ...plain, densitySpreadKgM3: null }, { examined: 'integrals', facetDoubt: null })).toHaveLength(3);
    expect(listUncounted(record, { ...plain, asMade: { kind: 'scale', spread: 0.01 } }, { examined: 'limited', facetDoubt: null })).toEqual([
      'The facets were not examined: what a curved surface loses to them is not counted.',
    ]);
  });
  it('reads mass, centre and moments from figures and from their changes alike', () => {
    expect(figure('mass').read({ ...changes(3, 1) })).toBe(3);
    expect(figure('moment-2').read({ ...changes(3, 1) })).toBe(2);
    expect(figure('axis').read({ ...changes(3, 1) })).toBeNull();
  });
});
