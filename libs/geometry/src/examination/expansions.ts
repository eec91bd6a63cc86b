import { productRest } from '../double-double';

/**
 * Exact sums: a number is kept as non-overlapping binary64 terms, least first, zeros left out (Shewchuk 1997, "Adaptive precision floating-point
 * arithmetic and fast robust geometric predicates"). Exact while no product underflows, which holds for edges of at least 1e-97. Terms stand in arrays that
 * are made once; a function gives how many it wrote.
 */
export type Terms = Float64Array;

/** out = a - b. */
export function writeDifference(a: number, b: number, out: Terms): number {
  const high = a - b;
  const part = high - a;
  const low = a - (high - part) - (b + part);
  let count = 0;
  if (low !== 0) out[count++] = low;
  if (high !== 0) out[count++] = high;
  return count;
}

/** out = e + f, or e - f; out must be neither of them. */
export function writeSum(e: Terms, n: number, f: Terms, m: number, sign: 1 | -1, out: Terms): number {
  let i = 0;
  let j = 0;
  let count = 0;
  let carry = 0;
  while (i < n || j < m) {
    const one = e[i] ?? 0;
    const two = f[j] ?? 0;
    const next = j >= m || (i < n && Math.abs(one) < Math.abs(two)) ? one : sign * two;
    if (j >= m || (i < n && Math.abs(one) < Math.abs(two))) i += 1;
    else j += 1;
    const high = carry + next;
    const virtual = high - carry;
    const low = carry - (high - virtual) + (next - virtual);
    if (low !== 0) out[count++] = low;
    carry = high;
  }
  if (carry !== 0) out[count++] = carry;
  return count;
}

/** out = e · factor; out must not be e. */
export function writeScaled(e: Terms, n: number, factor: number, out: Terms): number {
  let count = 0;
  let carry = 0;
  for (let i = 0; i < n; i++) {
    const term = e[i] ?? 0;
    const product = term * factor;
    const rest = productRest(term, factor, product);
    let high = carry + rest;
    let virtual = high - carry;
    let low = carry - (high - virtual) + (rest - virtual);
    if (low !== 0) out[count++] = low;
    const before = high;
    high = product + before;
    virtual = high - product;
    low = product - (high - virtual) + (before - virtual);
    if (low !== 0) out[count++] = low;
    carry = high;
  }
  if (carry !== 0) out[count++] = carry;
  return count;
}

const mostTerms = 4096;
const scaled = new Float64Array(mostTerms);
const partial = new Float64Array(mostTerms);

/** out = e · f; out must be neither of them. */
export function writeProduct(e: Terms, n: number, f: Terms, m: number, out: Terms): number {
  let count = 0;
  for (let j = 0; j < m; j++) {
    const terms = writeScaled(e, n, f[j] ?? 0, scaled);
    const total = writeSum(out, count, scaled, terms, 1, partial);
    for (let k = 0; k < total; k++) out[k] = partial[k] ?? 0;
    count = total;
  }
  return count;
}

/** The sign of a sum is that of its greatest term. */
export const signOf = (e: Terms, n: number): number => (n === 0 ? 0 : (e[n - 1] ?? 0) > 0 ? 1 : -1);

export const createTerms = (): Terms => new Float64Array(mostTerms);
