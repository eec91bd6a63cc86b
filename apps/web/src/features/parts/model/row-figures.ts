import type { PartRow } from '@masswright/contracts';
import { formatFigure, fromSi, getDisplayUnit } from '@masswright/units';
import { computeFigureRoom, joinFigureRooms, type FigureRoom } from '../../../components/figure';

/** The list shows one family of units; a choice of families comes with the person's settings. */
const family = 'g-mm';
export const listUnits = {
  length: getDisplayUnit(family, 'length'),
  volume: getDisplayUnit(family, 'volume'),
  mass: getDisplayUnit(family, 'mass'),
  inertia: getDisplayUnit(family, 'inertia'),
} as const;

export const listDigits = 4;

/** Columns of figures that stand under one another at their decimal points. */
export const alignedColumns = ['volume', 'mass', 'moment1', 'moment2', 'moment3'] as const;
export type AlignedColumn = (typeof alignedColumns)[number];

/** What a row has in such a column, in the unit of the list; null where there is none. */
export function computeRowFigure({ volumeM3, massKg, principalMomentsKgM2 }: PartRow, column: AlignedColumn): number | null {
  const shown = (value: number | null | undefined, unit: (typeof listUnits)[keyof typeof listUnits]): number | null => (value === null || value === undefined ? null : fromSi(value, unit));
  switch (column) {
    case 'volume':
      return shown(volumeM3, listUnits.volume);
    case 'mass':
      return shown(massKg, listUnits.mass);
    case 'moment1':
      return shown(principalMomentsKgM2?.[0], listUnits.inertia);
    case 'moment2':
      return shown(principalMomentsKgM2?.[1], listUnits.inertia);
    case 'moment3':
      return shown(principalMomentsKgM2?.[2], listUnits.inertia);
  }
}

export function computeRowSize({ sizeM }: PartRow): readonly number[] | null {
  return sizeM && sizeM.map((extent) => fromSi(extent, listUnits.length));
}

export type ColumnRooms = Record<AlignedColumn, FigureRoom>;

const forEachColumn = (room: (column: AlignedColumn) => FigureRoom): ColumnRooms => ({
  volume: room('volume'),
  mass: room('mass'),
  moment1: room('moment1'),
  moment2: room('moment2'),
  moment3: room('moment3'),
});

/** The room that the figures of each column take before and behind their decimal points in some rows. */
export function computeColumnRooms(rows: readonly PartRow[]): ColumnRooms {
  return forEachColumn((column) =>
    computeFigureRoom(
      rows.map((row) => computeRowFigure(row, column)).filter((value) => value !== null),
      listDigits,
    ),
  );
}

/** The room that suits several groups of rows. */
export function joinColumnRooms(all: readonly ColumnRooms[]): ColumnRooms {
  return forEachColumn((column) => joinFigureRooms(all.map((rooms) => rooms[column])));
}

/** The three sides of a body in one line, and how small they must be set for that: no figure is ever cut off. */
export function writeRowSize(row: PartRow): { text: string; setting: 'usual' | 'small' | 'two-lines' } | null {
  const text = computeRowSize(row)
    ?.map((extent) => formatFigure(extent, { digits: listDigits }))
    .join(' × ');
  if (text === undefined) return null;
  return { text, setting: text.length <= 24 ? 'usual' : text.length <= 27 ? 'small' : 'two-lines' };
}
