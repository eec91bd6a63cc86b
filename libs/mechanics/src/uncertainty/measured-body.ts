import type { Integrals, Measurement, Symmetric3, Vector3 } from '@masswright/contracts';
import { convertToMetres, type LengthUnit } from '@masswright/units';
import { mapSymmetric, mapVector } from '../body-vectors';

/** What a measurement says of the whole mesh, in SI, all moments about the centroid of the body. */
export interface MeasuredBody {
  volume: number;
  second: Symmetric3;
  area: number;
  /** ∫x… dA and ∫x²… dA. */
  surfaceFirst: Vector3;
  surfaceSecond: Symmetric3;
  /** How far the box reaches from the centroid along each axis, on its longer side. */
  reach: Vector3;
  diagonal: number;
  errorBound: number;
  surfaceErrorBound: number;
}

/** ∫x²…, ∫xy… of something at one point. */
export function computePointSecond(content: number, [x, y, z]: Vector3): Symmetric3 {
  return { xx: content * x * x, yy: content * y * y, zz: content * z * z, xy: content * x * y, yz: content * y * z, zx: content * z * x };
}

/** Undefined where the mesh has no volume. */
export function measureBody(measurement: Measurement, unit: LengthUnit): MeasuredBody | undefined {
  const { volume, surface, boundingBox: { min, max }, origin } = measurement;
  if (volume === null) return undefined;
  const metres = (length: number): number => convertToMetres(length, unit);
  const centre = mapIndex((k) => origin[k] + volume.centreFromOrigin[k]);
  const area = convertToMetres(surface.content, unit, 2);
  const between = mapIndex((k) => metres(surface.centreFromOrigin[k] - volume.centreFromOrigin[k]));
  const apart = computePointSecond(area, between);
  const onSurface = mapSymmetric(surface.second, (element) => convertToMetres(element, unit, 4));
  return {
    volume: convertToMetres(volume.content, unit, 3),
    second: mapSymmetric(volume.second, (element) => convertToMetres(element, unit, 5)),
    area,
    surfaceFirst: mapVector(between, (element) => area * element),
    surfaceSecond: { xx: onSurface.xx + apart.xx, yy: onSurface.yy + apart.yy, zz: onSurface.zz + apart.zz, xy: onSurface.xy + apart.xy, yz: onSurface.yz + apart.yz, zx: onSurface.zx + apart.zx },
    reach: mapIndex((k) => metres(Math.max(max[k] - centre[k], centre[k] - min[k]))),
    diagonal: Math.sqrt(([0, 1, 2] as const).reduce<number>((sum, k) => sum + square(metres(max[k] - min[k])), 0)),
    errorBound: findErrorBound(volume),
    surfaceErrorBound: findErrorBound(surface),
  };
}

/** What was measured before there were bounds has none. */
function findErrorBound({ errorBound }: Partial<Pick<Integrals, 'errorBound'>>): number {
  return errorBound ?? 0;
}

function mapIndex(by: (k: 0 | 1 | 2) => number): Vector3 {
  return [by(0), by(1), by(2)];
}

const square = (x: number): number => x * x;
