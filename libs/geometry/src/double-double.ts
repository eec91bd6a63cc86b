/**
 * Numbers of about 106 bits, each kept as an unevaluated sum of two binary64 numbers: the value rounded, and the rest.
 * Dekker 1971, "A floating-point technique for extending the available precision"; Knuth, TAOCP 2, 4.2.2 (two-sum);
 * Hida, Li, Bailey 2001, "Algorithms for quad-double precision arithmetic". Relative errors stay below 2⁻¹⁰⁰ an operation
 * while nothing over- or underflows.
 *
 * A register file instead of objects, so that nothing is allocated: number i stands at [2i] and [2i + 1]. Operands may be the target.
 */
export type Registers = Float64Array;

export function createRegisters(count: number): Registers {
  return new Float64Array(2 * count);
}

/** 2²⁷ + 1 splits a binary64 number into two halves of 26 bits. */
const splitter = 134217729;

/** r[t] = value, exactly. */
export function put(r: Registers, t: number, value: number): void {
  r[2 * t] = value;
  r[2 * t + 1] = 0;
}

export function copy(r: Registers, t: number, a: number): void {
  r[2 * t] = r[2 * a] ?? 0;
  r[2 * t + 1] = r[2 * a + 1] ?? 0;
}

/** r[t] = a - b of two binary64 numbers, exactly. */
export function differ(r: Registers, t: number, a: number, b: number): void {
  const high = a - b;
  const part = high - a;
  r[2 * t] = high;
  r[2 * t + 1] = a - (high - part) - (b + part);
}

/** r[t] = r[a] + r[b]. */
export function add(r: Registers, t: number, a: number, b: number): void {
  addPair(r, t, a, r[2 * b] ?? 0, r[2 * b + 1] ?? 0);
}

/** r[t] = r[a] - r[b]. */
export function subtract(r: Registers, t: number, a: number, b: number): void {
  addPair(r, t, a, -(r[2 * b] ?? 0), -(r[2 * b + 1] ?? 0));
}

function addPair(r: Registers, t: number, a: number, bHigh: number, bLow: number): void {
  const aHigh = r[2 * a] ?? 0;
  const aLow = r[2 * a + 1] ?? 0;
  let high = aHigh + bHigh;
  let part = high - aHigh;
  let low = aHigh - (high - part) + (bHigh - part);
  const lows = aLow + bLow;
  part = lows - aLow;
  const rest = aLow - (lows - part) + (bLow - part);
  low += lows;
  const middle = high + low;
  low = low - (middle - high) + rest;
  high = middle + low;
  r[2 * t] = high;
  r[2 * t + 1] = low - (high - middle);
}

/** r[t] = r[a] · r[b]. */
export function multiply(r: Registers, t: number, a: number, b: number): void {
  const aHigh = r[2 * a] ?? 0;
  const bHigh = r[2 * b] ?? 0;
  const product = aHigh * bHigh;
  const low = productRest(aHigh, bHigh, product) + (aHigh * (r[2 * b + 1] ?? 0) + (r[2 * a + 1] ?? 0) * bHigh);
  const high = product + low;
  r[2 * t] = high;
  r[2 * t + 1] = low - (high - product);
}

/** a · b - product, exactly, where product is a · b rounded. */
export function productRest(a: number, b: number, product: number): number {
  let shifted = splitter * a;
  const aTop = shifted - (shifted - a);
  const aRest = a - aTop;
  shifted = splitter * b;
  const bTop = shifted - (shifted - b);
  const bRest = b - bTop;
  return aTop * bTop - product + aTop * bRest + aRest * bTop + aRest * bRest;
}

/** r[t] = r[a] / r[b]. Uses register `spare`, which must be none of the others. */
export function divide(r: Registers, t: number, a: number, b: number, spare: number): void {
  const bHigh = r[2 * b] ?? 0;
  const first = (r[2 * a] ?? 0) / bHigh;
  subtractScaled(r, spare, a, b, first);
  const second = (r[2 * spare] ?? 0) / bHigh;
  subtractScaled(r, spare, spare, b, second);
  const third = (r[2 * spare] ?? 0) / bHigh;
  put(r, t, first);
  addPair(r, t, t, second, 0);
  addPair(r, t, t, third, 0);
}

/** r[t] = r[a] - r[b] · factor. */
function subtractScaled(r: Registers, t: number, a: number, b: number, factor: number): void {
  const bHigh = r[2 * b] ?? 0;
  const product = bHigh * factor;
  const low = productRest(bHigh, factor, product) + (r[2 * b + 1] ?? 0) * factor;
  const high = product + low;
  addPair(r, t, a, -high, -(low - (high - product)));
}

/** r[t] = √r[a], 0 where r[a] is not positive. Uses register `spare`. */
export function squareRoot(r: Registers, t: number, a: number, spare: number): void {
  const high = r[2 * a] ?? 0;
  if (!(high > 0)) return put(r, t, 0);
  // One step of Newton's on the rounded root doubles its digits.
  const root = Math.sqrt(high);
  const square = root * root;
  addPair(r, spare, a, -square, -productRest(root, root, square));
  const correction = (r[2 * spare] ?? 0) / (2 * root);
  put(r, t, root);
  addPair(r, t, t, correction, 0);
}

/** r[t] = r[a] / divisor, for a binary64 divisor. Uses registers `spare` and `spare + 1`. */
export function divideBy(r: Registers, t: number, a: number, divisor: number, spare: number): void {
  put(r, spare + 1, divisor);
  divide(r, t, a, spare + 1, spare);
}

/** The binary64 number nearest to r[a]; never -0. */
export function round(r: Registers, a: number): number {
  return (r[2 * a] ?? 0) + (r[2 * a + 1] ?? 0) + 0;
}
