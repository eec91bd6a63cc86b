import type { PartRow } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { computeColumnFractions, computeRowFigure, computeRowSize } from './row-figures';

const row = (massKg: number | null): PartRow => ({ massKg, volumeM3: null, sizeM: [0.03, 0.02, 0.01], principalMomentsKgM2: massKg === null ? null : [1e-6, 2e-6, 3.25e-6] }) as PartRow;

describe('figures of the rows', () => {
  it('are in grams, millimetres and kg·mm²', () => {
    expect(computeRowFigure(row(0.4126), 'mass')).toBeCloseTo(412.6, 9);
    expect(computeRowFigure(row(0.4126), 'moment3')).toBeCloseTo(3.25, 9);
    expect(computeRowSize(row(1))?.map(Math.round)).toEqual([30, 20, 10]);
  });
  it('are none where something is missing', () => {
    expect(computeRowFigure(row(null), 'mass')).toBeNull();
    expect(computeRowFigure(row(null), 'moment1')).toBeNull();
    expect(computeRowFigure(row(1), 'volume')).toBeNull();
  });
  it('keep room for the longest fraction of their column, so that all points stand in one line', () => {
    expect(computeColumnFractions([row(0.4126), row(1.2043), row(null)]).mass).toBe(1);
    expect(computeColumnFractions([row(0.4126), row(0.0012043)]).mass).toBe(3);
    expect(computeColumnFractions([]).mass).toBe(0);
  });
});
