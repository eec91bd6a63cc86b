import type { UnitDoubt } from '@masswright/contracts';
import { convertToMetres, lengthUnits, type LengthUnit } from '@masswright/units';

/** A volume as the mesh has it, and the unit that is stated for it. */
export interface StatedVolume {
  volume: number;
  lengthUnit: LengthUnit;
}

/**
 * How near a ratio of volumes must be to the cube of a ratio of units. Of those cubes the nearest two, 1000 (cm to mm) and 1728 (foot to inch), stand
 * 1.73 apart, and the least is 16.4 (inch to cm): within a quarter either way none is taken for another, and a revision of the same size for none.
 */
const nearness = 1.25;

/** The cubes of the ratios of all ordered pairs of different units, without a dimension. */
const unitRatiosCubed = lengthUnits.flatMap((numerator) =>
  lengthUnits.filter((unit) => unit !== numerator).map((denominator) => convertToMetres(1, numerator, 3) / convertToMetres(1, denominator, 3)),
);

/**
 * Whether a revision stands to the one before as if its unit had been mistaken: its volume over the other's is near the cube of the ratio of any two of
 * the six units. Its `lengthUnit` is the unit that brings the volumes together; null where none of the six does: then the unit was
 * mistaken in another program, or it is the revision before whose unit is wrong. Undefined where there is nothing to doubt.
 */
export function findUnitDoubt(now: StatedVolume, before: StatedVolume): UnitDoubt | undefined {
  const volumeRatio = convertToMetres(now.volume, now.lengthUnit, 3) / convertToMetres(before.volume, before.lengthUnit, 3);
  if (!(volumeRatio > 0) || !Number.isFinite(volumeRatio)) return undefined;
  if (!unitRatiosCubed.some((cube) => isNear(volumeRatio, cube))) return undefined;
  const inPlace = lengthUnits.find((unit) => unit !== now.lengthUnit && isNear(convertToMetres(now.volume, unit, 3), convertToMetres(before.volume, before.lengthUnit, 3)));
  return { lengthUnit: inPlace ?? null, volumeRatio };
}

function isNear(volume: number, other: number): boolean {
  const ratio = volume / other;
  return ratio < nearness && ratio > 1 / nearness;
}
