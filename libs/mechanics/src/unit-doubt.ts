import type { UnitDoubt } from '@masswright/contracts';
import { convertToMetres, lengthUnits, type LengthUnit } from '@masswright/units';

/** A volume as the mesh has it, and the unit that is stated for it. */
export interface StatedVolume {
  volume: number;
  lengthUnit: LengthUnit;
}

/**
 * How near a ratio of volumes must be to the cube of a ratio of units. The nearest two of those cubes, 16 387 (inch to mm) and 28 317 (foot to cm),
 * stand 1.73 apart, the least is 16.4 (inch to cm): within a quarter either way none is taken for another, and no change of a design is.
 */
const nearness = 1.25;

/**
 * Whether a revision stands to the one before as if its unit had been mistaken: its volume over the other's is near the cube of the ratio of two of the
 * six units. Gives the unit that would bring the volumes together, or undefined where there is nothing to doubt.
 */
export function findUnitDoubt(now: StatedVolume, before: StatedVolume): UnitDoubt | undefined {
  const cubicMetres = convertToMetres(now.volume, now.lengthUnit, 3);
  const volumeRatio = cubicMetres / convertToMetres(before.volume, before.lengthUnit, 3);
  if (!(volumeRatio > 0) || !Number.isFinite(volumeRatio)) return undefined;
  const others = lengthUnits.filter((unit) => unit !== now.lengthUnit);
  const near = others.find((unit) => {
    // What the ratio would be, had the mesh been stated in that unit.
    const ratio = (convertToMetres(now.volume, unit, 3) / cubicMetres) * volumeRatio;
    return ratio < nearness && ratio > 1 / nearness;
  });
  return near === undefined ? undefined : { lengthUnit: near, volumeRatio };
}
