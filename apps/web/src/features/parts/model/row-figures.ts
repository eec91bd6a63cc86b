import type { PartRow } from '@masswright/contracts';
import { fromSi, getDisplayUnit } from '@masswright/units';
import { computeFractionDigits } from '../../../components/figure';

/** The list shows one family of units; a choice of families comes with the person's settings. */
const family = 'g-mm';
export const listUnits = {
  length: getDisplayUnit(family, 'length'),
  mass: getDisplayUnit(family, 'mass'),
  inertia: getDisplayUnit(family, 'inertia'),
} as const;

export const listDigits = 4;

export interface RowFigures {
  size: readonly number[] | null;
  mass: number | null;
  moments: readonly [number, number, number] | null;
}

export function computeRowFigures({ sizeM, massKg, principalMomentsKgM2 }: PartRow): RowFigures {
  const moment = (value: number): number => fromSi(value, listUnits.inertia);
  return {
    size: sizeM && sizeM.map((extent) => fromSi(extent, listUnits.length)),
    mass: massKg === null ? null : fromSi(massKg, listUnits.mass),
    moments: principalMomentsKgM2 && [moment(principalMomentsKgM2[0]), moment(principalMomentsKgM2[1]), moment(principalMomentsKgM2[2])],
  };
}

export interface ColumnFractions {
  mass: number;
  moments: readonly [number, number, number];
}

/** The room that each column keeps behind its decimal points. */
export function computeColumnFractions(rows: readonly RowFigures[]): ColumnFractions {
  const digitsOf = (values: readonly (number | undefined)[]): number =>
    computeFractionDigits(
      values.filter((value) => value !== undefined),
      listDigits,
    );
  const moment = (index: 0 | 1 | 2): number => digitsOf(rows.map((row) => row.moments?.[index]));
  return { mass: digitsOf(rows.map((row) => row.mass ?? undefined)), moments: [moment(0), moment(1), moment(2)] };
}
