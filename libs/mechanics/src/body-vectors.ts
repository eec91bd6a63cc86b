import type { Symmetric3, Vector3 } from '@masswright/contracts';
import { convertToMetres, type LengthUnit } from '@masswright/units';

export function mapVector([x, y, z]: Vector3, by: (element: number) => number): Vector3 {
  return [by(x), by(y), by(z)];
}

export function mapSymmetric({ xx, yy, zz, xy, yz, zx }: Symmetric3, by: (element: number) => number): Symmetric3 {
  return { xx: by(xx), yy: by(yy), zz: by(zz), xy: by(xy), yz: by(yz), zx: by(zx) };
}

export function convertVector(vector: Vector3, unit: LengthUnit): Vector3 {
  return mapVector(vector, (element) => convertToMetres(element, unit));
}
