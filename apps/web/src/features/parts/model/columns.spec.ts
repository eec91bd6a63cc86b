import { describe, expect, it } from 'vitest';
import { chooseExportColumns, columnIds, computeColumnWidth, findFigureRun, getColumn, readColumns, standardColumns, writeColumns } from './columns';
import type { ColumnRooms } from './row-figures';

function rooms(before: number, behind: number): ColumnRooms {
  const room = { before, behind };
  return { volume: room, mass: room, moment1: room, moment2: room, moment3: room };
}

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
  it('the usual ones fit a window of 1440 with its scroll bar, beside the boxes that select', () => {
    const widths = standardColumns.map((id) => computeColumnWidth(id, rooms(3, 4)));
    expect(widths.reduce((sum, width) => sum + width, 45)).toBeLessThanOrEqual(1440 - 15);
  });
  it('a column grows with the digits of its figures, and others stay', () => {
    const wide = rooms('25 600 000'.length, '.4126'.length);
    expect(computeColumnWidth('moment1', wide)).toBeGreaterThanOrEqual(15 * 7.2 + 12);
    expect(computeColumnWidth('size', wide)).toBe(getColumn('size').width);
  });
});
