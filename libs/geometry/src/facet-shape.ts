import { productRest } from './double-double';

/** 2⁻⁵³, half the distance from 1 to the next number. */
const roundoff = 1.1102230246251565e-16;

/**
 * Whether three corners (nine coordinates from `at`) lie on one line or in one point, decided exactly. The rounded cross product answers for all
 * but nearly flat facets; those are decided by an exact sum of products (Shewchuk 1997, "Adaptive precision floating-point arithmetic and
 * fast robust geometric predicates"), which holds while no product underflows (edges of at least 1e-140).
 */
export function isDegenerate(corners: ArrayLike<number>, at: number): boolean {
  for (let k = 0; k < 3; k++) {
    const i = (k + 1) % 3, j = (k + 2) % 3;
    const ai = corners[at + i] ?? 0, bi = corners[at + 3 + i] ?? 0, ci = corners[at + 6 + i] ?? 0;
    const aj = corners[at + j] ?? 0, bj = corners[at + 3 + j] ?? 0, cj = corners[at + 6 + j] ?? 0;
    const left = (bi - ai) * (cj - aj);
    const right = (bj - aj) * (ci - ai);
    // Two differences, a product and a difference: four roundings, doubled for safety.
    if (Math.abs(left - right) > 8 * roundoff * (Math.abs(left) + Math.abs(right))) return false;
    if (left === 0 && right === 0 && isExactlyZero(bi, ai, cj, aj) && isExactlyZero(bj, aj, ci, ai)) continue;
    if (!isCrossZero(ai, aj, bi, bj, ci, cj)) return false;
  }
  return true;
}

/** Whether (b - a) · (d - c) is zero because a factor is, which no rounding can feign. */
function isExactlyZero(b: number, a: number, d: number, c: number): boolean {
  return a === b || c === d;
}

/** Whether (b - a) × (c - a), in the plane of two coordinates, is exactly zero. */
function isCrossZero(ai: number, aj: number, bi: number, bj: number, ci: number, cj: number): boolean {
  const sum: number[] = [];
  const e = exactDifference(bi, ai), f = exactDifference(cj, aj);
  const g = exactDifference(bj, aj), h = exactDifference(ci, ai);
  for (const one of e) for (const two of f) addProduct(sum, one, two);
  for (const one of g) for (const two of h) addProduct(sum, -one, two);
  return sum.length === 0;
}

function exactDifference(a: number, b: number): [number, number] {
  const high = a - b;
  const part = high - a;
  return [high, a - (high - part) - (b + part)];
}

function addProduct(sum: number[], a: number, b: number): void {
  const product = a * b;
  if (product === 0) return;
  addTerm(sum, productRest(a, b, product));
  addTerm(sum, product);
}

/** Adds a number to an exact sum of non-overlapping terms, least first, without zeros (Shewchuk's Grow-Expansion). */
function addTerm(sum: number[], term: number): void {
  let carry = term;
  let kept = 0;
  for (const part of [...sum]) {
    const high = carry + part;
    const virtual = high - carry;
    const low = carry - (high - virtual) + (part - virtual);
    if (low !== 0) sum[kept++] = low;
    carry = high;
  }
  sum.length = kept;
  if (carry !== 0) sum.push(carry);
}

/** How far (as a cosine) a stored normal must point to the other side before it contradicts: half a degree, so that rounding does not. */
const contradictingCosine = -0.01;

/** Whether a stored normal contradicts the side that the corners give. One that is zero or no number says nothing. */
export function isNormalContradicting(corners: ArrayLike<number>, at: number, x: number, y: number, z: number): boolean {
  const c = (k: number): number => corners[at + k] ?? 0;
  const ex = c(3) - c(0), ey = c(4) - c(1), ez = c(5) - c(2);
  const fx = c(6) - c(0), fy = c(7) - c(1), fz = c(8) - c(2);
  const nx = ey * fz - ez * fy, ny = ez * fx - ex * fz, nz = ex * fy - ey * fx;
  const dot = nx * x + ny * y + nz * z;
  return dot < 0 && dot < contradictingCosine * Math.sqrt((nx * nx + ny * ny + nz * nz) * (x * x + y * y + z * z));
}
