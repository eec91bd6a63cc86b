import type { Integrals, Measurement, Vector3 } from '../measurement';
import { finishExactly, integrateExactly, integrateSurfaceExactly } from './exact-integrals';
import type { Corners } from './shapes';

/** Largest errors against the exact values: volume relative to itself, centre to the box's diagonal, second moments to volume times diagonal². */
export interface Errors {
  volume: number;
  centre: number;
  second: number;
}

export function compareExactly(measurement: Measurement, corners: Corners): Errors {
  const { volume } = measurement;
  if (volume === null) throw new Error('The mesh has no volume to compare.');
  const exact = finishExactly(integrateExactly(corners), measurement.origin);
  const sign = measurement.soundness.turned ? -1 : 1;
  return computeErrors(volume, { ...exact, content: sign * exact.content, second: scaleSecond(exact.second, sign) }, findDiagonal(measurement.boundingBox));
}

/** The same for the surface, relative to its area. */
export function compareSurfaceExactly({ surface, origin, boundingBox }: Measurement, corners: Corners): Errors {
  return computeErrors(surface, integrateSurfaceExactly(corners, origin), findDiagonal(boundingBox));
}

export function findDiagonal({ min, max }: { min: Vector3; max: Vector3 }): number {
  return Math.hypot(max[0] - min[0], max[1] - min[1], max[2] - min[2]);
}

export function computeErrors(found: Omit<Integrals, 'errorBound'>, exact: Omit<Integrals, 'errorBound'>, diagonal: number): Errors {
  const inertia = Math.abs(exact.content) * diagonal * diagonal;
  return {
    volume: Math.abs(found.content - exact.content) / Math.abs(exact.content),
    centre: Math.max(...found.centreFromOrigin.map((c, k) => Math.abs(c - (exact.centreFromOrigin[k] ?? NaN)))) / diagonal,
    second: Math.max(...secondKeys.map((key) => Math.abs(found.second[key] - exact.second[key]))) / inertia,
  };
}

export const secondKeys = ['xx', 'yy', 'zz', 'xy', 'yz', 'zx'] as const;

function scaleSecond(second: Integrals['second'], factor: number): Integrals['second'] {
  return { xx: factor * second.xx, yy: factor * second.yy, zz: factor * second.zz, xy: factor * second.xy, yz: factor * second.yz, zx: factor * second.zx };
}
