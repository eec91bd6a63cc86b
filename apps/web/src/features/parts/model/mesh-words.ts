import type { Vector3 } from '@masswright/contracts';
import { convertToMetres, formatFigure, fromSi, getLengthUnit, type LengthUnit, type Quantity } from '@masswright/units';
import { chooseDisplayUnit } from './display-units';

/** The symbol of the mesh's unit; nothing where it is not stated. */
export const writeMeshUnit = (unit: LengthUnit | null): string => (unit === null ? '' : getLengthUnit(unit).symbol);

const digits = 4;
/** A place in a mesh needs as many digits as its coordinates have. */
const placeDigits = 6;

/** A length as it stands in the mesh. */
export function writeMeshLength(length: number, unit: LengthUnit | null): string {
  return [formatFigure(length, { digits }), writeMeshUnit(unit)].filter(Boolean).join(' ');
}

/** A place as it stands in the mesh: x, y and z without their unit. */
export function writeMeshPlace(place: Vector3): string {
  return place.map((coordinate) => formatFigure(coordinate, { digits: placeDigits })).join(', ');
}

/** Volumes or areas of one mesh, all in one unit that suits the largest of them; in the mesh's own where its unit is not stated. */
export function writeMeshContents(contents: readonly number[], power: 2 | 3, unit: LengthUnit | null): { texts: string[]; symbol: string } {
  const quantity: Quantity = power === 3 ? 'volume' : 'area';
  const inMetres = contents.map((content) => (unit === null ? content : convertToMetres(content, unit, power)));
  const shown = unit === null ? undefined : chooseDisplayUnit(quantity, Math.max(...inMetres.map(Math.abs)));
  return {
    texts: inMetres.map((content) => formatFigure(shown ? fromSi(content, shown) : content, { digits })),
    symbol: shown?.symbol ?? (power === 3 ? 'cubes of the mesh’s unit' : 'squares of the mesh’s unit'),
  };
}
