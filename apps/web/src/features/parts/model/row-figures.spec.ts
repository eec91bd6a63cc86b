import type { PartRow } from '@masswright/contracts';
import { describe, expect, it } from 'vitest';
import { computeColumnRooms, computeRowFigure, computeRowSize, joinColumnRooms, writeRowSize } from './row-figures';

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
    expect(computeColumnRooms([row(0.4126), row(1.2043), row(null)]).mass).toEqual({ before: 5, behind: 2 });
    expect(computeColumnRooms([row(0.4126), row(0.0012043)]).mass).toEqual({ before: 3, behind: 4 });
    expect(computeColumnRooms([]).mass).toEqual({ before: 0, behind: 0 });
    const one = computeColumnRooms([row(12.5)]);
    expect(joinColumnRooms([one, computeColumnRooms([row(0.001)])]).mass).toEqual({ before: 6, behind: 4 });
  });
  it('of the size are set smaller, or in two lines, before one is cut off', () => {
    const sized = (...sizeM: [number, number, number]) => writeRowSize({ ...row(1), sizeM });
    expect(sized(0.0004, 0.0002, 0.0001)).toEqual({ text: '0.4000 × 0.2000 × 0.1000', setting: 'usual' });
    expect(sized(123.4, 123.4, 123.4)?.setting).toBe('small');
    expect(sized(1e-8, 1e-8, 1e-8)?.setting).toBe('two-lines');
    expect(writeRowSize({ ...row(1), sizeM: null })).toBeNull();
  });
});
