import type { PartRow } from '@masswright/contracts';
import { fromSi, getDisplayUnit } from '@masswright/units';
import { computeFractionDigits } from '../../../components/figure';

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

export type ColumnFractions = Record<AlignedColumn, number>;

/** The room that each column keeps behind its decimal points for some rows. */
export function computeColumnFractions(rows: readonly PartRow[]): ColumnFractions {
  const digitsOf = (column: AlignedColumn): number =>
    computeFractionDigits(
      rows.map((row) => computeRowFigure(row, column)).filter((value) => value !== null),
      listDigits,
    );
  return { volume: digitsOf('volume'), mass: digitsOf('mass'), moment1: digitsOf('moment1'), moment2: digitsOf('moment2'), moment3: digitsOf('moment3') };
}

/** The room that suits several groups of rows: the most that one of them needs. */
export function joinColumnFractions(all: readonly ColumnFractions[]): ColumnFractions {
  const most = (column: AlignedColumn): number => Math.max(0, ...all.map((fractions) => fractions[column]));
  return { volume: most('volume'), mass: most('mass'), moment1: most('moment1'), moment2: most('moment2'), moment3: most('moment3') };
}
