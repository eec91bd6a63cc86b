import { add, sub, mul, abs } from './lanes';
import { FACETS, HIGH, LOW, ORIGIN, REGISTERS, SIZES } from './layout';

/*
 * The careful kernel. src/integrate-double-double.ts and src/double-double.ts are the reference; operations and their order are those, for two facets at
 * a time. A register holds two double-double numbers: their high parts in one v128, the low ones in the next.
 */
const A: i32 = 0, B: i32 = 3, C: i32 = 6, E: i32 = 9, F: i32 = 12, N: i32 = 15, D: i32 = 18, L: i32 = 19, S: i32 = 20, P: i32 = 23, T: i32 = 29, U: i32 = 30;
const FACET: usize = 72;

@inline function high(r: i32): v128 { return v128.load(REGISTERS + 32 * <usize>r); }
@inline function low(r: i32): v128 { return v128.load(REGISTERS + 32 * <usize>r, 16); }
@inline function keep(r: i32, h: v128, l: v128): void {
  v128.store(REGISTERS + 32 * <usize>r, h);
  v128.store(REGISTERS + 32 * <usize>r, l, 16);
}

@inline function differ(t: i32, a: v128, b: v128): void {
  const h = sub(a, b);
  const part = sub(h, a);
  keep(t, h, sub(sub(a, sub(h, part)), add(b, part)));
}

@inline function addPair(t: i32, aHigh: v128, aLow: v128, bHigh: v128, bLow: v128): void {
  let h = add(aHigh, bHigh);
  let part = sub(h, aHigh);
  let l = add(sub(aHigh, sub(h, part)), sub(bHigh, part));
  const lows = add(aLow, bLow);
  part = sub(lows, aLow);
  const rest = add(sub(aLow, sub(lows, part)), sub(bLow, part));
  l = add(l, lows);
  const middle = add(h, l);
  l = add(sub(l, sub(middle, h)), rest);
  h = add(middle, l);
  keep(t, h, sub(l, sub(h, middle)));
}
@inline function sum(t: i32, a: i32, b: i32): void { addPair(t, high(a), low(a), high(b), low(b)); }
@inline function difference(t: i32, a: i32, b: i32): void { addPair(t, high(a), low(a), f64x2.neg(high(b)), f64x2.neg(low(b))); }

@inline function productRest(a: v128, b: v128, product: v128): v128 {
  const splitter = f64x2.splat(134217729);
  let shifted = mul(splitter, a);
  const aTop = sub(shifted, sub(shifted, a));
  const aRest = sub(a, aTop);
  shifted = mul(splitter, b);
  const bTop = sub(shifted, sub(shifted, b));
  const bRest = sub(b, bTop);
  return add(add(add(sub(mul(aTop, bTop), product), mul(aTop, bRest)), mul(aRest, bTop)), mul(aRest, bRest));
}
function multiply(t: i32, a: i32, b: i32): void {
  const aHigh = high(a), bHigh = high(b);
  const product = mul(aHigh, bHigh);
  const l = add(productRest(aHigh, bHigh, product), add(mul(aHigh, low(b)), mul(low(a), bHigh)));
  const h = add(product, l);
  keep(t, h, sub(l, sub(h, product)));
}

/** 0 where the square is not positive. */
function squareRoot(t: i32, a: i32, spare: i32): void {
  const square0 = high(a);
  const positive = f64x2.gt(square0, f64x2.splat(0));
  const root = f64x2.sqrt(square0);
  const square = mul(root, root);
  addPair(spare, square0, low(a), f64x2.neg(square), f64x2.neg(productRest(root, root, square)));
  const correction = f64x2.div(high(spare), mul(f64x2.splat(2), root));
  const zero = f64x2.splat(0);
  addPair(t, root, zero, correction, zero);
  keep(t, v128.and(high(t), positive), v128.and(low(t), positive));
}

/** Adds one lane of a register to a sum. */
function addLane(place: usize, bHigh: f64, bLow: f64): void {
  const aHigh = load<f64>(HIGH + place), aLow = load<f64>(LOW + place);
  let h = aHigh + bHigh;
  let part = h - aHigh;
  let l = aHigh - (h - part) + (bHigh - part);
  const lows = aLow + bLow;
  part = lows - aLow;
  const rest = aLow - (lows - part) + (bLow - part);
  l += lows;
  const middle = h + l;
  l = l - (middle - h) + rest;
  h = middle + l;
  store<f64>(HIGH + place, h);
  store<f64>(LOW + place, l - (h - middle));
}
@inline function addLanes(place: usize, r: i32, both: bool): void {
  addLane(place, f64x2.extract_lane(high(r), 0), f64x2.extract_lane(low(r), 0));
  if (both) addLane(place, f64x2.extract_lane(high(r), 1), f64x2.extract_lane(low(r), 1));
}
function addWeighted(first: usize, weight: i32, both: bool): void {
  addLanes(first, weight, both);
  for (let k = 0; k < 3; k++) {
    multiply(T, weight, S + k);
    addLanes(first + 8 * <usize>(1 + k), T, both);
  }
  for (let k = 0; k < 6; k++) {
    multiply(T, weight, P + k);
    addLanes(first + 8 * <usize>(4 + k), T, both);
  }
}
@inline function addSize(place: usize, lanes: v128, both: bool): void {
  store<f64>(SIZES + place, load<f64>(SIZES + place) + f64x2.extract_lane(lanes, 0));
  if (both) store<f64>(SIZES + place, load<f64>(SIZES + place) + f64x2.extract_lane(lanes, 1));
}

@inline function pair(even: usize, odd: usize): v128 {
  return v128.load64_lane(odd, v128.load64_zero(even), 1);
}

/** Adds facets of nine binary64 coordinates at FACETS; of an odd number the last stands in both lanes and counts once. */
export function integrateCornersCarefully(count: i32): void {
  const zero = f64x2.splat(0);
  for (let facet = 0; facet < count; facet += 2) {
    const even = FACETS + FACET * <usize>facet;
    const both = facet + 1 < count;
    const odd = both ? even + FACET : even;
    for (let k = 0; k < 3; k++) {
      const at: usize = (<usize>k) << 3;
      const o = v128.load64_splat(ORIGIN + at);
      const a = pair(even + at, odd + at), b = pair(even + at + 24, odd + at + 24), c = pair(even + at + 48, odd + at + 48);
      differ(A + k, a, o);
      differ(B + k, b, o);
      differ(C + k, c, o);
      differ(E + k, b, a);
      differ(F + k, c, a);
      sum(S + k, A + k, B + k);
      sum(S + k, S + k, C + k);
    }
    keep(D, zero, zero);
    keep(L, zero, zero);
    let dSize = zero;
    let lSize = zero;
    for (let k = 0; k < 3; k++) {
      const i = (k + 1) % 3, j = (k + 2) % 3;
      multiply(T, E + i, F + j);
      multiply(U, E + j, F + i);
      const size = add(abs(high(T)), abs(high(U)));
      lSize = add(lSize, size);
      dSize = add(dSize, mul(abs(high(A + k)), size));
      difference(N + k, T, U);
      multiply(T, A + k, N + k);
      sum(D, D, T);
      multiply(T, N + k, N + k);
      sum(L, L, T);
    }
    squareRoot(L, L, T);
    for (let p = 0; p < 6; p++) {
      const i = p % 3;
      const j = p < 3 ? i : (i + 1) % 3;
      multiply(P + p, S + i, S + j);
      for (let corner = A; corner <= C; corner += 3) {
        multiply(T, corner + i, corner + j);
        sum(P + p, P + p, T);
      }
    }
    addWeighted(0, D, both);
    addWeighted(80, L, both);
    const trace = add(add(high(P), high(P + 1)), high(P + 2));
    addSize(0, dSize, both);
    addSize(8, mul(dSize, trace), both);
    addSize(16, lSize, both);
    addSize(24, mul(lSize, trace), both);
  }
}
