import type { AxesKind, Vector3 } from '@masswright/contracts';
import type { Tensor } from './tensor';
import { cross, findDirection } from './vector';

export interface PrincipalAxes {
  /** Principal moments in ascending order. */
  moments: Vector3;
  /** `axes[i]` is the unit vector of the axis of `moments[i]`; right-handed. */
  axes: [Vector3, Vector3, Vector3];
}

type Matrix = [Vector3, Vector3, Vector3];

/** Each sweep squares what is left of the off-diagonals; five are enough in practice. */
const mostSweeps = 30;

/**
 * Principal moments and axes of a symmetric tensor by cyclic Jacobi rotations (Golub & Van Loan, Matrix Computations, 8.5), which need no trigonometry
 * and are accurate to a few units in the last place of the largest moment, near-equal moments included.
 * Signs: axes 1 and 2 have their largest component positive (of equal ones the first), axis 3 = 1 × 2.
 */
export function computePrincipalAxes(tensor: Tensor): PrincipalAxes {
  const largest = Math.max(...[tensor.xx, tensor.yy, tensor.zz, tensor.xy, tensor.yz, tensor.zx].map(Math.abs));
  if (!(largest > 0)) return { moments: [0, 0, 0], axes: [[1, 0, 0], [0, 1, 0], [0, 0, 1]] };
  // A power of two scales without rounding and keeps squares in range.
  const unit = findPowerOfTwo(largest);
  const { xx, yy, zz, xy, yz, zx } = tensor;
  const a: Matrix = [[xx / unit, xy / unit, zx / unit], [xy / unit, yy / unit, yz / unit], [zx / unit, yz / unit, zz / unit]];
  const columns: Matrix = [[1, 0, 0], [0, 1, 0], [0, 0, 1]];
  for (let sweep = 0; sweep < mostSweeps && (a[0][1] !== 0 || a[0][2] !== 0 || a[1][2] !== 0); sweep++) {
    rotate(a, columns, 0, 1);
    rotate(a, columns, 0, 2);
    rotate(a, columns, 1, 2);
  }
  const found = ([0, 1, 2] as const).map((k) => ({ moment: a[k][k] * unit, axis: [columns[0][k], columns[1][k], columns[2][k]] as Vector3 }));
  found.sort((one, two) => one.moment - two.moment);
  const [first, second, third] = found;
  if (first === undefined || second === undefined || third === undefined) throw new RangeError('A tensor has three principal axes.');
  const axis1 = orient(first.axis);
  const axis2 = orient(second.axis);
  const axis3 = cross(axis1, axis2);
  return { moments: [first.moment, second.moment, third.moment], axes: [axis1, axis2, findDirection(axis3) ?? axis3] };
}

/** One Jacobi rotation: makes a[p][q] zero. Where theta² overflows, t is 0 and nothing turns, as it should. */
function rotate(a: Matrix, columns: Matrix, p: 0 | 1, q: 1 | 2): void {
  const off = a[p][q];
  if (off === 0) return;
  const other = p === 1 ? 0 : q === 1 ? 2 : 1;
  const theta = (a[q][q] - a[p][p]) / (2 * off);
  const t = (theta < 0 ? -1 : 1) / (Math.abs(theta) + Math.sqrt(theta * theta + 1));
  const c = 1 / Math.sqrt(t * t + 1);
  const s = t * c;
  a[p][p] -= t * off;
  a[q][q] += t * off;
  a[p][q] = 0;
  a[q][p] = 0;
  const ap = a[other][p];
  const aq = a[other][q];
  a[other][p] = c * ap - s * aq;
  a[p][other] = a[other][p];
  a[other][q] = s * ap + c * aq;
  a[q][other] = a[other][q];
  for (const row of columns) {
    const vp = row[p];
    const vq = row[q];
    row[p] = c * vp - s * vq;
    row[q] = s * vp + c * vq;
  }
}

/** Components that differ by less count as equally large, so that a rounded last digit does not choose the sign. */
const equalComponents = 1e-9;

/** The axis as a unit vector with its largest component positive; of equally large ones the first decides. */
function orient(axis: Vector3): Vector3 {
  const [x, y, z] = findDirection(axis) ?? axis;
  const largest = Math.max(Math.abs(x), Math.abs(y), Math.abs(z));
  const leading = [x, y, z].find((component) => Math.abs(component) >= largest * (1 - equalComponents)) ?? 1;
  return leading < 0 ? [0 - x, 0 - y, 0 - z] : [x, y, z];
}

function findPowerOfTwo(size: number): number {
  let power = 1;
  while (power > size) power /= 2;
  while (power * 2 <= size) power *= 2;
  return power;
}

/**
 * Which axes are unique: where two moments differ by no more than their difference is uncertain (kg·m²), any axis in their plane serves as well.
 */
export function classifyAxes([first, second, third]: Vector3, { lowerKgM2, upperKgM2 }: { lowerKgM2: number; upperKgM2: number }): AxesKind {
  const lowerEqual = second - first <= lowerKgM2;
  const upperEqual = third - second <= upperKgM2;
  if (lowerEqual && upperEqual) return 'ball';
  if (lowerEqual) return 'disc-like';
  return upperEqual ? 'rod-like' : 'distinct';
}
