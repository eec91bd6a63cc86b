import { createTerms, signOf, writeDifference, writeProduct, writeSum, type Terms } from './expansions';

/* Which side a point lies on, decided exactly: rounded arithmetic where its error bound allows, exact sums otherwise. */

/** 2⁻⁵³. */
const roundoff = 1.1102230246251565e-16;
/** Shewchuk's bounds are (7 + 56u)u and (3 + 16u)u. */
const spaceBound = 8 * roundoff;
const planeBound = 4 * roundoff;

/** Points as three coordinates each; a point is named by its number. */
export type Points = Float64Array;

/** 1 where d lies on the side of a, b, c from which they run counter-clockwise, -1 on the other, 0 in their plane. */
export function findSide(points: Points, a: number, b: number, c: number, d: number): number {
  const dx = points[3 * d] ?? 0, dy = points[3 * d + 1] ?? 0, dz = points[3 * d + 2] ?? 0;
  const ax = (points[3 * a] ?? 0) - dx, ay = (points[3 * a + 1] ?? 0) - dy, az = (points[3 * a + 2] ?? 0) - dz;
  const bx = (points[3 * b] ?? 0) - dx, by = (points[3 * b + 1] ?? 0) - dy, bz = (points[3 * b + 2] ?? 0) - dz;
  const cx = (points[3 * c] ?? 0) - dx, cy = (points[3 * c + 1] ?? 0) - dy, cz = (points[3 * c + 2] ?? 0) - dz;
  const p1 = bx * cy, q1 = cx * by, p2 = cx * ay, q2 = ax * cy, p3 = ax * by, q3 = bx * ay;
  // The determinant of a - d, b - d, c - d is negative on the side that is asked for.
  const determinant = az * (p1 - q1) + bz * (p2 - q2) + cz * (p3 - q3);
  const size = (Math.abs(p1) + Math.abs(q1)) * Math.abs(az) + (Math.abs(p2) + Math.abs(q2)) * Math.abs(bz) + (Math.abs(p3) + Math.abs(q3)) * Math.abs(cz);
  const bound = spaceBound * size;
  if (determinant > bound) return -1;
  if (-determinant > bound) return 1;
  if (isFlat(ax, bx, cx) || isFlat(ay, by, cy) || isFlat(az, bz, cz)) return 0;
  return findSideExactly(points, a, b, c, d);
}

/** Three differences that are zero, which no rounding can feign, put all four points in a plane along two axes. */
const isFlat = (one: number, two: number, three: number): boolean => one === 0 && two === 0 && three === 0;

const differences: Terms[] = Array.from({ length: 9 }, createTerms);
const counts = new Int32Array(9);
const product = createTerms(), other = createTerms(), minor = createTerms(), term = createTerms(), total = createTerms(), spare = createTerms();

function findSideExactly(points: Points, a: number, b: number, c: number, d: number): number {
  const corners = [a, b, c];
  for (let k = 0; k < 9; k++) {
    const corner = corners[Math.floor(k / 3)] ?? 0;
    counts[k] = writeDifference(points[3 * corner + (k % 3)] ?? 0, points[3 * d + (k % 3)] ?? 0, differences[k] ?? spare);
  }
  return 0 - signOfDeterminant();
}

/** The sign of the determinant whose rows are `differences`. */
function signOfDeterminant(): number {
  let sum = 0;
  for (let row = 0; row < 3; row++) {
    const i = 3 * ((row + 1) % 3), j = 3 * ((row + 2) % 3);
    const count = writeMinor(i, j + 1, i + 1, j);
    const terms = writeProduct(minor, count, at(3 * row + 2), counts[3 * row + 2] ?? 0, term);
    const length = writeSum(total, sum, term, terms, 1, spare);
    total.set(spare.subarray(0, length));
    sum = length;
  }
  return signOf(total, sum);
}

const at = (k: number): Terms => differences[k] ?? spare;

/** minor = difference i · difference j - difference k · difference l. */
function writeMinor(i: number, j: number, k: number, l: number): number {
  const n = writeProduct(at(i), counts[i] ?? 0, at(j), counts[j] ?? 0, product);
  const m = writeProduct(at(k), counts[k] ?? 0, at(l), counts[l] ?? 0, other);
  return writeSum(product, n, other, m, -1, minor);
}

/** `findSide` for the point a/2 + b/4 + c/4 of a facet, which is inside of it and exact as a sum of three terms. */
export function findSideOfInside(points: Points, a: number, b: number, c: number, inside: readonly [number, number, number]): number {
  const corners = [a, b, c];
  for (let k = 0; k < 9; k++) {
    const corner = corners[Math.floor(k / 3)] ?? 0;
    counts[k] = writeInsideDifference(points, corner, inside, k % 3, differences[k] ?? spare);
  }
  return 0 - signOfDeterminant();
}

/** out = coordinate of a corner less that of the point inside a facet. */
function writeInsideDifference(points: Points, corner: number, [p, q, r]: readonly [number, number, number], axis: number, out: Terms): number {
  // Halves and quarters of the three differences: all exact.
  const o = points[3 * corner + axis] ?? 0;
  let count = 0;
  for (const [vertex, share] of [[p, 0.5], [q, 0.25], [r, 0.25]] as const) {
    const n = writeDifference(o, points[3 * vertex + axis] ?? 0, product);
    for (let k = 0; k < n; k++) product[k] = share * (product[k] ?? 0);
    const length = writeSum(out, count, product, n, 1, spare);
    out.set(spare.subarray(0, length));
    count = length;
  }
  return count;
}

/** 1 where a, b, c run counter-clockwise in the plane of two axes, seen so that the second is a quarter turn on from the first; 0 on one line. */
export function findTurn(points: Points, i: number, j: number, a: number, b: number, c: number): number {
  const ci = points[3 * c + i] ?? 0, cj = points[3 * c + j] ?? 0;
  const left = ((points[3 * a + i] ?? 0) - ci) * ((points[3 * b + j] ?? 0) - cj);
  const right = ((points[3 * a + j] ?? 0) - cj) * ((points[3 * b + i] ?? 0) - ci);
  const determinant = left - right;
  const bound = planeBound * (Math.abs(left) + Math.abs(right));
  if (determinant > bound) return 1;
  if (-determinant > bound) return -1;
  // Along axes most that are on one line have a difference of zero, which no rounding can feign.
  if (left === 0 && right === 0 && bound === 0 && isZeroProduct(points, a, b, c, i, j) && isZeroProduct(points, a, b, c, j, i)) return 0;
  counts[0] = writeDifference(points[3 * a + i] ?? 0, ci, at(0));
  counts[1] = writeDifference(points[3 * a + j] ?? 0, cj, at(1));
  counts[3] = writeDifference(points[3 * b + i] ?? 0, ci, at(3));
  counts[4] = writeDifference(points[3 * b + j] ?? 0, cj, at(4));
  return signOf(minor, writeMinor(0, 4, 1, 3));
}

/** Whether (a - c) along one axis times (b - c) along another is zero because a factor is, and not by underflow. */
function isZeroProduct(points: Points, a: number, b: number, c: number, i: number, j: number): boolean {
  return points[3 * a + i] === points[3 * c + i] || points[3 * b + j] === points[3 * c + j];
}

/** `findTurn` of a, b and the point inside a facet. */
export function findTurnOfInside(points: Points, i: number, j: number, a: number, b: number, inside: readonly [number, number, number]): number {
  counts[0] = writeInsideDifference(points, a, inside, i, at(0));
  counts[1] = writeInsideDifference(points, a, inside, j, at(1));
  counts[3] = writeInsideDifference(points, b, inside, i, at(3));
  counts[4] = writeInsideDifference(points, b, inside, j, at(4));
  return signOf(minor, writeMinor(0, 4, 1, 3));
}
