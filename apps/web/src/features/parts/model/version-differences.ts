import { measuringVersion, type Measurement, type Setting, type StatementRecord } from '@masswright/contracts';
import { computeStatement } from '@masswright/mechanics';
import { formatFigure, fromSi, type Quantity } from '@masswright/units';
import { chooseDisplayUnit } from './display-units';

/** Whether a file was measured by a version before the present one. */
export const isOutdated = (measurement: Measurement): boolean => measurement.measuringVersion !== measuringVersion;

export interface VersionDifference {
  name: string;
  symbol: string;
  before: string;
  /** After less before, with its sign. */
  difference: string;
  /** As a share of what it was, of the box's diagonal for a place. */
  share: string;
}

const digits = 6;
const sign = (value: number): string => (value > 0 ? '+' : '');
const write = (value: number, places: number): string => `${sign(value)}${formatFigure(value, { digits: places })}`;

function compare(name: string, quantity: Quantity, before: number, after: number, scale: number): VersionDifference {
  const unit = chooseDisplayUnit(quantity, after);
  const difference = after - before;
  return {
    name,
    symbol: unit.symbol,
    before: formatFigure(fromSi(before, unit), { digits }),
    difference: difference === 0 ? 'none' : write(fromSi(difference, unit), 2),
    share: difference === 0 || !(scale > 0) ? '' : write(difference / scale, 2),
  };
}

const measure = (measurement: Measurement, setting: Setting): StatementRecord | undefined => computeStatement(measurement, setting, { file: '', sha256: '' });

/** What another version found otherwise in the same bytes, under one setting; undefined while the unit is not stated. */
export function listVersionDifferences(before: Measurement, after: Measurement, setting: Setting): VersionDifference[] | undefined {
  // Densities of shells are of the shells that the present version found.
  const plain = { ...setting, shellDensities: [] };
  const [one, other] = [measure(before, plain), measure(after, plain)];
  if (!one || !other) return undefined;
  const { min, max } = other.boundingBoxM;
  const diagonal = Math.sqrt(([0, 1, 2] as const).reduce<number>((sum, k) => sum + (max[k] - min[k]) * (max[k] - min[k]), 0));
  const both = (name: string, quantity: Quantity, read: (record: StatementRecord) => number | null | undefined, scale?: number): VersionDifference[] => {
    const [was, is] = [read(one), read(other)];
    return was === null || was === undefined || is === null || is === undefined ? [] : [compare(name, quantity, was, is, scale ?? Math.abs(was))];
  };
  return [
    ...both('Volume', 'volume', ({ volumeM3 }) => volumeM3),
    ...both('Surface', 'area', ({ areaM2 }) => areaM2),
    ...both('Mass', 'mass', ({ massKg }) => massKg),
    ...(['x', 'y', 'z'] as const).flatMap((letter, k) => both(`Centre of mass ${letter}`, 'length', ({ centreOfMassM }) => centreOfMassM?.[k], diagonal)),
    ...([1, 2, 3] as const).flatMap((number) => both(`Principal moment ${number}`, 'inertia', ({ principalMomentsKgM2 }) => principalMomentsKgM2?.[number - 1])),
  ];
}
