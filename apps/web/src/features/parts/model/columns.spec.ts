import { describe, expect, it } from 'vitest';
import { chooseExportColumns, columnIds, findFigureRun, getColumn, readColumns, standardColumns, writeColumns } from './columns';

describe('the columns of the list', () => {
  it('every one has a width and a name, and reads back from text', () => {
    for (const id of columnIds) expect(getColumn(id).width).toBeGreaterThan(0);
    expect(readColumns(writeColumns(standardColumns))).toEqual(standardColumns);
  });
  it('what names none, or one twice, is passed over; a list without names gets them', () => {
    expect(readColumns('mass,nonsense,mass,number')).toEqual(['name', 'mass', 'number']);
    expect(readColumns('nonsense')).toBeUndefined();
    expect(readColumns('')).toBeUndefined();
    expect(readColumns(null)).toBeUndefined();
  });
  it('an export has what they stand for, once, in their order', () => {
    expect(chooseExportColumns(['mass', 'moment1', 'moment2', 'name', 'changed', 'beam'])).toEqual(['mass', 'moments', 'name', 'centre']);
  });
  it('a sentence stands where the most figures are missing side by side', () => {
    const all = (): boolean => true;
    expect(findFigureRun(['mass', 'name', 'size', 'beam', 'state'], all)).toEqual({ start: 2, length: 2, width: getColumn('size').width + getColumn('beam').width });
    expect(findFigureRun(['name', 'state'], all)).toBeUndefined();
    expect(findFigureRun(standardColumns, (id) => id !== 'size')?.start).toBe(standardColumns.indexOf('mass'));
  });
});
