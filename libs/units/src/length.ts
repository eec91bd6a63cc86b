import { getUnit, raiseFactor, type Unit } from './unit';
import { unitTable } from './unit-table';

/** The six units in which mesh files are drawn. */
export const lengthUnits = ['micron', 'mm', 'cm', 'm', 'inch', 'foot'] as const;
export type LengthUnit = (typeof lengthUnits)[number];

const symbols: Record<LengthUnit, string> = { micron: 'µm', mm: 'mm', cm: 'cm', m: 'm', inch: 'in', foot: 'ft' };

/** The unit of a mesh as one that can be shown and converted. */
export function getLengthUnit(unit: LengthUnit): Unit {
  return getUnit(unitTable.length, symbols[unit]);
}

/**
 * Converts a figure of a mesh whose dimension is a power of length (1 a length, 2 an area, 3 a volume, 5 a second moment of a volume) to metres to that power.
 * Powers of the factor's numerator and denominator are exact up to the fifth for every unit but the micron.
 */
export function convertToMetres(value: number, unit: LengthUnit, power: 1 | 2 | 3 | 4 | 5 = 1): number {
  const { numerator, denominator } = raiseFactor(getLengthUnit(unit), power);
  return (value * numerator) / denominator;
}

/** The other way: from metres to a power into the unit of a mesh to that power. */
export function convertFromMetres(valueSi: number, unit: LengthUnit, power: 1 | 2 | 3 | 4 | 5 = 1): number {
  const { numerator, denominator } = raiseFactor(getLengthUnit(unit), power);
  return (valueSi * denominator) / numerator;
}
