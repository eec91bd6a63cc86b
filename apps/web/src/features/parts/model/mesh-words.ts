import type { Measurement, Vector3 } from '@masswright/contracts';
import { convertToMetres, formatFigure, fromSi, getLengthUnit, type LengthUnit, type Quantity } from '@masswright/units';
import { createGroupFormat } from '../../../lib/fixed-figure';
import { chooseDisplayUnit } from './display-units';

/** The symbol of the mesh's unit; nothing where it is not stated. */
export const writeMeshUnit = (unit: LengthUnit | null): string => (unit === null ? '' : getLengthUnit(unit).symbol);

const digits = 4;
/** A place is told as closely as the largest coordinate of the mesh is with six digits. */
const placeDigits = 6;

export type Box = Measurement['boundingBox'];

/** A place as it stands in the mesh: x, y and z without their unit. */
export function writeMeshPlace(place: Vector3, { min, max }: Box): string {
  const write = createGroupFormat([...min, ...max], placeDigits);
  return place.map((coordinate) => write(coordinate)).join(', ');
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
